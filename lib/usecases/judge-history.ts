import { z } from "zod";
import { loadForecastCatalogue } from "@/db/queries/forecast-inputs";
import { findOrganisation } from "@/db/queries/organisation";
import { arrangeCatalogue } from "./forecast-input";
import { judgeOutcomes } from "./judge-outcomes";
import { keepClaims } from "./keep-claims";
import { lessonsByQuarter } from "./lessons-by-quarter";
import { defineUseCase } from "./use-case";

/**
 * Puts on record what forecasts said, so that they can be held against what came: of every pack
 * in service at the start of each quarter, and of packs that came out before forecasts were
 * kept (imported history). Both from nothing but what was known on the day.
 */
export const judgeHistory = defineUseCase({
  name: "judge-history",
  allow: { system: true },
  input: z.object({}),
  async run(deps): Promise<{ judged: number; claims: number }> {
    const organisation = await findOrganisation(deps.db);
    if (!organisation) return { judged: 0, claims: 0 };
    const { timeZone } = organisation;
    const catalogue = arrangeCatalogue(await loadForecastCatalogue(deps.db));
    const lessonAt = lessonsByQuarter(deps.db, catalogue, timeZone);
    const ground = { catalogue, lessonAt, timeZone };
    return { judged: await judgeOutcomes(deps, ground), claims: await keepClaims(deps, ground) };
  },
});

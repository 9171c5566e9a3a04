import { z } from "zod";
import { listDoubtfulReadings } from "@/db/queries/doubtful-readings";
import { getOrganisation } from "@/db/queries/organisation";
import { defineUseCase } from "./use-case";

/** Shown at once; the others follow as verdicts are given. */
const SHOWN = 200;

/** Readings nobody has judged that forecasts hardly count, or that were unlikely when logged. */
export const listReadingsInDoubt = defineUseCase({
  name: "list-readings-in-doubt",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({}),
  async run(deps) {
    const organisation = await getOrganisation(deps.db);
    return { organisation, ...(await listDoubtfulReadings(deps.db, SHOWN)) };
  },
});
export type ReadingsInDoubt = Awaited<ReturnType<typeof listReadingsInDoubt>>;

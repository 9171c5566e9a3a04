import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { packsInClimate, upsertClimate } from "@/db/queries/climates";
import { mapDatabaseFault } from "./database-faults";
import { scaledEntry, textEntry } from "./form-entries";
import { touchForecasts } from "./touch-forecasts";
import { defineUseCase, personIdOf } from "./use-case";

const degrees = scaledEntry(1, { min: -700, max: 600, wanted: "a mean temperature in °C" });

/** Adds a climate or changes it; the forecasts of the sites that follow it are made anew. */
export const saveClimate = defineUseCase({
  name: "save-climate",
  allow: { roles: ["administrator"] },
  input: z.object({
    id: z.uuid(),
    name: textEntry("a name", 100),
    monthlyMeanC: z.array(degrees).length(12, "Enter twelve monthly means."),
  }),
  run: (deps, actor, { id, name, monthlyMeanC }) =>
    mapDatabaseFault(() =>
      deps.db.transaction().execute(async (trx) => {
        await upsertClimate(trx, { id, name, monthlyMeanDc: monthlyMeanC });
        await touchForecasts(trx, deps, await packsInClimate(trx, id));
        await appendAudit(trx, {
          ...{ at: deps.now(), personId: personIdOf(actor), act: "save-climate" },
          ...{ subjectKind: "climate", subjectId: id },
          detail: { name, monthlyMeanDc: monthlyMeanC },
        });
      }),
    ),
});

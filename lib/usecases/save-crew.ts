import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { upsertCrew } from "@/db/queries/crews";
import { mapDatabaseFault } from "./database-faults";
import { requiredId, textEntry } from "./form-entries";
import { defineUseCase, personIdOf } from "./use-case";

/** Adds a crew or changes its name and depot. */
export const saveCrew = defineUseCase({
  name: "save-crew",
  allow: { roles: ["administrator"] },
  input: z.object({ id: z.uuid(), name: textEntry("a name", 100), depotId: requiredId }),
  run: (deps, actor, crew) =>
    mapDatabaseFault(() =>
      deps.db.transaction().execute(async (trx) => {
        await upsertCrew(trx, crew);
        const { id, ...detail } = crew;
        await appendAudit(trx, {
          ...{ at: deps.now(), personId: personIdOf(actor), act: "save-crew" },
          ...{ subjectKind: "crew", subjectId: id, detail },
        });
      }),
    ),
});

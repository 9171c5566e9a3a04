import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { upsertVan } from "@/db/queries/crews";
import { mapDatabaseFault } from "./database-faults";
import { optionalScaledEntry, requiredId, textEntry } from "./form-entries";
import { defineUseCase, personIdOf } from "./use-case";

/** Adds a van (with the place in which its cells are counted) or changes it. */
export const saveVan = defineUseCase({
  name: "save-van",
  allow: { roles: ["administrator"] },
  input: z.object({
    id: z.uuid(),
    name: textEntry("a name or number plate", 100),
    crewId: requiredId,
    cellCapacity: optionalScaledEntry(0, { min: 1, max: 100_000, wanted: "a number of cells" }),
  }),
  run: (deps, actor, van) =>
    mapDatabaseFault(() =>
      deps.db.transaction().execute(async (trx) => {
        await upsertVan(trx, van, deps.newId());
        const { id, ...detail } = van;
        await appendAudit(trx, {
          ...{ at: deps.now(), personId: personIdOf(actor), act: "save-van" },
          ...{ subjectKind: "van", subjectId: id, detail },
        });
      }),
    ),
});

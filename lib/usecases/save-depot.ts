import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { upsertDepot } from "@/db/queries/crews";
import { mapDatabaseFault } from "./database-faults";
import { degreesEntry } from "./place-fields";
import { textEntry } from "./form-entries";
import { defineUseCase, personIdOf } from "./use-case";

/** Adds a depot (with its stores) or changes it. */
export const saveDepot = defineUseCase({
  name: "save-depot",
  allow: { roles: ["administrator"] },
  input: z.object({
    id: z.uuid(),
    name: textEntry("a name", 100),
    latitude: degreesEntry(90, "degrees north, such as 52.51234"),
    longitude: degreesEntry(180, "degrees east, such as 0.12345"),
  }),
  run: (deps, actor, depot) =>
    mapDatabaseFault(() =>
      deps.db.transaction().execute(async (trx) => {
        await upsertDepot(trx, depot, deps.newId());
        const { id, ...detail } = depot;
        await appendAudit(trx, {
          ...{ at: deps.now(), personId: personIdOf(actor), act: "save-depot" },
          ...{ subjectKind: "depot", subjectId: id, detail },
        });
      }),
    ),
});

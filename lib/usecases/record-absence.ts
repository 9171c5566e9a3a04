import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { countRoundsWithin, findTechnician, insertAbsence } from "@/db/queries/technicians";
import { notFound } from "@/lib/errors";
import { mapDatabaseFault } from "./database-faults";
import { optionalTextEntry, requiredId } from "./form-entries";
import { defineUseCase, personIdOf } from "./use-case";

const day = z.iso.date("Enter a day as YYYY-MM-DD.");

/**
 * Records days on which a technician does not work.
 * @returns how many rounds already stand on these days, for the dispatcher to rearrange
 */
export const recordAbsence = defineUseCase({
  name: "record-absence",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z
    .object({
      technicianId: requiredId,
      firstDay: day,
      lastDay: day,
      reason: optionalTextEntry(200),
    })
    .refine(({ firstDay, lastDay }) => lastDay >= firstDay, {
      path: ["lastDay"],
      message: "The last day is on or after the first.",
    }),
  run: (deps, actor, absence): Promise<{ roundsAffected: number }> =>
    mapDatabaseFault(() =>
      deps.db.transaction().execute(async (trx) => {
        const { technicianId, ...detail } = absence;
        if (!(await findTechnician(trx, technicianId))) throw notFound("This technician");
        await insertAbsence(trx, { id: deps.newId(), ...absence });
        await appendAudit(trx, {
          ...{ at: deps.now(), personId: personIdOf(actor), act: "record-absence" },
          ...{ subjectKind: "technician", subjectId: technicianId, detail },
        });
        return { roundsAffected: await countRoundsWithin(trx, absence) };
      }),
    ),
});

import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { deleteAbsence } from "@/db/queries/technicians";
import { notFound } from "@/lib/errors";
import { defineUseCase, personIdOf } from "./use-case";

/** Takes an absence back: the technician works on these days after all. */
export const removeAbsence = defineUseCase({
  name: "remove-absence",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({ absenceId: z.uuid() }),
  run: (deps, actor, { absenceId }) =>
    deps.db.transaction().execute(async (trx) => {
      const absence = await deleteAbsence(trx, absenceId);
      if (!absence) throw notFound("This absence");
      const { technicianId, firstDay, lastDay } = absence;
      await appendAudit(trx, {
        ...{ at: deps.now(), personId: personIdOf(actor), act: "remove-absence" },
        ...{ subjectKind: "technician", subjectId: technicianId, detail: { firstDay, lastDay } },
      });
    }),
});

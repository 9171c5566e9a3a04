import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { setReturnDay } from "@/db/queries/field-work";
import { endMatter } from "@/db/queries/field-matters";
import { conflict } from "@/lib/errors";
import { openMatter } from "./open-matter";
import { defineUseCase, personIdOf } from "./use-case";

/** Leaves a stop that could not be done to the next plan, from a day on where one is given. */
export const planStopAgain = defineUseCase({
  name: "plan-stop-again",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({
    id: z.uuid(),
    returnOn: z
      .union([z.literal(""), z.iso.date("Give a day, or leave it empty.")])
      .transform((day) => day || null),
  }),
  run: async (deps, actor, { id, returnOn }) =>
    deps.db.transaction().execute(async (trx) => {
      const matter = await openMatter(trx, id);
      if (matter.kind !== "cannot") throw conflict("Only a stop can be planned again.");
      if (matter.stopId) await setReturnDay(trx, matter.stopId, returnOn);
      const end = { closedAt: deps.now(), closedBy: personIdOf(actor), note: "" };
      await endMatter(trx, id, { ...end, outcome: "planned_again" });
      await appendAudit(trx, {
        ...{ at: deps.now(), personId: end.closedBy, act: "plan-stop-again" },
        ...{ subjectKind: "stop", subjectId: matter.stopId },
        detail: { returnOn },
      });
      return { id };
    }),
});

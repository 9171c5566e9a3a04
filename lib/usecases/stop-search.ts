import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { changePlan, lockPlan } from "@/db/queries/plans";
import { notFound } from "@/lib/errors";
import { defineUseCase, personIdOf } from "./use-case";

/**
 * Asks the worker to stop searching and to keep the best plan it has. It looks between the parts
 * of its search; a plan that is no longer being built stays as it is.
 */
export const stopSearch = defineUseCase({
  name: "stop-search",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({ planId: z.uuid() }),
  async run(deps, actor, { planId }) {
    await deps.db.transaction().execute(async (trx) => {
      const plan = await lockPlan(trx, planId);
      if (!plan) throw notFound("This plan");
      if (plan.state !== "building" || plan.stopAskedAt) return;
      await changePlan(trx, planId, { stopAskedAt: deps.now() });
      await appendAudit(trx, {
        at: deps.now(),
        personId: personIdOf(actor),
        act: "stop-search",
        subjectKind: "plan",
        subjectId: planId,
      });
    });
    return { planId };
  },
});

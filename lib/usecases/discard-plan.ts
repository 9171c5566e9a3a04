import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { replaceRounds } from "@/db/queries/plan-rounds";
import { changePlan, lockPlan } from "@/db/queries/plans";
import { conflict, notFound } from "@/lib/errors";
import { defineUseCase, personIdOf } from "./use-case";

/** Throws a draft away, or stops its build. Published rounds stay as they are. */
export const discardPlan = defineUseCase({
  name: "discard-plan",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({ planId: z.uuid() }),
  async run(deps, actor, { planId }) {
    await deps.db.transaction().execute(async (trx) => {
      const plan = await lockPlan(trx, planId);
      if (!plan) throw notFound("This plan");
      if (plan.state === "published") {
        throw conflict("This plan is published. Change its rounds in a new draft instead.");
      }
      if (plan.state === "discarded") return;
      await replaceRounds(trx, planId, []);
      await changePlan(trx, planId, { state: "discarded" });
      await appendAudit(trx, {
        at: deps.now(),
        personId: personIdOf(actor),
        act: "discard-plan",
        subjectKind: "plan",
        subjectId: planId,
        detail: { name: plan.name, state: plan.state },
      });
    });
    return { planId };
  },
});

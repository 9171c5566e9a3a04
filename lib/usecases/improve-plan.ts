import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { changePlan, lockPlan } from "@/db/queries/plans";
import { notFound } from "@/lib/errors";
import { assertDraft } from "./open-plan";
import { defineUseCase, personIdOf } from "./use-case";

/** Lets the worker search on from the draft as it stands; locked stops stay. */
export const improvePlan = defineUseCase({
  name: "improve-plan",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({ planId: z.uuid(), version: z.int() }),
  async run(deps, actor, { planId, version }) {
    await deps.db.transaction().execute(async (trx) => {
      const plan = await lockPlan(trx, planId);
      if (!plan) throw notFound("This plan");
      assertDraft(plan, version);
      await changePlan(trx, planId, {
        state: "building",
        progress: { share: 0, costs: [] },
        stopAskedAt: null,
      });
      await deps.jobs.enqueue(trx, "plan", { planId, mode: "improve" });
      await appendAudit(trx, {
        at: deps.now(),
        personId: personIdOf(actor),
        act: "improve-plan",
        subjectKind: "plan",
        subjectId: planId,
      });
    });
    return { planId };
  },
});

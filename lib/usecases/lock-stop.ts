import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { setStopLock } from "@/db/queries/plan-rounds";
import { changePlan, lockPlan } from "@/db/queries/plans";
import { notFound } from "@/lib/errors";
import { assertDraft } from "./open-plan";
import { defineUseCase, personIdOf } from "./use-case";

/** Locks a stop into its round, so that no build or improvement moves it, or frees it. */
export const lockStop = defineUseCase({
  name: "lock-stop",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({
    planId: z.uuid(),
    version: z.int(),
    siteId: z.uuid(),
    locked: z.boolean(),
  }),
  async run(deps, actor, { planId, version, siteId, locked }) {
    return deps.db.transaction().execute(async (trx) => {
      const plan = await lockPlan(trx, planId);
      if (!plan) throw notFound("This plan");
      assertDraft(plan, version);
      if (!(await setStopLock(trx, planId, siteId, locked))) throw notFound("This stop");
      const next = await changePlan(trx, planId, {});
      await appendAudit(trx, {
        at: deps.now(),
        personId: personIdOf(actor),
        act: "lock-stop",
        subjectKind: "plan",
        subjectId: planId,
        detail: { siteId, locked },
      });
      return { planId, version: next };
    });
  },
});

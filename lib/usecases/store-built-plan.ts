import { appendAudit } from "@/db/queries/audit";
import { replaceLeftOut } from "@/db/queries/plan-left-out";
import { loadPlanRounds, replaceRounds } from "@/db/queries/plan-rounds";
import { deletePlanSteps } from "@/db/queries/plan-steps";
import { changePlan, lockPlan } from "@/db/queries/plans";
import type { FinishedPlan } from "@/lib/planning/plan";
import type { StoredPlanCost } from "./plan-cost";
import { toStored } from "./stored-rounds";
import type { Deps } from "./use-case";

/** Writes a finished build as a draft. @returns false when the plan no longer waits for it */
export async function storeBuiltPlan(
  deps: Deps,
  planId: string,
  built: FinishedPlan,
  cost: StoredPlanCost,
): Promise<boolean> {
  return deps.db.transaction().execute(async (trx) => {
    const plan = await lockPlan(trx, planId);
    if (plan?.state !== "building") return false;
    const before = await loadPlanRounds(trx, planId);
    await replaceRounds(trx, planId, toStored(planId, built.rounds, before, deps.newId));
    await replaceLeftOut(
      trx,
      planId,
      built.leftOut.map(({ packId: _, waitingMinorPerWeek, ...row }) => ({
        ...row,
        waitingCostMinorPerWeek: waitingMinorPerWeek,
      })),
    );
    await deletePlanSteps(trx, planId);
    await changePlan(trx, planId, { state: "draft", cost });
    await appendAudit(trx, {
      at: deps.now(),
      personId: null,
      act: "run-plan-job",
      subjectKind: "plan",
      subjectId: planId,
      detail: { outcome: "built", rounds: built.rounds.length, swaps: built.figures.swaps },
    });
    return true;
  });
}

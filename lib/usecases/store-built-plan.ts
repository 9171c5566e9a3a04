import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { appendAudit } from "@/db/queries/audit";
import { loadLeftOut, replaceLeftOut } from "@/db/queries/plan-left-out";
import { loadPlanRounds, replaceRounds, type StoredRound } from "@/db/queries/plan-rounds";
import { deletePlanSteps, insertPlanStep } from "@/db/queries/plan-steps";
import { changePlan, lockPlan, type PlanRow } from "@/db/queries/plans";
import type { FinishedPlan } from "@/lib/planning/plan";
import type { StoredPlanCost } from "./plan-cost";
import { toStored } from "./stored-rounds";
import type { Deps } from "./use-case";

export interface BuiltPlan {
  readonly plan: FinishedPlan;
  readonly cost: StoredPlanCost;
}

/**
 * Writes a finished build as a draft.
 * @param improved the draft as it was is kept, so that the improvement can be undone
 * @returns false when the plan no longer waits for it
 */
export async function storeBuiltPlan(
  deps: Deps,
  planId: string,
  { plan: built, cost }: BuiltPlan,
  improved: boolean,
): Promise<boolean> {
  return deps.db.transaction().execute(async (trx) => {
    const plan = await lockPlan(trx, planId);
    if (plan?.state !== "building") return false;
    const before = await loadPlanRounds(trx, planId);
    if (improved) await keepBefore(trx, plan, before, deps.now());
    else await deletePlanSteps(trx, planId);
    await replaceRounds(trx, planId, toStored(planId, built.rounds, before, deps.newId));
    await replaceLeftOut(
      trx,
      planId,
      built.leftOut.map(({ packId: _, waitingMinorPerWeek, ...row }) => ({
        ...row,
        waitingCostMinorPerWeek: waitingMinorPerWeek,
      })),
    );
    await changePlan(trx, planId, { state: "draft", cost, stopAskedAt: null });
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

async function keepBefore(
  trx: Transaction<Database>,
  plan: PlanRow,
  rounds: readonly StoredRound[],
  takenAt: Date,
): Promise<void> {
  const content = { rounds, leftOut: await loadLeftOut(trx, plan.id), cost: plan.cost };
  const { id: planId, version } = plan;
  const step = { planId, version, act: "improve", words: "the improvement", content };
  await insertPlanStep(trx, { ...step, takenAt, takenBy: null });
}

import { z } from "zod";
import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { appendAudit } from "@/db/queries/audit";
import { loadLeftOut, noteLeftOut } from "@/db/queries/plan-left-out";
import { replaceRounds, type StoredRound } from "@/db/queries/plan-rounds";
import { insertPlanStep } from "@/db/queries/plan-steps";
import { changePlan, lockPlan, type PlanRow } from "@/db/queries/plans";
import { conflict, notFound } from "@/lib/errors";
import { roundsOf } from "@/lib/planning/rounds";
import type { Routes } from "@/lib/routing/problem";
import { assertDraft, type OpenPlan } from "./open-plan";
import { type PlanAct, planActSchema } from "./plan-acts";
import { planCostOf } from "./plan-cost";
import { openAndPrice } from "./price-plan-act";
import { dayKey, toStored } from "./stored-rounds";
import { type Actor, type Deps, defineUseCase, personIdOf } from "./use-case";

/**
 * Does one act on a draft: move, add, remove or reorder a stop.
 * @throws AppError conflict when somebody was faster, or with the reasons why it cannot be done
 */
export const editPlan = defineUseCase({
  name: "edit-plan",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({ planId: z.uuid(), version: z.int(), act: planActSchema }),
  async run(deps, actor, { planId, version, act }) {
    return deps.db.transaction().execute(async (trx) => {
      const plan = await lockPlan(trx, planId);
      if (!plan) throw notFound("This plan");
      assertDraft(plan, version);
      const { open, price } = await openAndPrice(deps, trx, plan, act);
      if (price.refusals.length > 0) {
        throw conflict(`It cannot go there: ${price.refusals.join("; ")}.`);
      }
      await keepStep(trx, deps, actor, plan, open.rounds, act);
      await replaceRounds(trx, planId, roundsAfter(deps, open, price.routes, act));
      await noteHand(trx, open, act);
      const cost = planCostOf(plan.cost, open, price.routes);
      const next = await changePlan(trx, planId, { cost });
      await appendAudit(trx, {
        at: deps.now(),
        personId: personIdOf(actor),
        act: "edit-plan",
        subjectKind: "plan",
        subjectId: planId,
        detail: { ...act, version: next },
      });
      const { routes: _, ...priced } = price;
      return { planId, version: next, price: priced };
    });
  },
});

/**
 * The plan's rounds after an act. Rounds on days that are gone (their technician fell ill, the
 * day is over) are no slots any more; their stops stay where they were until somebody moves them.
 */
function roundsAfter(deps: Deps, open: OpenPlan, routes: Routes, act: PlanAct): StoredRound[] {
  const planned = toStored(open.plan.id, roundsOf(open.problem, routes), open.rounds, deps.newId);
  const slots = new Set(
    open.problem.slots.map((s) => dayKey({ technicianId: s.technician.technicianId, day: s.day })),
  );
  const placed = new Set(planned.flatMap((round) => round.stops.map((stop) => stop.siteId)));
  if (act.kind === "remove") placed.add(act.siteId);
  const stranded = open.rounds
    .filter((round) => !slots.has(dayKey(round)))
    .map((round) => ({ ...round, stops: round.stops.filter((s) => !placed.has(s.siteId)) }))
    .filter((round) => round.stops.length > 0);
  return [...planned, ...stranded];
}

const WORDS: Record<PlanAct["kind"], string> = {
  move: "moving a stop",
  add: "adding a stop",
  remove: "taking a stop out",
  reorder: "changing the order",
};

async function keepStep(
  trx: Transaction<Database>,
  deps: Deps,
  actor: Actor,
  plan: PlanRow,
  rounds: readonly StoredRound[],
  act: PlanAct,
): Promise<void> {
  await insertPlanStep(trx, {
    planId: plan.id,
    version: plan.version,
    act: act.kind,
    words: WORDS[act.kind],
    content: { rounds, leftOut: await loadLeftOut(trx, plan.id), cost: plan.cost },
    takenAt: deps.now(),
    takenBy: personIdOf(actor),
  });
}

/** What is taken out by hand stays out of the next build; what is added is no longer left out. */
async function noteHand(trx: Transaction<Database>, open: OpenPlan, act: PlanAct): Promise<void> {
  if (act.kind === "add") await noteLeftOut(trx, open.plan.id, [act.assetId], null);
  if (act.kind !== "remove") return;
  const stop = open.rounds.flatMap((r) => r.stops).find((s) => s.siteId === act.siteId);
  const swaps = stop?.tasks.filter((task) => task.kind === "swap") ?? [];
  const outlooks = new Map(
    open.prepared.outlooks.flatMap((s) => s.outlooks.map((o) => [o.pack.assetId, o] as const)),
  );
  for (const { assetId } of swaps) {
    const waiting = outlooks.get(assetId)?.waitingMinorPerWeek ?? 0;
    await noteLeftOut(trx, open.plan.id, [assetId], {
      reason: "excluded",
      detail: "taken out by hand",
      earliestDay: null,
      waitingCostMinorPerWeek: Math.round(waiting),
    });
  }
}

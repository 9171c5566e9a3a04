import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { loadBindingRounds, loadPlanRounds } from "@/db/queries/plan-rounds";
import { changePlan, findPlan, lockPlan, noteProgress, type PlanRow } from "@/db/queries/plans";
import { loadTechniciansToPlan } from "@/db/queries/planning-fleet";
import { LOOK_AHEAD_DAYS } from "@/lib/planning/assumptions";
import { effortFor, type Effort } from "@/lib/planning/effort";
import { habitCost } from "@/lib/planning/habit";
import {
  finishPlan,
  prepareKnown,
  preparePlan,
  problemOf,
  type FinishedPlan,
} from "@/lib/planning/plan";
import type { KnownVisit } from "@/lib/planning/fleet";
import { daysBetween } from "@/lib/planning/local-time";
import { knownRoutes, placesOf } from "@/lib/planning/problem";
import { toMinor } from "@/lib/planning/rounds";
import type { Problem, Routes } from "@/lib/routing/problem";
import { excludedAssets } from "./open-plan";
import type { StoredPlanCost } from "./plan-cost";
import type { BuildProgress } from "./plan-progress";
import { searchWithin } from "./search-within";
import { storeBuiltPlan } from "./store-built-plan";
import { isCovered, knownVisits, loadWorld } from "./planning-world";
import { travelTimes } from "./travel-times";
import { type Deps, defineUseCase } from "./use-case";

const SEED = 20_261_201;

const MODES = ["build", "improve", "repair"] as const;
type Mode = (typeof MODES)[number];

/**
 * Builds or improves a plan. Safe to run twice: a plan that is not waiting for it is left alone,
 * and the same plan comes out again (the search is driven by turns and a fixed seed).
 *
 * build: from the rounds that people know, if any. improve: from the draft itself.
 * repair: as build, with every visit kept that can be kept; only the others find a new place.
 */
export const runPlanJob = defineUseCase({
  name: "run-plan-job",
  allow: { system: true },
  input: z.object({ planId: z.uuid(), mode: z.enum(MODES) }),
  async run(deps, _actor, { planId, mode }) {
    const plan = await findPlan(deps.db, planId);
    if (plan?.state !== "building") return { built: false };
    try {
      const known = await knownFor(deps, plan, mode);
      const built = await build(deps, plan, known, mode);
      if (!built) return { built: false };
      return { built: await storeBuiltPlan(deps, planId, built, mode === "improve") };
    } catch (error) {
      await giveUp(deps, planId);
      throw error;
    }
  },
});

async function knownFor(deps: Deps, plan: PlanRow, mode: Mode): Promise<KnownVisit[]> {
  const own = await loadPlanRounds(deps.db, plan.id);
  if (own.length > 0 && mode !== "improve")
    return knownVisits(own).map((visit) => ({ ...visit, locked: true }));
  const technicians = await loadTechniciansToPlan(deps.db, plan.crewIds);
  const ids = new Set(technicians.map((technician) => technician.id));
  const binding = await loadBindingRounds(deps.db, [...ids], plan.firstDay, plan.lastDay);
  const open = knownVisits(binding.filter((round) => isCovered(round, plan, ids)));
  if (mode === "improve") return draftVisits(knownVisits(own), open);
  return mode === "repair" ? open.map((visit) => ({ ...visit, locked: true })) : open;
}

/** A draft's visits: only those that stand where published rounds have them are dear to move. */
function draftVisits(own: readonly KnownVisit[], published: readonly KnownVisit[]): KnownVisit[] {
  const place = (visit: KnownVisit) => [visit.siteId, visit.technicianId, visit.day].join();
  const told = new Set(published.map(place));
  return own.map((visit) => ({ ...visit, untold: !told.has(place(visit)) }));
}

async function build(
  deps: Deps,
  plan: PlanRow,
  known: readonly KnownVisit[],
  mode: Mode,
): Promise<{ plan: FinishedPlan; cost: StoredPlanCost } | null> {
  const world = await loadWorld(deps.db, deps.now(), plan, {
    siteIds: mode === "repair" ? known.map((visit) => visit.siteId) : null,
    known,
    lookAheadDays: mode === "repair" ? 0 : LOOK_AHEAD_DAYS,
    excludedAssets: await excludedAssets(deps.db, plan.id),
  });
  const prepared = mode === "repair" ? prepareKnown(world.input, []) : preparePlan(world.input);
  const places = placesOf(world.input.technicians, prepared.visits);
  const travel = await travelTimes(deps, world.organisation, places);
  const problem = problemOf(prepared, travel.table);
  const effort = effortFor(prepared.visits.length, knownRoutes(problem, known), mode === "improve");
  const routes = await search(deps, plan.id, problem.problem, effort);
  if (!routes) return null;
  const finished = finishPlan(prepared, problem, routes);
  const habit = habitCost(prepared.outlooks, prepared.context);
  const minor = habit.minorPerWeek * (planDays(plan) / 7);
  const cost: StoredPlanCost = {
    figures: finished.figures,
    // A repair looks at its own visits only; the whole fleet's habit is not theirs.
    habit: mode !== "repair" && habit.packs > 0 ? { minor, packs: habit.packs } : null,
    travel: travel.source,
  };
  return { plan: finished, cost };
}

function planDays({ firstDay, lastDay }: PlanRow): number {
  return daysBetween(firstDay, lastDay) + 1;
}

/**
 * Seeks the rounds, noting the falling cost meanwhile, until somebody asks it to stop. Null: the
 * plan was discarded.
 */
async function search(
  deps: Deps,
  planId: string,
  problem: Problem,
  effort: Effort,
): Promise<Routes | null> {
  const costs: number[] = [];
  const seek = deps.searchRounds ?? searchWithin;
  return seek({ problem, ...effort, seed: SEED }, async ({ share, cost }) => {
    costs.push(Math.round(toMinor(cost)));
    const progress: BuildProgress = { share: Math.min(1, share), costs: [...costs] };
    await noteProgress(deps.db, planId, progress);
    const plan = await findPlan(deps.db, planId);
    if (plan?.state !== "building") return "drop";
    return plan.stopAskedAt ? "enough" : "go on";
  });
}

async function giveUp(deps: Deps, planId: string): Promise<void> {
  await deps.db.transaction().execute(async (trx) => {
    const plan = await lockPlan(trx, planId);
    if (plan?.state !== "building") return;
    await changePlan(trx, planId, {
      state: "failed",
      problem: "The build broke off. Nothing was changed or sent; start it again.",
    });
    await appendAudit(trx, {
      at: deps.now(),
      personId: null,
      act: "run-plan-job",
      subjectKind: "plan",
      subjectId: planId,
      detail: { outcome: "failed" },
    });
  });
}

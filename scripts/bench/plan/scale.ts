/** How the time of a first plan, and of one act on it, grows with the fleet. */
import { priceAct, slotIndex, visitIndex } from "@/lib/planning/edits";
import type { KnownVisit } from "@/lib/planning/fleet";
import {
  finishPlan,
  prepareKnown,
  preparePlan,
  problemOf,
  type PlanInput,
} from "@/lib/planning/plan";
import { knownRoutes, placesOf } from "@/lib/planning/problem";
import type { PlannedRound } from "@/lib/planning/rounds";
import { greatCircleTable } from "@/lib/planning/travel";
import { seededRng } from "@/lib/routing/rng";
import { afterIterations, solve } from "@/lib/routing/solve";
import { PLAN_ITERATIONS } from "@/lib/usecases/run-plan-job";
import { median } from "../timing";
import { fleetInput } from "./fleet";

export interface ScaleRow {
  readonly assets: number;
  readonly technicians: number;
  /** Sites of which the plan could choose, and those that it visits. */
  readonly offered: number;
  readonly visited: number;
  readonly prepareSeconds: number;
  readonly searchSeconds: number;
  /** From the fleet to finished rounds. */
  readonly planSeconds: number;
  /** Moving a stop to another day, priced anew from the stored plan; median. */
  readonly actMs: number;
  readonly rssMiB: number;
}

/** The visits of finished rounds, as the planner knows them the next time. */
export function knownOf(rounds: readonly PlannedRound[]): KnownVisit[] {
  return rounds.flatMap(({ technicianId, day, stops }) =>
    stops.map(({ siteId, position, tasks }) => ({
      ...{ siteId, technicianId, day, position, tasks },
      locked: false,
    })),
  );
}

/** Plans as the worker does: great circle, the same number of turns, one seed. */
export function planFleet(input: PlanInput, iterations = PLAN_ITERATIONS) {
  const began = performance.now();
  const prepared = preparePlan(input);
  const travel = greatCircleTable(placesOf(input.technicians, prepared.visits), input.road);
  const problem = problemOf(prepared, travel);
  const searched = performance.now();
  const start = knownRoutes(problem, input.known);
  const from = start.some((route) => route.length > 0) ? { start } : {};
  const { routes } = solve(problem.problem, afterIterations(iterations), seededRng(1), from);
  const finished = performance.now();
  const plan = finishPlan(prepared, problem, routes);
  return {
    plan,
    offered: prepared.visits.length,
    prepareSeconds: (searched - began) / 1000,
    searchSeconds: (finished - searched) / 1000,
    planSeconds: (performance.now() - began) / 1000,
  };
}

/** Prices moves from one round into another, from what is stored of the two, as the screen asks. */
function actTimes(input: PlanInput, rounds: readonly PlannedRound[], times: number): number[] {
  return Array.from({ length: times }, (_, k) => {
    const [from, into] = [rounds[k % rounds.length]!, rounds[(k + 1) % rounds.length]!];
    const began = performance.now();
    const known = knownOf([from, into]);
    const siteIds = new Set(known.map((visit) => visit.siteId));
    const touched: PlanInput = {
      ...input,
      known,
      sites: input.sites.filter((site) => siteIds.has(site.siteId)),
      packs: input.packs.filter((pack) => siteIds.has(pack.siteId)),
    };
    const prepared = prepareKnown(touched, []);
    const travel = greatCircleTable(placesOf(touched.technicians, prepared.visits), input.road);
    const problem = problemOf(prepared, travel);
    const site = visitIndex(problem, from.stops[0]!.siteId);
    const slot = slotIndex(problem, into.technicianId, into.day);
    priceAct(problem, knownRoutes(problem, known), { kind: "move", site, slot }, (day) => day);
    return performance.now() - began;
  });
}

/** One size of fleet, planned for so many weeks. */
export function scaleRow(assets: number, weeks: number): ScaleRow {
  const input = fleetInput(assets, weeks, seededRng(assets));
  const { plan, ...times } = planFleet(input);
  return {
    assets,
    technicians: input.technicians.length,
    visited: plan.rounds.reduce((sum, round) => sum + round.stops.length, 0),
    ...times,
    actMs: median(actTimes(input, plan.rounds, 9)),
    rssMiB: process.memoryUsage().rss / 1024 ** 2,
  };
}

/** How the time of a first plan, and of one act on it, grows with the fleet. */
import { priceAct, slotIndex, visitIndex } from "@/lib/planning/edits";
import { effortFor } from "@/lib/planning/effort";
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
import { checkPlan } from "@/lib/routing/check";
import type { Problem } from "@/lib/routing/problem";
import { seededRng } from "@/lib/routing/rng";
import { searchBeside } from "@/lib/server/search-threads/search-beside";
import { median } from "../timing";
import { fleetInput } from "./fleet";

export interface ScaleRow {
  readonly assets: number;
  readonly technicians: number;
  /** Sites of which the plan could choose, and those that it visits. */
  readonly offered: number;
  readonly visited: number;
  readonly turns: number;
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

/** The problem without what people know: no change has a price. */
function unknown(problem: Problem): Problem {
  return { ...problem, sites: problem.sites.map(({ previous: _, ...site }) => site) };
}

/**
 * Plans as the worker does: great circle, the same turns in the same two threads, one seed.
 * @param free sought anew, as if nobody knew of any round
 */
export async function planFleet(input: PlanInput, free = false) {
  const began = performance.now();
  const prepared = preparePlan(input);
  const travel = greatCircleTable(placesOf(input.technicians, prepared.visits), input.road);
  const problem = problemOf(prepared, travel);
  const searched = performance.now();
  const bare = unknown(problem.problem);
  const known = free ? [] : knownRoutes(problem, input.known);
  const { turns, options } = effortFor(prepared.visits.length, known);
  const sought = { problem: free ? bare : problem.problem, turns, options, seed: 1 };
  const routes = (await searchBeside(sought, async () => "go on"))!;
  const finished = performance.now();
  const plan = finishPlan(prepared, problem, routes);
  return {
    plan,
    /** What the plan costs beside changes, in the engine's units, by the independent checker. */
    bareCost: checkPlan(bare, routes).cost,
    offered: prepared.visits.length,
    turns,
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
export async function scaleRow(assets: number, weeks: number): Promise<ScaleRow> {
  const input = fleetInput(assets, weeks, seededRng(assets));
  const { plan, bareCost: _, ...times } = await planFleet(input);
  return {
    assets,
    technicians: input.technicians.length,
    visited: plan.rounds.reduce((sum, round) => sum + round.stops.length, 0),
    ...times,
    actMs: median(actTimes(input, plan.rounds, 9)),
    rssMiB: process.memoryUsage().rss / 1024 ** 2,
  };
}

/** Packs worth a visit to rounds: the product's own planner and search, for every policy. */
import { ARRIVAL_S, LOOK_AHEAD_DAYS } from "@/lib/planning/assumptions";
import type { PlannedTask, PlanningPack } from "@/lib/planning/fleet";
import { dayOfNumber } from "@/lib/planning/local-time";
import { makePlan, type PlanInput, type PreparedPlan } from "@/lib/planning/plan";
import { outlookContext } from "@/lib/planning/outlook";
import { placesOf } from "@/lib/planning/problem";
import type { PlannedRound } from "@/lib/planning/rounds";
import { greatCircleTable } from "@/lib/planning/travel";
import type { Visit } from "@/lib/planning/visit";
import { seededRng } from "@/lib/routing/rng";
import { afterIterations } from "@/lib/routing/solve";
import { fromEpochDays } from "@/lib/units";
import { BEFORE_WORK, type BenchField } from "./field";
import { type BenchAsset, PRICES, ROAD, TIME_ZONE } from "./fleet";

/** Turns of the search for one week; the product takes more, with more to gain on a whole fleet. */
const TURNS = 6_000;
const PLENTY = 1_000_000;

/** The week from a Monday, planned that morning. Cells never run out, under any policy. */
export function weekInput(
  field: BenchField,
  monday: number,
  packs: readonly PlanningPack[],
): PlanInput {
  const { fleet } = field;
  const kinds = new Set([...fleet.assets.values()].map((asset) => asset.designation));
  return {
    frame: {
      timeZone: TIME_ZONE,
      now: fromEpochDays(monday + BEFORE_WORK),
      firstDay: dayOfNumber(monday),
      lastDay: dayOfNumber(monday + 6),
      workingDays: [1, 2, 3, 4, 5],
    },
    lookAheadDays: LOOK_AHEAD_DAYS,
    prices: PRICES,
    road: ROAD,
    technicians: fleet.technicians,
    sites: [...fleet.sites.values()],
    packs,
    cellsOnHand: new Map([...kinds].map((kind) => [kind, PLENTY])),
    known: [],
    excludedAssets: new Set(),
  };
}

/** Drives the search; same input, same rounds. */
export function roundsFor(prepared: PreparedPlan, monday: number): readonly PlannedRound[] {
  if (prepared.visits.length === 0) return [];
  const places = placesOf(prepared.input.technicians, prepared.visits);
  const search = { stop: afterIterations(TURNS), rng: seededRng(monday) };
  return makePlan(prepared, greatCircleTable(places, ROAD), search).rounds;
}

/** A visit that a simple policy asks for, and what it costs not to make it this week. */
export interface WantedVisit {
  readonly siteId: string;
  readonly tasks: readonly (PlannedTask & { readonly asset: BenchAsset })[];
  /** Silence that runs until the visit. */
  readonly silenceMinorPerDay: number;
  readonly laterMinor: number;
}

/** Rounds for the visits of a policy that knows what it wants and by when. */
export function roundsForWanted(
  field: BenchField,
  monday: number,
  wanted: readonly WantedVisit[],
): readonly PlannedRound[] {
  const input = weekInput(field, monday, []);
  const depots = input.technicians.map((technician) => technician.depot);
  const context = outlookContext(input.frame, input.prices, depots, input.road);
  const visits = wanted.map((visit): Visit => {
    const workS = visit.tasks.reduce((sum, { kind, asset }) => {
      const { swapMinutes, readMinutes } = asset.model;
      return sum + 60 * (kind === "swap" ? swapMinutes : readMinutes);
    }, ARRIVAL_S);
    return {
      site: field.fleet.sites.get(visit.siteId)!,
      tasks: visit.tasks,
      outlooks: [],
      serviceS: workS,
      dayMinor: context.days.map((_, d) => (d + 0.5) * visit.silenceMinorPerDay),
      laterMinor: visit.laterMinor,
      expectedOut: context.days.map(() => 0),
      cells: new Map(),
    };
  });
  const horizon = input.frame;
  const outlook = { outlooks: [], due: [], visits, stock: null };
  return roundsFor({ input, horizon, context, ...outlook }, monday);
}

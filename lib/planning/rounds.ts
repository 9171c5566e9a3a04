/** From the engine's routes to rounds with stops, instants and what they cost. */
import type { IsoDay, Metres, Minor, Seconds } from "@/lib/units";
import type { CostParts } from "../routing/price";
import type { Routes } from "../routing/problem";
import { scheduleRoute, type RouteSchedule } from "../routing/schedule";
import { COST_UNITS_A_MINOR, LOADING_S } from "./assumptions";
import type { PlannedTask } from "./fleet";
import { instantOfElapsed } from "./local-time";
import type { RoundsProblem } from "./problem";

export interface PlannedStop {
  readonly siteId: string;
  /** From 1. */
  readonly position: number;
  readonly arrivesAt: Date;
  /** Work begins, after any wait at the gate. */
  readonly beginsAt: Date;
  readonly departsAt: Date;
  readonly driveS: Seconds;
  readonly driveM: Metres;
  readonly tasks: readonly PlannedTask[];
}

export interface PlannedRound {
  readonly technicianId: string;
  readonly day: IsoDay;
  /** Loading the van begins. */
  readonly startsAt: Date;
  /** Back at the depot. */
  readonly endsAt: Date;
  readonly driveS: Seconds;
  readonly workS: Seconds;
  readonly distanceM: Metres;
  readonly overtimeS: Seconds;
  readonly stops: readonly PlannedStop[];
}

/** One route as a round; null when it has no stop. */
export function roundOf(
  rounds: RoundsProblem,
  slot: number,
  schedule: RouteSchedule,
): PlannedRound | null {
  if (schedule.stops.length === 0) return null;
  const { technician, day } = rounds.slots[slot]!;
  const at = (seconds: Seconds) => instantOfElapsed(day, seconds, rounds.frame.timeZone);
  return {
    technicianId: technician.technicianId,
    day,
    startsAt: at(schedule.departS - LOADING_S),
    endsAt: at(schedule.returnS),
    driveS: schedule.driveS,
    workS: schedule.serviceS,
    distanceM: schedule.driveM,
    overtimeS: schedule.overtimeS,
    stops: schedule.stops.map((stop, k) => ({
      siteId: rounds.visits[stop.site]!.site.siteId,
      position: k + 1,
      arrivesAt: at(stop.arriveS),
      beginsAt: at(stop.startS),
      departsAt: at(stop.leaveS),
      driveS: stop.driveS,
      driveM: stop.driveM,
      tasks: rounds.visits[stop.site]!.tasks,
    })),
  };
}

/** Every route that has a stop, as a round. */
export function roundsOf(rounds: RoundsProblem, routes: Routes): PlannedRound[] {
  return routes.flatMap((route, slot) => {
    const round = roundOf(rounds, slot, scheduleRoute(rounds.problem, slot, route));
    return round ? [round] : [];
  });
}

/** Cost units of the engine in minor currency units. */
export function toMinor(units: number): Minor {
  return units / COST_UNITS_A_MINOR;
}

export interface PlanFigures {
  /** Pay of the crews on duty, overtime and loading included, and the vans' kilometres. */
  readonly crewMinor: Minor;
  readonly travelMinor: Minor;
  readonly cellsMinor: Minor;
  /** Expected cost of silence until the visits of this plan. */
  readonly riskMinor: Minor;
  readonly totalMinor: Minor;
  /** Packs expected to stop before their visit: a sum of chances. */
  readonly expectedOut: number;
  readonly swaps: number;
  readonly sites: number;
  readonly rounds: number;
  readonly driveS: Seconds;
  readonly workS: Seconds;
  readonly dutyS: Seconds;
  readonly overtimeS: Seconds;
  readonly distanceM: Metres;
}

function paid(cost: CostParts): number {
  return cost.duty + cost.overtime + cost.opening;
}

/** What a plan costs and does, in people's terms. */
export function planFigures(rounds: RoundsProblem, routes: Routes): PlanFigures {
  const schedules = routes.map((route, r) => scheduleRoute(rounds.problem, r, route));
  const sum = (of: (schedule: RouteSchedule) => number) =>
    schedules.reduce((total, schedule) => total + of(schedule), 0);
  const visited = schedules.flatMap((schedule) =>
    schedule.stops.map((stop) => ({
      visit: rounds.visits[stop.site]!,
      day: rounds.problem.slots[schedule.slot]!.day,
    })),
  );
  const swapped = visited.flatMap(({ visit, day }) => {
    const swaps = new Set(visit.tasks.flatMap((t) => (t.kind === "swap" ? [t.assetId] : [])));
    return visit.outlooks
      .filter((outlook) => swaps.has(outlook.pack.assetId))
      .map((outlook) => ({ pack: outlook.pack, price: outlook.visits[day]! }));
  });
  const crewMinor = toMinor(sum((s) => paid(s.cost)));
  const travelMinor = toMinor(sum((s) => s.cost.driving));
  const cellsMinor = swapped.reduce((total, { pack }) => total + pack.cellsMinor, 0);
  const riskMinor = swapped.reduce((total, { price }) => total + price.silenceMinor, 0);
  return {
    crewMinor,
    travelMinor,
    cellsMinor,
    riskMinor,
    totalMinor: crewMinor + travelMinor + cellsMinor + riskMinor,
    expectedOut: swapped.reduce((total, { price }) => total + price.chanceOut, 0),
    swaps: swapped.length,
    sites: visited.length,
    rounds: schedules.filter((s) => s.stops.length > 0).length,
    driveS: sum((s) => s.driveS),
    workS: sum((s) => s.serviceS),
    dutyS: sum((s) => (s.stops.length > 0 ? s.dutyS + LOADING_S : 0)),
    overtimeS: sum((s) => s.overtimeS),
    distanceM: sum((s) => s.driveM),
  };
}

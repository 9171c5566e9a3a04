/**
 * Times and cost of one route as people see it: wall clock, waits, overtime, load, and the reason
 * why each stop cannot be where it is.
 */
import { latestStartS, wallAtEndS, wallAtStartS, workedS } from "./clock";
import { changePrice, legPrice, NO_COST, type CostParts } from "./price";
import type { Problem, Site, Slot } from "./problem";

/** Why a stop cannot go somewhere. */
export type RefusalCode =
  | "locked"
  | "notice"
  | "skill_missing"
  | "site_closed"
  /** Open that day, but the work would start after its hours. */
  | "outside_hours"
  | "outside_shift"
  | "van_full"
  /** Stores and vans together hold too few cells of its type by that day. */
  | "stock_short";

export interface Refusal {
  readonly code: RefusalCode;
  readonly slot: number;
  /** Absent where the whole route is at fault. */
  readonly site?: number;
  /** By how much: seconds late, or cells too many. */
  readonly excess?: number;
  /** The cell type that is short. */
  readonly type?: number;
}

export interface StopTimes {
  readonly site: number;
  readonly driveS: number;
  readonly driveM: number;
  readonly arriveS: number;
  /** Seconds at the gate before work can start, breaks not counted. */
  readonly waitS: number;
  readonly startS: number;
  readonly leaveS: number;
}

export interface RouteSchedule {
  readonly slot: number;
  readonly stops: readonly StopTimes[];
  readonly departS: number;
  readonly returnS: number;
  readonly driveS: number;
  readonly driveM: number;
  readonly serviceS: number;
  readonly waitS: number;
  /** Shift start to return, breaks not counted. */
  readonly dutyS: number;
  readonly overtimeS: number;
  /** Cells by type. */
  readonly load: readonly number[];
  readonly cost: CostParts;
  readonly refusals: readonly Refusal[];
}

/** Reasons that hold wherever in the slot's route the site would go. */
export function slotRefusals(problem: Problem, s: number, r: number): Refusal[] {
  const site = problem.sites[s]!;
  const slot = problem.slots[r]!;
  const refusals: Refusal[] = [];
  const refuse = (code: RefusalCode): void => void refusals.push({ code, slot: r, site: s });
  if (site.lockedTo !== undefined && site.lockedTo !== r) refuse("locked");
  if (slot.day < site.firstDay) refuse("notice");
  if ((site.skills & ~slot.skills) !== 0) refuse("skill_missing");
  if (!site.windows[slot.day]) refuse("site_closed");
  return refusals;
}

function loadOf(slot: Slot, sites: readonly Site[]): number[] {
  return slot.capacity.map((_, type) =>
    sites.reduce((sum, site) => sum + (site.demand[type] ?? 0), 0),
  );
}

function loadRefusals(slot: Slot, r: number, load: readonly number[]): Refusal[] {
  const total = load.reduce((sum, cells) => sum + cells, 0) - slot.capacityTotal;
  const excess = Math.max(total, ...load.map((cells, type) => cells - slot.capacity[type]!));
  return excess > 0 ? [{ code: "van_full", slot: r, excess }] : [];
}

/** The walk along a route on the working clock; what `scheduleRoute` dresses up. */
interface Walk {
  readonly stops: StopTimes[];
  readonly refusals: Refusal[];
  nowS: number;
  place: number;
  driveS: number;
  driveM: number;
  waitS: number;
  driving: number;
}

function drive(problem: Problem, walk: Walk, to: number): { driveS: number; driveM: number } {
  const cell = walk.place * problem.places + to;
  const driveS = problem.travelS[cell]!;
  const driveM = problem.travelM[cell]!;
  walk.driving += legPrice(problem, walk.place, to);
  walk.nowS += driveS;
  walk.driveS += driveS;
  walk.driveM += driveM;
  walk.place = to;
  return { driveS, driveM };
}

function visit(problem: Problem, walk: Walk, r: number, s: number): void {
  const site = problem.sites[s]!;
  const slot = problem.slots[r]!;
  const { breaks } = slot;
  const window = site.windows[slot.day];
  const leg = drive(problem, walk, site.place);
  const arriveS = wallAtEndS(breaks, walk.nowS);
  const waitS = Math.max(0, workedS(breaks, window?.openS ?? 0) - walk.nowS);
  walk.waitS += waitS;
  walk.nowS += waitS;
  const startS = wallAtStartS(breaks, walk.nowS);
  if (walk.stops.length >= slot.frozen.length) {
    walk.refusals.push(...slotRefusals(problem, s, r));
    const late = window ? walk.nowS - latestStartS(breaks, window.closeS) : 0;
    if (late > 0) walk.refusals.push({ code: "outside_hours", slot: r, site: s, excess: late });
  }
  walk.nowS += site.serviceS;
  const leaveS = site.serviceS === 0 ? startS : wallAtEndS(breaks, walk.nowS);
  walk.stops.push({ site: s, ...leg, arriveS, waitS, startS, leaveS });
}

/** Cost by cause of a route that drives `driving`, is on duty `dutyS` and `overtimeS` over. */
function routeCost(
  problem: Problem,
  slot: Slot,
  sites: readonly Site[],
  spent: { readonly driving: number; readonly dutyS: number; readonly overtimeS: number },
): CostParts {
  if (sites.length === 0) return NO_COST;
  const duty = spent.dutyS * problem.prices.dutyPerS;
  const overtime = spent.overtimeS * slot.overtimePerS;
  const visits = sites.reduce((sum, site) => sum + site.visitCost[slot.day]!, 0);
  const changes = sites.reduce((sum, site) => sum + changePrice(problem, site, slot), 0);
  const opening = slot.openingCost;
  const total = spent.driving + duty + overtime + opening + visits + changes;
  return { driving: spent.driving, duty, overtime, opening, visits, changes, skipped: 0, total };
}

/** Drives the whole route and notes what is wrong with it. */
function driveRoute(problem: Problem, r: number, route: readonly number[], load: number[]): Walk {
  const slot = problem.slots[r]!;
  const walk: Walk = {
    stops: [],
    refusals: [],
    nowS: workedS(slot.breaks, slot.startS),
    place: slot.startPlace,
    driveS: 0,
    driveM: 0,
    waitS: 0,
    driving: 0,
  };
  for (const s of route) visit(problem, walk, r, s);
  if (route.length > 0) drive(problem, walk, slot.endPlace);
  if (route.length > slot.frozen.length) {
    const excess = walk.nowS - workedS(slot.breaks, slot.endS + slot.overtimeS);
    if (excess > 0) walk.refusals.push({ code: "outside_shift", slot: r, excess });
    walk.refusals.push(...loadRefusals(slot, r, load));
  }
  return walk;
}

/**
 * Drives one route: arrival, wait, start and leaving time of each stop, the return, load, cost by
 * cause, and every reason why it may not be driven. Times are wall-clock seconds from midnight.
 */
export function scheduleRoute(
  problem: Problem,
  r: number,
  route: readonly number[],
): RouteSchedule {
  const slot = problem.slots[r]!;
  const sites = route.map((s) => problem.sites[s]!);
  const load = loadOf(slot, sites);
  const walk = driveRoute(problem, r, route, load);
  const fromS = workedS(slot.breaks, slot.startS);
  const dutyS = walk.nowS - fromS;
  const overtimeS = Math.max(0, walk.nowS - workedS(slot.breaks, slot.endS));
  return {
    slot: r,
    stops: walk.stops,
    departS: wallAtStartS(slot.breaks, fromS),
    returnS: wallAtEndS(slot.breaks, walk.nowS),
    driveS: walk.driveS,
    driveM: walk.driveM,
    serviceS: sites.reduce((sum, site) => sum + site.serviceS, 0),
    waitS: walk.waitS,
    dutyS,
    overtimeS,
    load,
    cost: routeCost(problem, slot, sites, { driving: walk.driving, dutyS, overtimeS }),
    refusals: walk.refusals,
  };
}

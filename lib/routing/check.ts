/**
 * Independent plan checker. It shares nothing with the search but the problem's words: it walks
 * every route on the wall clock, second counts and breaks included, and adds the cost up anew.
 * Every plan the engine returns must pass it.
 */
import type { DayWindow, Problem, Routes, Site, Slot } from "./problem";

export type PlanFaultCode =
  | "unknown_site"
  | "visited_twice"
  | "too_many_routes"
  | "frozen_moved"
  | "lock_broken"
  | "skill_missing"
  | "notice"
  | "site_closed"
  | "outside_hours"
  | "outside_shift"
  | "van_full"
  | "stock_short";

export interface PlanFault {
  readonly code: PlanFaultCode;
  readonly slot: number;
  readonly site?: number;
}

export interface PlanCheck {
  readonly faults: readonly PlanFault[];
  /** Whole cost, skipped optional sites included, missed must sites not. */
  readonly cost: number;
  readonly missedMust: number;
}

/** The instant after `workS` seconds of work from `fromS`, standing still in breaks. */
function workFrom(fromS: number, workS: number, breaks: readonly DayWindow[]): number {
  let now = fromS;
  let left = workS;
  for (const pause of breaks) {
    if (left === 0) return now;
    if (pause.closeS <= now) continue;
    const free = pause.openS - now;
    if (free >= left) return now + left;
    if (free > 0) left -= free;
    now = pause.closeS;
  }
  return now + left;
}

function outOfBreak(atS: number, breaks: readonly DayWindow[]): number {
  const pause = breaks.find((p) => p.openS <= atS && atS < p.closeS);
  return pause ? pause.closeS : atS;
}

function secondsOnDuty(fromS: number, toS: number, breaks: readonly DayWindow[]): number {
  let seconds = Math.max(0, toS - fromS);
  for (const pause of breaks) {
    seconds -= Math.max(0, Math.min(toS, pause.closeS) - Math.max(fromS, pause.openS));
  }
  return seconds;
}

function stopCodes(site: Site, slot: Slot, r: number, startS: number): PlanFaultCode[] {
  const codes: PlanFaultCode[] = [];
  const window = site.windows[slot.day];
  if (site.lockedTo !== undefined && site.lockedTo !== r) codes.push("lock_broken");
  if ((site.skills & ~slot.skills) !== 0) codes.push("skill_missing");
  if (slot.day < site.firstDay) codes.push("notice");
  if (!window) codes.push("site_closed");
  else if (startS > window.closeS) codes.push("outside_hours");
  return codes;
}

function visitPrice(problem: Problem, site: Site, slot: Slot): number {
  let price = site.visitCost[slot.day] ?? 0;
  const before = site.previous && problem.slots[site.previous.slot];
  if (site.previous && before) {
    if (before.day !== slot.day) price += site.previous.dayCost;
    if (before.technician !== slot.technician) price += site.previous.technicianCost;
  }
  return price;
}

function vanIsFull(slot: Slot, sites: readonly Site[]): boolean {
  const load = slot.capacity.map((_, type) =>
    sites.reduce((sum, site) => sum + (site.demand[type] ?? 0), 0),
  );
  const total = load.reduce((sum, cells) => sum + cells, 0);
  return total > slot.capacityTotal || load.some((cells, type) => cells > slot.capacity[type]!);
}

/** One route walked on the wall clock: its cost, and its faults pushed to `faults`. */
function walk(problem: Problem, r: number, route: readonly number[], faults: PlanFault[]): number {
  const slot = problem.slots[r]!;
  const { drivingPerS, dutyPerS, perM } = problem.prices;
  let now = slot.startS;
  let at = slot.startPlace;
  let cost = slot.openingCost;
  const drive = (to: number): void => {
    const seconds = problem.travelS[at * problem.places + to]!;
    cost += seconds * drivingPerS + problem.travelM[at * problem.places + to]! * perM;
    now = workFrom(now, seconds, slot.breaks);
    at = to;
  };
  route.forEach((s, k) => {
    const site = problem.sites[s]!;
    drive(site.place);
    now = outOfBreak(Math.max(now, site.windows[slot.day]?.openS ?? 0), slot.breaks);
    if (k >= slot.frozen.length) {
      for (const code of stopCodes(site, slot, r, now)) faults.push({ code, slot: r, site: s });
    }
    cost += visitPrice(problem, site, slot);
    now = workFrom(now, site.serviceS, slot.breaks);
  });
  drive(slot.endPlace);
  if (route.length > slot.frozen.length) {
    if (now > slot.endS + slot.overtimeS) faults.push({ code: "outside_shift", slot: r });
    const sites = route.map((s) => problem.sites[s]!);
    if (vanIsFull(slot, sites)) faults.push({ code: "van_full", slot: r });
  }
  cost += secondsOnDuty(slot.startS, now, slot.breaks) * dutyPerS;
  return cost + secondsOnDuty(slot.endS, now, slot.breaks) * slot.overtimePerS;
}

function skippedCost(problem: Problem, visited: ReadonlySet<number>): [number, number] {
  let cost = 0;
  let missedMust = 0;
  problem.sites.forEach((site, s) => {
    if (visited.has(s)) return;
    if (site.must || site.lockedTo !== undefined) missedMust += 1;
    else cost += site.skipCost;
    cost += site.previous?.dropCost ?? 0;
  });
  return [cost, missedMust];
}

/** Days by whose evening more cells of a type are used up than had come in. */
function stockFaults(problem: Problem, routes: Routes): PlanFault[] {
  const faults: PlanFault[] = [];
  problem.stock?.forEach((byDay, type) => {
    let used = 0;
    byDay.forEach((most, day) => {
      let last = -1;
      problem.slots.forEach((slot, r) => {
        if (slot.day !== day) return;
        const frozen = slot.frozen.length;
        const cells = (routes[r] ?? []).map((site) => problem.sites[site]?.demand[type] ?? 0);
        used += cells.reduce((sum, count) => sum + count, 0);
        if (cells.slice(frozen).some((count) => count > 0)) last = r;
      });
      if (used > most && last >= 0) faults.push({ code: "stock_short", slot: last });
    });
  });
  return faults;
}

/** Checks a plan against every rule and prices it. A sound plan has no faults. */
export function checkPlan(problem: Problem, routes: Routes): PlanCheck {
  const faults: PlanFault[] = [];
  const visited = new Set<number>();
  let cost = 0;
  routes.forEach((route, r) => {
    const slot = problem.slots[r];
    if (!slot) return void faults.push({ code: "too_many_routes", slot: r });
    for (const site of route) {
      if (!problem.sites[site]) faults.push({ code: "unknown_site", slot: r, site });
      if (visited.has(site)) faults.push({ code: "visited_twice", slot: r, site });
      visited.add(site);
    }
    if (slot.frozen.some((site, k) => route[k] !== site)) {
      faults.push({ code: "frozen_moved", slot: r });
    }
    const known = route.filter((site) => problem.sites[site]);
    if (known.length > 0) cost += walk(problem, r, known, faults);
  });
  faults.push(...stockFaults(problem, routes));
  const [skipped, missedMust] = skippedCost(problem, visited);
  return { faults, cost: cost + skipped, missedMust };
}

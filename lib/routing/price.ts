/**
 * The one cost function. Search, screens and reports all price a visit, a leg, a route's end and
 * a site left out through these; only the plan checker has its own copy, on purpose.
 */
import type { Problem, Site, Slot } from "./problem";

/** A route's or a plan's cost by cause, in the problem's cost unit. */
export interface CostParts {
  readonly driving: number;
  readonly duty: number;
  readonly overtime: number;
  readonly opening: number;
  /** Day-dependent visit costs: too early or too late. */
  readonly visits: number;
  /** Changes against the previous plan. */
  readonly changes: number;
  /** Optional sites left out. */
  readonly skipped: number;
  readonly total: number;
}

export const NO_COST: CostParts = {
  driving: 0,
  duty: 0,
  overtime: 0,
  opening: 0,
  visits: 0,
  changes: 0,
  skipped: 0,
  total: 0,
};

/** Adds cost parts, `sign` times the second to the first. */
export function addCosts(a: CostParts, b: CostParts, sign = 1): CostParts {
  return {
    driving: a.driving + sign * b.driving,
    duty: a.duty + sign * b.duty,
    overtime: a.overtime + sign * b.overtime,
    opening: a.opening + sign * b.opening,
    visits: a.visits + sign * b.visits,
    changes: a.changes + sign * b.changes,
    skipped: a.skipped + sign * b.skipped,
    total: a.total + sign * b.total,
  };
}

/** Price of one leg between two places. */
export function legPrice(problem: Problem, from: number, to: number): number {
  const cell = from * problem.places + to;
  const { drivingPerS, perM } = problem.prices;
  return problem.travelS[cell]! * drivingPerS + problem.travelM[cell]! * perM;
}

/** What changing a site's day and technician against the previous plan costs in this slot. */
export function changePrice(problem: Problem, site: Site, slot: Slot): number {
  const before = site.previous && problem.slots[site.previous.slot];
  if (!site.previous || !before) return 0;
  const day = before.day === slot.day ? 0 : site.previous.dayCost;
  const technician = before.technician === slot.technician ? 0 : site.previous.technicianCost;
  return day + technician;
}

/** A site that may not be left out: asked for, or locked by a dispatcher. */
export function isMust(site: Site): boolean {
  return site.must || site.lockedTo !== undefined;
}

/** What leaving the site out costs; a must site's absence has no price, it is a fault. */
export function skipPrice(site: Site): number {
  return (isMust(site) ? 0 : site.skipCost) + (site.previous?.dropCost ?? 0);
}

/**
 * The price of one edit, from the same cost function as the plan: what a dispatcher's act does to
 * cost and hours, and why it cannot be done. Costs O(stops of the touched routes).
 */
import { addCosts, isMust, NO_COST, skipPrice, type CostParts } from "./price";
import type { Problem, Routes } from "./problem";
import { scheduleRoute, slotRefusals, type Refusal, type RouteSchedule } from "./schedule";
import { holdsCells, shortTypes, stockLeft, stockRefusals } from "./stock";

/** `position` counts stops from 0; without it the cheapest place that can be driven is taken. */
export type Edit =
  | {
      readonly kind: "insert";
      readonly site: number;
      readonly slot: number;
      readonly position?: number;
    }
  | {
      readonly kind: "move";
      readonly site: number;
      readonly slot: number;
      readonly position?: number;
    }
  | { readonly kind: "remove"; readonly site: number }
  | { readonly kind: "reorder"; readonly slot: number; readonly order: readonly number[] };

export interface PricedEdit {
  /** The whole plan after the edit. */
  readonly routes: Routes;
  readonly before: readonly RouteSchedule[];
  /** Schedules of the touched slots, in the order of `before`. */
  readonly after: readonly RouteSchedule[];
  /** Change of the plan's cost by cause; negative is cheaper. */
  readonly change: CostParts;
  /** Reasons that the edit brings; faults that were there before are not repeated. */
  readonly refusals: readonly Refusal[];
}

function slotOf(routes: Routes, site: number): number {
  return routes.findIndex((route) => route.includes(site));
}

function withStop(route: readonly number[], site: number, position: number): number[] {
  return [...route.slice(0, position), site, ...route.slice(position)];
}

/** Cheapest position for the site; one that can be driven is preferred to any that cannot. */
function bestPosition(problem: Problem, r: number, route: readonly number[], site: number): number {
  let best = route.length;
  let bestKey: readonly [number, number] = [Infinity, Infinity];
  for (let k = problem.slots[r]!.frozen.length; k <= route.length; k++) {
    const tried = scheduleRoute(problem, r, withStop(route, site, k));
    const key = [tried.refusals.length, tried.cost.total] as const;
    if (key[0] < bestKey[0] || (key[0] === bestKey[0] && key[1] < bestKey[1])) {
      [best, bestKey] = [k, key];
    }
  }
  return best;
}

/** The plan after an edit, whether or not it may be driven. */
export function applyEdit(problem: Problem, routes: Routes, edit: Edit): Routes {
  const full = problem.slots.map((_, r) => routes[r] ?? []);
  if (edit.kind === "reorder") return full.map((x, r) => (r === edit.slot ? edit.order : x));
  // Untouched routes stay the same arrays: touchedSlots need not look into them.
  const without = full.map((route) =>
    route.includes(edit.site) ? route.filter((s) => s !== edit.site) : route,
  );
  if (edit.kind === "remove") return without;
  return without.map((route, r) => {
    if (r !== edit.slot) return route;
    const asked = edit.position ?? bestPosition(problem, r, route, edit.site);
    return withStop(route, edit.site, Math.max(0, Math.min(route.length, asked)));
  });
}

/** Edits that break a dispatcher's own lock or a fixed beginning, or lose and double stops. */
function lockRefusals(problem: Problem, before: Routes, after: Routes, edit: Edit): Refusal[] {
  const refusals: Refusal[] = [];
  problem.slots.forEach((slot, r) => {
    if (slot.frozen.some((s, k) => after[r]?.[k] !== s)) refusals.push({ code: "locked", slot: r });
  });
  if (edit.kind === "remove" && problem.sites[edit.site]?.lockedTo !== undefined) {
    refusals.push({ code: "locked", slot: slotOf(before, edit.site), site: edit.site });
  }
  return refusals;
}

function skipChange(problem: Problem, before: Routes, after: Routes, edit: Edit): CostParts {
  if (edit.kind === "reorder") return NO_COST;
  const was = slotOf(before, edit.site) >= 0 ? 0 : 1;
  const is = slotOf(after, edit.site) >= 0 ? 0 : 1;
  const skipped = (is - was) * skipPrice(problem.sites[edit.site]!);
  return { ...NO_COST, skipped, total: skipped };
}

function touchedSlots(problem: Problem, before: Routes, after: Routes): number[] {
  const all = problem.slots.map((_, r) => r);
  const same = (a: readonly number[] = [], b: readonly number[] = []) =>
    a === b || a.join() === b.join();
  return all.filter((r) => !same(before[r], after[r]));
}

function isNew(refusal: Refusal, before: readonly RouteSchedule[]): boolean {
  const old = before.flatMap((schedule) => schedule.refusals);
  const same = old.filter((o) => o.code === refusal.code && o.slot === refusal.slot);
  return !same.some((o) => o.site === refusal.site && (o.excess ?? 0) >= (refusal.excess ?? 0));
}

/** Prices one edit of a plan and says why it cannot be done, if so. */
export function priceEdit(problem: Problem, routes: Routes, edit: Edit): PricedEdit {
  const next = applyEdit(problem, routes, edit);
  const touched = touchedSlots(problem, routes, next);
  const before = touched.map((r) => scheduleRoute(problem, r, routes[r] ?? []));
  const after = touched.map((r) => scheduleRoute(problem, r, next[r] ?? []));
  const gained = after.reduce((sum, schedule) => addCosts(sum, schedule.cost), NO_COST);
  const net = before.reduce((sum, schedule) => addCosts(sum, schedule.cost, -1), gained);
  const refusals = after.flatMap((schedule) => schedule.refusals);
  return {
    routes: next,
    before,
    after,
    change: addCosts(net, skipChange(problem, routes, next, edit)),
    refusals: [
      ...lockRefusals(problem, routes, next, edit),
      ...refusals.filter((refusal) => isNew(refusal, before)),
      ...stockRefusals(problem, routes, next),
    ],
  };
}

/** Cost of a whole plan by cause. */
export function planCost(problem: Problem, routes: Routes): CostParts {
  const visited = new Set(routes.flat());
  const left = problem.sites.filter((_, s) => !visited.has(s));
  const skipped = left.reduce((sum, site) => sum + skipPrice(site), 0);
  return routes.reduce((sum, route, r) => addCosts(sum, scheduleRoute(problem, r, route).cost), {
    ...NO_COST,
    skipped,
    total: skipped,
  });
}

/** Must sites that no route visits. */
export function missedMust(problem: Problem, routes: Routes): number[] {
  const visited = new Set(routes.flat());
  const all = problem.sites.map((_, s) => s);
  return all.filter((s) => isMust(problem.sites[s]!) && !visited.has(s));
}

export interface LeftOutReasons {
  /** By slot asked: what speaks against it whatever its route. */
  readonly fixed: readonly (readonly Refusal[])[];
  /** Some route could take the site: then it costs more than it saves. */
  readonly fits: boolean;
  /** Cell types of which stores hold too few for the site by the last day. */
  readonly shortTypes: readonly number[];
}

/**
 * Why a site is in no route, as seen beside `routes`. Stops looking at the first route that fits.
 * @param lastDay slots of later days are not asked
 */
export function whyLeftOut(
  problem: Problem,
  routes: Routes,
  site: number,
  lastDay = problem.days,
): LeftOutReasons {
  const asked = problem.slots.flatMap(({ day }, r) => (day <= lastDay ? [r] : []));
  const fixed = asked.map((r) => slotRefusals(problem, site, r));
  const left = stockLeft(problem, routes);
  const fits = asked.some((r, i) => {
    if (fixed[i]!.length > 0 || !holdsCells(problem, left, site, r)) return false;
    const route = routes[r] ?? [];
    const before = scheduleRoute(problem, r, route);
    const position = bestPosition(problem, r, route, site);
    const { refusals: after } = scheduleRoute(problem, r, withStop(route, site, position));
    return !after.some((refusal) => isNew(refusal, [before]));
  });
  return { fixed, fits, shortTypes: fits ? [] : shortTypes(problem, left, site) };
}

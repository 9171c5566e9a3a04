/** What stores hold against what a whole plan takes: the rule that ties all routes together. */
import type { Problem, Routes } from "./problem";
import type { Refusal } from "./schedule";

/** Cells left by type and day once the plan has taken its own; undefined where stock binds nobody. */
export type StockLeft = readonly (readonly number[])[] | undefined;

/** Costs one walk over the plan. A negative entry is a shortage. */
export function stockLeft(problem: Problem, routes: Routes): StockLeft {
  if (!problem.stock) return undefined;
  const left = problem.stock.map((byDay) => [...byDay]);
  routes.forEach((route, r) => {
    for (const s of route) {
      problem.sites[s]!.demand.forEach((cells, type) => {
        for (let day = problem.slots[r]!.day; day < problem.days; day++) left[type]![day]! -= cells;
      });
    }
  });
  return left;
}

/** Whether stores still hold a site's cells on the slot's day and all days after it. */
export function holdsCells(problem: Problem, left: StockLeft, site: number, slot: number): boolean {
  const { day } = problem.slots[slot]!;
  return problem.sites[site]!.demand.every(
    (cells, type) => cells === 0 || !left || left[type]!.slice(day).every((rest) => rest >= cells),
  );
}

/** Types of which the site wants more than stores hold by the last day. */
export function shortTypes(problem: Problem, left: StockLeft, site: number): number[] {
  return problem.sites[site]!.demand.flatMap((cells, type) =>
    left && cells > (left[type]!.at(-1) ?? 0) ? [type] : [],
  );
}

/** The last slot of a day whose free stops take cells of a type, or -1. */
function lastTaker({ slots, sites }: Problem, routes: Routes, day: number, type: number): number {
  return slots.findLastIndex(
    (slot, r) =>
      slot.day === day &&
      (routes[r] ?? []).slice(slot.frozen.length).some((s) => sites[s]!.demand[type]! > 0),
  );
}

/** Shortages that `after` has and `before` had not, or less; each at the last slot of its day. */
export function stockRefusals(problem: Problem, before: Routes, after: Routes): Refusal[] {
  const [was, is] = [stockLeft(problem, before), stockLeft(problem, after)];
  return (is ?? []).flatMap((byDay, type) =>
    byDay.flatMap((left, day): Refusal[] => {
      const slot = lastTaker(problem, after, day, type);
      if (left >= Math.min(0, was![type]![day]!) || slot < 0) return [];
      return [{ code: "stock_short", slot, excess: -left, type }];
    }),
  );
}

import { planFigures, type PlanFigures } from "@/lib/planning/rounds";
import type { Routes } from "@/lib/routing/problem";
import type { OpenPlan } from "./open-plan";
import type { TravelSource } from "./travel-times";

/** What is kept of a plan's cost; the habit's cost comes from the build, which sees all packs. */
export interface StoredPlanCost {
  readonly figures: PlanFigures;
  readonly habit: { readonly minor: number; readonly packs: number } | null;
  readonly travel: TravelSource;
}

/** The cost of a plan after an edit. */
export function planCostOf(before: unknown, open: OpenPlan, routes: Routes): StoredPlanCost {
  return {
    figures: planFigures(open.problem, routes),
    habit: storedCost(before)?.habit ?? null,
    travel: open.travel,
  };
}

/** The stored cost, or null where there is none (a plan that is still being built). */
export function storedCost(cost: unknown): StoredPlanCost | null {
  return cost && typeof cost === "object" && "figures" in cost ? (cost as StoredPlanCost) : null;
}

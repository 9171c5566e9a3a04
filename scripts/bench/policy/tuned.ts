/** The simple policies at their best on training years. */
import { live } from "./live";
import {
  fixedInterval,
  type Inspections,
  inspectionThreshold,
  type Intervals,
} from "./simple-policies";
import type { Start } from "./start";
import { bestInspections, bestIntervals, type TrainingLife } from "./training";
import type { Policy } from "./week";

const ALONG_DAYS = [7, 28, 56];
const STRETCHES = [0.85, 1.15, 1.3];

/** The choice that costs least over all training starts. */
function cheapestOn<T>(
  starts: readonly Start[],
  choices: readonly T[],
  policyOf: (c: T) => Policy,
): T {
  const costs = choices.map((choice) => {
    const policy = policyOf(choice);
    return starts.reduce((sum, start) => sum + live(start, policy).costPerDeviceYear, 0);
  });
  return choices[costs.indexOf(Math.min(...costs))]!;
}

function stretched(days: Intervals["days"], by: number): Map<string, number> {
  return new Map([...days].map(([code, age]) => [code, age * by]));
}

/** Fixed intervals: ages from the lives; then how far ahead to swap along, and all a bit sooner or later. */
export function tunedInterval(starts: readonly Start[], lives: readonly TrainingLife[]): Intervals {
  const days = bestIntervals(lives);
  const along = ALONG_DAYS.map((alongDays) => ({ days, alongDays }));
  const first = cheapestOn(starts, along, fixedInterval);
  const others = STRETCHES.map((by) => ({ ...first, days: stretched(days, by) }));
  return cheapestOn(starts, [first, ...others], fixedInterval);
}

function soonerOrLater(byModel: Inspections["byModel"], by: number): Inspections["byModel"] {
  return new Map(
    [...byModel].map(([code, rule]) => [code, { ...rule, everyDays: rule.everyDays * by }]),
  );
}

/** Inspections: intervals and thresholds from the lives; then as for fixed intervals. */
export function tunedInspection(
  starts: readonly Start[],
  lives: readonly TrainingLife[],
): Inspections {
  const byModel = bestInspections(lives);
  const along = ALONG_DAYS.map((alongDays) => ({ byModel, alongDays }));
  const first = cheapestOn(starts, along, inspectionThreshold);
  const others = STRETCHES.map((by) => ({ ...first, byModel: soonerOrLater(byModel, by) }));
  return cheapestOn(starts, [first, ...others], inspectionThreshold);
}

/**
 * What it costs to shift one job so that it shares a trip with others, and whether to.
 * A job with expected failure cost M(x) at age x, planned cost c_p and a share S of the trip has
 * a best age x* and a long-run cost rate φ*; moving one occurrence by d days costs
 * h(d) = M(x* + d) − M(x*) − d φ*. A group of n jobs saves (n − 1) S.
 * Source: R. E. Wildeman, R. Dekker, A. C. J. M. Smit, A dynamic policy for grouping maintenance
 * activities, European Journal of Operational Research 99 (1997) 530–551.
 */

/** Expected cost of failures until an age, planned cost not included. */
export type ExpectedFailureCost = (age: number) => number;

export interface BestInterval {
  readonly age: number;
  /** Long-run cost a unit of time, φ*. */
  readonly costRate: number;
}

/** Golden-section search of a function with one minimum between two ages. */
function lowest(of: (x: number) => number, low: number, high: number): number {
  const ratio = (Math.sqrt(5) - 1) / 2;
  let [a, b] = [low, high];
  for (let i = 0; i < 200 && b - a > 1e-9 * (1 + Math.abs(a)); i++) {
    const [left, right] = [b - ratio * (b - a), a + ratio * (b - a)];
    if (of(left) < of(right)) b = right;
    else a = left;
  }
  return (a + b) / 2;
}

/** Interval at which one job alone is cheapest: minimises [planned + M(x)] / x up to `longest`. */
export function bestInterval(
  failureCost: ExpectedFailureCost,
  plannedCost: number,
  longest: number,
): BestInterval {
  const rate = (age: number) => (plannedCost + failureCost(age)) / age;
  const age = lowest(rate, longest * 1e-6, longest);
  return { age, costRate: rate(age) };
}

/** h(d): what moving one occurrence by `days` (negative: earlier) costs over doing it at x*. */
export function shiftPenalty(
  failureCost: ExpectedFailureCost,
  best: BestInterval,
  days: number,
): number {
  return failureCost(best.age + days) - failureCost(best.age) - days * best.costRate;
}

/** Whether jobs moved at these penalties are worth one trip together: (n − 1) S > Σ h. */
export function worthGrouping(tripShare: number, penalties: readonly number[]): boolean {
  return (penalties.length - 1) * tripShare > penalties.reduce((sum, h) => sum + h, 0);
}

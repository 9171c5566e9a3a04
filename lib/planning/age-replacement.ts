/**
 * Age replacement: the age at which a part is best renewed when a planned renewal costs less than
 * a failure. Minimises [c_p R(T) + c_f F(T)] / ∫₀ᵀ R over T.
 * Source: R. E. Barlow, F. Proschan, Mathematical Theory of Reliability, 1965.
 */

/** Probability of having failed by an age. */
export type FailureByAge = (age: number) => number;

export interface RenewalPrices {
  /** A planned renewal. */
  readonly planned: number;
  /** A renewal after a failure, everything that the failure brings included. */
  readonly failed: number;
}

export interface AgeReplacement {
  /** Best age, in the unit of the distribution; Infinity when waiting for the failure is best. */
  readonly age: number;
  /** Long-run cost a unit of time at that age. */
  readonly costRate: number;
  /** The same when every part runs to failure. */
  readonly runToFailureRate: number;
}

/** Panels of Simpson's rule up to the longest life considered. */
const STEPS = 4000;

interface Curve {
  readonly ages: readonly number[];
  /** Expected time in service of a part renewed at each age. */
  readonly service: readonly number[];
}

function serviceCurve(failedBy: FailureByAge, longest: number): Curve {
  const step = longest / STEPS;
  const ages = [0];
  const service = [0];
  for (let i = 1; i <= STEPS; i++) {
    const from = (i - 1) * step;
    const mean =
      (1 - failedBy(from) + 4 * (1 - failedBy(from + step / 2)) + 1 - failedBy(from + step)) / 6;
    ages.push(from + step);
    service.push(service[i - 1]! + mean * step);
  }
  return { ages, service };
}

/**
 * Best renewal age of a life distribution.
 * @param longest an age that practically no part reaches
 */
export function bestAge(
  failedBy: FailureByAge,
  prices: RenewalPrices,
  longest: number,
): AgeReplacement {
  const { ages, service } = serviceCurve(failedBy, longest);
  const rate = (i: number) => {
    const failed = failedBy(ages[i]!);
    return (prices.planned * (1 - failed) + prices.failed * failed) / service[i]!;
  };
  let best = 1;
  for (let i = 2; i <= STEPS; i++) if (rate(i) < rate(best)) best = i;
  const runToFailureRate = prices.failed / service[STEPS]!;
  // Beyond the longest lives the rate is flat; what is left of its fall is rounding.
  const waits = best >= STEPS - 1 || rate(best) > runToFailureRate * (1 - 1e-9);
  if (waits) return { age: Infinity, costRate: runToFailureRate, runToFailureRate };
  const [a, b, c] = [rate(best - 1), rate(best), rate(best + 1)] as const;
  // The parabola through the three lowest points finds the minimum between grid ages.
  const shift = a + c > 2 * b ? (a - c) / (2 * (a - 2 * b + c)) : 0;
  return {
    age: ages[best]! + shift * (longest / STEPS),
    costRate: b - ((c - a) * shift) / 4,
    runToFailureRate,
  };
}

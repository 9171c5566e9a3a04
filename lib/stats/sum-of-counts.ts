/**
 * Distribution of a sum of independent counts, each with its own law: the Poisson-binomial
 * distribution (poisson-binomial.ts) where an event may count for more than one, or happen more
 * than once. Exact, by convolving one law after another.
 * Source: the definition.
 */

/** One count: `step` times k, with probability `chances[k]`; they sum to 1. */
export interface CountLaw {
  readonly step: number;
  readonly chances: readonly number[];
}

/** Probability below which the far end of the distribution is not carried along. */
const NEGLIGIBLE = 1e-12;

function greatestCommonDivisor(a: number, b: number): number {
  return b === 0 ? a : greatestCommonDivisor(b, a % b);
}

function checkLaw({ step, chances }: CountLaw, at: number): void {
  if (!Number.isInteger(step) || step < 1) throw new RangeError(`step ${at} is ${step}`);
  const total = chances.reduce((sum, chance) => sum + chance, 0);
  if (chances.some((chance) => !(chance >= 0)) || Math.abs(total - 1) > 1e-9) {
    throw new RangeError(`chances ${at} are not probabilities that sum to 1`);
  }
}

/** Adds one count: mass'[n] = Σ_k chances[k] · mass[n − k·stride], from the top down. */
function convolve(mass: Float64Array, top: number, stride: number, chances: readonly number[]) {
  const end = top + stride * (chances.length - 1);
  for (let n = end; n >= 0; n--) {
    let sum = 0;
    for (let k = 0; k < chances.length; k++) {
      const from = n - k * stride;
      if (from < 0) break;
      if (from <= top) sum += chances[k]! * mass[from]!;
    }
    mass[n] = sum;
  }
  let last = end;
  while (last > 0 && mass[last]! < NEGLIGIBLE) last--;
  return last;
}

export interface SumOfCounts {
  /** The sum is a multiple of it. */
  readonly unit: number;
  /** P(sum = k · unit). */
  readonly mass: Float64Array;
}

/** @throws RangeError when a law's chances do not sum to 1 or its step is no whole number > 0 */
export function sumOfCounts(laws: readonly CountLaw[]): SumOfCounts {
  laws.forEach(checkLaw);
  const moving = laws.filter((law) => law.chances.slice(1).some((chance) => chance > 0));
  const unit = moving.reduce((gcd, law) => greatestCommonDivisor(gcd, law.step), 0) || 1;
  const most = moving.reduce((sum, law) => sum + (law.step / unit) * (law.chances.length - 1), 0);
  const mass = new Float64Array(most + 1);
  mass[0] = 1;
  let top = 0;
  for (const { step, chances } of moving) top = convolve(mass, top, step / unit, chances);
  return { unit, mass: mass.slice(0, top + 1) };
}

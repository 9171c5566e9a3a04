/**
 * The distribution of the day on which a pack stops its device, as a forecast gives it: quantiles
 * at the probabilities 0.01, 0.03, ... 0.99. Each stands for an equal share of what may happen,
 * so an expectation is a plain mean over them (midpoint rule).
 */
import type { EpochDays } from "@/lib/units";

/** Ascending quantiles at (i + ½) / n; a forecast has n = 50. */
export type LifeQuantiles = readonly EpochDays[];

/** Expected value of a function of the day on which the device stops. */
export function expectation(life: LifeQuantiles, of: (stopsAt: EpochDays) => number): number {
  return life.reduce((sum, stopsAt) => sum + of(stopsAt), 0) / life.length;
}

const running = new WeakMap<LifeQuantiles, Float64Array>();

/** Running sums of the quantiles, made once for each life. */
function runningSums(life: LifeQuantiles): Float64Array {
  const known = running.get(life);
  if (known) return known;
  const sums = new Float64Array(life.length + 1);
  life.forEach((day, i) => (sums[i + 1] = sums[i]! + day));
  running.set(life, sums);
  return sums;
}

/** Sum of the quantiles from index `from` up to, not including, `to`. */
export function sumBetween(life: LifeQuantiles, from: number, to: number): EpochDays {
  const sums = runningSums(life);
  return sums[to]! - sums[from]!;
}

/** Quantiles at or before a day, by bisection. */
export function countUpTo(life: LifeQuantiles, day: EpochDays): number {
  let low = 0;
  let high = life.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (life[middle]! <= day) low = middle + 1;
    else high = middle;
  }
  return low;
}

/**
 * Probability of being out by a day: linear between quantiles, held at the outermost
 * probabilities' midpoints beyond them (0 before the first less half a step, 1 after the last).
 */
export function chanceOutBy(life: LifeQuantiles, day: EpochDays): number {
  const n = life.length;
  const passed = countUpTo(life, day);
  if (passed === 0) return 0;
  if (passed === n) return 1;
  const [before, after] = [life[passed - 1]!, life[passed]!];
  const part = after > before ? (day - before) / (after - before) : 1;
  return (passed - 0.5 + part) / n;
}

/** Expected day on which the device stops. */
export function meanLife(life: LifeQuantiles): EpochDays {
  return sumBetween(life, 0, life.length) / life.length;
}

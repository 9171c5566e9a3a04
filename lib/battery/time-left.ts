/**
 * Time left as mass over days, counted on an even clock: mean rate, warmest end depth. Each cell of
 * the filter's grid has a time left at its own rate; the draw may still wander, and the depth at
 * which this device stops is not known to the last percent.
 */
import { ASSUMED } from "./assumptions";
import { DAYS_PER_YEAR } from "./climate";
import type { Filtered } from "./filter";

const BINS = 240;
const IGNORED = 1e-8;
/** Slower than this a pack outlasts every horizon; keeps idle packs finite. */
const SLOWEST_PER_DAY = 1 / (4 * ASSUMED.horizonDays);
const LONGEST_DAYS = 4 * ASSUMED.horizonDays;
/** Nodes and weights of a 7-point normal: equal spacing, moments 0..2 exact to 1 %. */
const SPREAD_Z = [-2.4, -1.6, -0.8, 0, 0.8, 1.6, 2.4] as const;
const SPREAD_W = [0.018, 0.0892, 0.2328, 0.32, 0.2328, 0.0892, 0.018] as const;
/** A season's draw differs from the year's for about this long. */
const SEASON_DAYS = 90;

/** Mass over days left, counted from the moment the grid stands at. */
export interface TimeLeft {
  readonly mass: Float64Array;
  readonly from: number;
  readonly step: number;
  /** Mean share consumed per day until the end, in all and by the draw alone. */
  readonly ratePerDay: number;
  readonly drawPerDay: number;
}

/** Time left of a filtered pack, the end depth unknown by `endSd` (one standard deviation). */
export function timeLeftOf(filtered: Filtered, endSd: number): TimeLeft {
  return widen(collect(filtered), endSd);
}

export function cumulative(mass: Float64Array): Float64Array {
  let sum = 0;
  return mass.map((m) => (sum += m));
}

/** Days left at a probability: each bin's mass lies evenly around its middle. */
export function daysAt(left: TimeLeft, sums: Float64Array, probability: number): number {
  const target = probability * sums[BINS - 1]!;
  let low = 0;
  let high = BINS - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (sums[middle]! >= target && sums[middle]! > 0) high = middle;
    else low = middle + 1;
  }
  const m = left.mass[low]!;
  const part = m > 0 ? (target - (sums[low]! - m)) / m : 0;
  return left.from + (low - 0.5 + part) * left.step;
}

/** Mass of less than so many days left. */
export function massBelow(left: TimeLeft, days: number): number {
  const place = (days - left.from) / left.step + 0.5;
  if (!(place > 0)) return 0;
  const whole = Math.min(left.mass.length, Math.floor(place));
  let sum = 0;
  for (let i = 0; i < whole; i++) sum += left.mass[i]!;
  if (whole < left.mass.length) sum += (place - whole) * left.mass[whole]!;
  return Math.min(1, sum);
}

/** Days left of every grid cell, (end - depth) / rate, as a histogram. */
function collect({ model, grid, end }: Filtered): TimeLeft {
  const leak = model.leakPerDay * model.site.ageing.meanFactor;
  const draws = grid.rate.map((rate) => Math.max(SLOWEST_PER_DAY, model.drawPerDay * rate));
  const joint = new Float64Array(grid.nr * grid.nx);
  for (let from = 0; from < grid.p.length; from += joint.length) {
    for (let k = 0; k < joint.length; k++) joint[k]! += grid.p[from + k]!;
  }
  const days = new Float64Array(joint.length);
  let from = Infinity;
  let to = -Infinity;
  let meanDraw = 0;
  let meanLeak = 0;
  for (let k = 0; k < joint.length; k++) {
    const draw = draws[Math.floor(k / grid.nx)]!;
    const depth = grid.depthFrom + (k % grid.nx) * grid.depthStep;
    const t = timeLeft(depth, end.warm, draw, leak);
    days[k] = Math.max(-LONGEST_DAYS, Math.min(LONGEST_DAYS, t));
    meanDraw += joint[k]! * draw;
    meanLeak += joint[k]! * leak * Math.max(0, 1 - (depth + end.warm) / 2);
    if (joint[k]! < IGNORED) continue;
    from = Math.min(from, days[k]!);
    to = Math.max(to, days[k]!);
  }
  const step = Math.max((to - from) / (BINS - 1), 1e-3);
  const mass = new Float64Array(BINS);
  for (let k = 0; k < joint.length; k++) deposit(mass, (days[k]! - from) / step, joint[k]!);
  return { mass, from, step, ratePerDay: meanDraw + meanLeak, drawPerDay: meanDraw };
}

/**
 * Days from a depth to the end depth: the solution of dx/dt = draw + leak (1 - x). Past the
 * end it counts back at the rate held there.
 */
function timeLeft(depth: number, end: number, draw: number, leak: number): number {
  const room = end - depth;
  const rate = draw + leak * Math.max(0, 1 - end);
  if (room <= 0 || leak * room < 1e-6 * rate) return room / rate;
  return Math.log1p((leak * room) / rate) / leak;
}

/** Split a mass between the two nearest bins; beyond the ends it goes to the last. */
function deposit(mass: Float64Array, place: number, amount: number): void {
  if (amount === 0) return;
  const inside = Math.min(mass.length - 1, Math.max(0, place));
  const low = Math.min(mass.length - 2, Math.floor(inside));
  mass[low]! += amount * (1 - (inside - low));
  mass[low + 1]! += amount * (inside - low);
}

/**
 * Widen by the draw's walk still to come (the mean of a random walk over T has variance
 * T/3 of its yearly one) and by the unknown depth at which this device stops.
 */
function widen(left: TimeLeft, endSd: number): TimeLeft {
  const endDays = endSd / left.ratePerDay;
  const spread = (t: number): number => {
    if (t <= 0) return endDays;
    const season = ASSUMED.seasonalDrawSd * Math.min(1, SEASON_DAYS / t);
    const drift = ASSUMED.drawWalkPerYear * Math.sqrt(t / DAYS_PER_YEAR / 3);
    const walk = Math.hypot(season, drift) * t;
    return Math.hypot(Math.min(walk, 0.4 * t), endDays);
  };
  const last = left.from + left.step * (BINS - 1);
  const from = left.from - 2.4 * endDays;
  const step = (last + 2.4 * spread(last) - from) / (BINS - 1);
  const mass = new Float64Array(BINS);
  for (let i = 0; i < BINS; i++) {
    if (left.mass[i] === 0) continue;
    const t = left.from + i * left.step;
    const sd = spread(t);
    for (let z = 0; z < SPREAD_Z.length; z++) {
      deposit(mass, (t + SPREAD_Z[z]! * sd - from) / step, left.mass[i]! * SPREAD_W[z]!);
    }
  }
  return { ...left, mass, from, step };
}

/**
 * What packs that ran out teach about their cells' voltage curve. Once the day a pack stopped
 * is known, so is where on its life each of its readings stood; the readings of many packs then
 * show where the published curve errs for these cells under this device, how much the
 * resistance really grows, and how far single packs scatter around both.
 *
 * Residuals are averaged over depth by a normal kernel, first over all packs of a chemistry,
 * then what is left of them over each cohort; both are drawn towards nothing learned by the
 * spread that the table was given (empirical Bayes with known variances). Residuals beyond four
 * spreads are slips and left out.
 */
import type { EpochDays } from "../units";
import { poolGroups } from "../stats/shrinkage";
import { ASSUMED } from "./assumptions";
import { CURVES } from "./curve-tables";
import { atDepth } from "./curves";
import { freshDropMv } from "./cutoff";
import { DAYS_PER_YEAR } from "./climate";
import { type Spent, depthAfter, paceTold } from "./end-lesson";
import type { CurveLesson, PackReading } from "./pack";
import { type PackModel, resistanceAge } from "./pack-model";

/** Depths of a lesson: 0, 1/20 ... 1. */
const NODES = 21;
/** Width of the kernel over depth, one standard deviation. */
const KERNEL = 0.04;
/** A lesson wants at least this many packs. */
const LEAST_PACKS = 3;
/** Residuals further out than this many robust spreads are slips. */
const SLIP = 4;
/** How far the draw's course may have bent a pack's way through its depths, at mid-life. */
const COURSE_SD = 0.03;
/**
 * A lesson leaves at least this share of the table's own spread: all but a tenth where packs
 * live a year or less, half from two years on. Packs of the same months share their weather,
 * and agree with each other more than the next ones will with them.
 */
const leastShare = (years: number): number => Math.min(0.9, Math.max(0.5, 1.3 - 0.4 * years));
/** Spread of readings around their pack's curve at least, beside that between packs. */
const WITHIN_SHARE = 0.5;
/** Share of the table's own spread by which cohorts differ from each other. */
const COHORT_SHARE = 0.6;

/** A pack that came out, prepared; those swapped early teach nothing here. */
export interface TaughtBy {
  readonly history: {
    readonly cohort: string;
    readonly readings: readonly PackReading[];
    readonly ranOut: boolean;
  };
  readonly spent: Spent;
}

/** One reading of a finished pack, as a residual. */
interface Residual {
  readonly cohort: string;
  readonly pack: number;
  readonly depth: number;
  readonly value: number;
  readonly variance: number;
}

/** A finished pack placed on its depth axis. */
interface Placed {
  readonly cohort: string;
  readonly readings: readonly PackReading[];
  readonly index: number;
  readonly stoppedAt: EpochDays;
  readonly model: PackModel;
  /** How surely its pace is known, one standard deviation of ln(pace). */
  readonly paceSd: number;
  depthAt(at: EpochDays): number;
}

/**
 * Lessons by cohort, and under null what all cohorts share; packs must be of one chemistry.
 * `endOf` is each cohort's factor on the resistance at the end.
 */
export function learnCurves(
  packs: readonly TaughtBy[],
  endOf: (cohort: string) => number,
): Map<string | null, CurveLesson> {
  const placed = packs
    .filter(({ history }) => history.ranOut)
    .map((pack, index) => place(pack, index, endOf(pack.history.cohort)));
  if (placed.length < LEAST_PACKS) return new Map();
  const { ownSpreadMv: spreadMv } = CURVES[placed[0]!.model.pack.cell.chemistry];
  const days = placed.reduce((s, p) => s + p.stoppedAt - p.model.pack.installedAt, 0);
  const share = leastShare(days / placed.length / DAYS_PER_YEAR);
  const rest = layered(placed.flatMap(restResiduals), spreadMv, share);
  const grown = layered(
    placed.flatMap((p) => loadResiduals(p, rest.shiftOf(p.cohort))),
    ASSUMED.resistanceSd,
    share,
  );
  const lesson = (cohort: string | null): CurveLesson => ({
    restShiftMv: rest.shiftOf(cohort),
    resistanceFactor: grown.shiftOf(cohort).map((x) => Math.exp(x)),
    spreadMv: rest.between,
    noiseMv: rest.within,
    resistanceSd: grown.between,
    packs: placed.filter((p) => cohort === null || p.cohort === cohort).length,
  });
  const cohorts = new Set<string | null>([null, ...placed.map((p) => p.cohort)]);
  return new Map([...cohorts].map((cohort) => [cohort, lesson(cohort)]));
}

/** Depth runs at one pace from the start to where such packs stop. */
function place({ history, spent }: TaughtBy, index: number, endFactor: number): Placed {
  const { model, outAt } = spent;
  const told = paceTold(spent, endFactor);
  const pace = Math.exp(told.lnPace);
  return {
    cohort: history.cohort,
    readings: history.readings,
    index,
    stoppedAt: outAt,
    model,
    paceSd: told.sd,
    depthAt: (at) => depthAfter(spent, pace, at),
  };
}

const counts = (placed: Placed, kind: PackReading["kind"]): PackReading[] =>
  placed.readings.filter(
    (r) =>
      r.kind === kind &&
      r.at > placed.model.pack.installedAt &&
      r.at < placed.stoppedAt &&
      r.millivolts > 0,
  );

/** Variance of a resting voltage of one element at a depth, apart from the curve's own error. */
function restVariance(
  { stoppedAt, model, paceSd }: Placed,
  reading: PackReading,
  depth: number,
): number {
  const { curve, pack } = model;
  const life = (reading.at - pack.installedAt) / (stoppedAt - pack.installedAt);
  const course = 2 * COURSE_SD * Math.sqrt(Math.max(0, life * (1 - life)));
  const reach = 0.02;
  const fall = atDepth(curve.restMv, depth - reach) - atDepth(curve.restMv, depth + reach);
  const bent = (fall / (2 * reach)) * Math.hypot(course, paceSd * depth, ASSUMED.curveDepthSd);
  const warmth = reading.temperatureDc === null ? ASSUMED.temperatureSdK : 1;
  const accuracy = (reading.accuracyMv ?? ASSUMED.accuracyMv) / curve.restScale;
  const drift = (curve.driftMvPerKelvin / curve.restScale) * warmth;
  return accuracy ** 2 + bent ** 2 + drift ** 2 + 1;
}

function temperatureOf(model: PackModel, reading: PackReading): number {
  return reading.temperatureDc ?? model.site.at(reading.at);
}

function restResiduals(placed: Placed): Residual[] {
  const { model, cohort, index } = placed;
  const { curve } = model;
  return counts(placed, "resting").map((reading) => {
    const depth = placed.depthAt(reading.at);
    const drift = curve.driftMvPerKelvin * (temperatureOf(model, reading) / 10 - 20);
    const value = (reading.millivolts - drift) / curve.restScale - atDepth(curve.restMv, depth);
    const variance = restVariance(placed, reading, depth);
    return { cohort, pack: index, depth, value, variance };
  });
}

/** ln(fall under load over the sheet's); near 0 taken as fall ratio less 1. */
function loadResiduals(placed: Placed, shift: readonly number[]): Residual[] {
  const { model, cohort, index } = placed;
  const { curve, pack } = model;
  return counts(placed, "loaded").flatMap((reading) => {
    const depth = placed.depthAt(reading.at);
    const dc = temperatureOf(model, reading);
    const fresh = freshDropMv(pack, curve, reading.loadUa ?? model.peakUa, dc);
    const drop = fresh * resistanceAge(model, reading.at) * atDepth(curve.resistance, depth);
    const drift = curve.driftMvPerKelvin * (dc / 10 - 20);
    const rest = atDepth(curve.restMv, depth) + at(shift, depth);
    const ratio = (curve.restScale * rest + drift - reading.millivolts) / drop;
    const noise = (Math.sqrt(restVariance(placed, reading, depth)) * curve.restScale) / drop;
    // a fall hidden in the noise tells nothing of the resistance
    if (!(noise < 1)) return [];
    const value = Math.log(Math.min(5, Math.max(0.2, ratio)));
    const variance = noise ** 2 / Math.max(0.25, ratio * ratio);
    return [{ cohort, pack: index, depth, value, variance }];
  });
}

/** Value of a lesson's table at a depth, between its nodes. */
function at(nodes: readonly number[], depth: number): number {
  const place = Math.min(1, Math.max(0, depth)) * (nodes.length - 1);
  const low = Math.min(nodes.length - 2, Math.floor(place));
  return nodes[low]! + (place - low) * (nodes[low + 1]! - nodes[low]!);
}

interface Layered {
  shiftOf(cohort: string | null): number[];
  /** Spread of packs around their cohort's curve, and of readings around their pack's. */
  readonly between: number;
  readonly within: number;
}

const FLAT: readonly number[] = Array.from({ length: NODES }, () => 0);

/** Smooth over all, then what is left over each cohort. */
function layered(residuals: readonly Residual[], spread: number, share: number): Layered {
  const all = smooth(withoutSlips(residuals, FLAT), FLAT, spread);
  const own = new Map<string, number[]>();
  const left: Residual[] = [];
  for (const [cohort, group] of groupsOf(residuals, (r) => r.cohort)) {
    const kept = withoutSlips(group, all);
    const shift = smooth(kept, all, COHORT_SHARE * spread);
    own.set(cohort, shift);
    left.push(...kept.map((r) => ({ ...r, value: r.value - at(shift, r.depth) })));
  }
  const { between, within } = scatter(left, spread, share * spread);
  return { shiftOf: (cohort) => own.get(cohort ?? "") ?? all, between, within };
}

function groupsOf<Key>(
  residuals: readonly Residual[],
  key: (r: Residual) => Key,
): Map<Key, Residual[]> {
  const groups = new Map<Key, Residual[]>();
  for (const r of residuals) {
    const group = groups.get(key(r));
    if (group) group.push(r);
    else groups.set(key(r), [r]);
  }
  return groups;
}

/** Leave out what lies beyond four robust spreads of its kind. */
function withoutSlips(residuals: readonly Residual[], base: readonly number[]): Residual[] {
  const off = (r: Residual): number => (r.value - at(base, r.depth)) / Math.sqrt(r.variance);
  const sorted = residuals.map(off).sort((a, b) => a - b);
  const middle = sorted[sorted.length >> 1] ?? 0;
  const away = sorted.map((x) => Math.abs(x - middle)).sort((a, b) => a - b);
  const limit = SLIP * Math.max(1, 1.4826 * (away[away.length >> 1] ?? 0));
  return residuals.filter((r) => Math.abs(off(r) - middle) <= limit);
}

/** Kernel mean at each node of what stands above `base`, drawn to 0 by `spread`. */
function smooth(residuals: readonly Residual[], base: readonly number[], spread: number): number[] {
  return base.map((from, n) => {
    const depth = n / (NODES - 1);
    let sum = 0;
    let weight = 0;
    for (const r of residuals) {
      const kernel = Math.exp(-0.5 * ((r.depth - depth) / KERNEL) ** 2);
      if (kernel < 1e-4) continue;
      // readings of one pack share its own error: none weighs more than that allows
      const w = kernel / (r.variance + spread ** 2);
      sum += w * (r.value - at(base, r.depth));
      weight += w;
    }
    return from + sum / (weight + 1 / spread ** 2);
  });
}

/**
 * Spread of readings around their own pack's curve, and of packs around the cohort's: both by
 * DerSimonian and Laird's moments, floored, for a small sample may show none.
 */
function scatter(
  left: readonly Residual[],
  spread: number,
  least: number,
): { between: number; within: number } {
  const packs = [...groupsOf(left, (r) => r.pack).values()].filter((group) => group.length > 1);
  const extra = packs.map(excess).reduce((a, b) => [a[0] + b[0], a[1] + b[1]], [0, 0] as const);
  const within = extra[1] > 0 ? Math.sqrt(Math.max(0, extra[0] / extra[1])) : spread;
  const means = packs.map((group) => {
    const weights = group.map((r) => 1 / (r.variance + within ** 2));
    const total = weights.reduce((a, b) => a + b, 0);
    return {
      mean: group.reduce((s, r, i) => s + weights[i]! * r.value, 0) / total,
      se: 1 / Math.sqrt(total),
    };
  });
  const between = Math.sqrt(poolGroups(means)?.tau2 ?? spread ** 2);
  return {
    between: Math.max(least, between),
    within: Math.max(WITHIN_SHARE * least, within),
  };
}

/** Chi squared beyond its degrees of freedom, and what one unit of variance would add to it. */
function excess(group: readonly Residual[]): readonly [number, number] {
  const weights = group.map((r) => 1 / r.variance);
  const total = weights.reduce((a, b) => a + b, 0);
  const mean = group.reduce((s, r, i) => s + weights[i]! * r.value, 0) / total;
  const chi = group.reduce((s, r, i) => s + weights[i]! * (r.value - mean) ** 2, 0);
  const squares = weights.reduce((s, w) => s + w * w, 0);
  return [chi - (group.length - 1), total - squares / total];
}

/**
 * What one voltage says: the likelihood of a reading over the grid, with an outlier mixture
 * so that no reading is thrown away and none can break the forecast.
 *
 *   p(v | x, b) = (1 - e) N(v; V(x) + b, s(x)) + e / range
 *
 * s joins the instrument, where the curve lies on the depth axis, the resistance of a loaded
 * pack and an unmeasured temperature. The weight reported is the posterior probability of
 * the first term.
 */
import { ASSUMED } from "./assumptions";
import { CURVE_STEPS } from "./curves";
import { freshDropMv } from "./cutoff";
import { type Grid, normalise } from "./grid";
import type { ResistanceBelief } from "./end-of-life";
import type { PackReading, ReadingWeight } from "./pack";
import { type PackModel, resistanceAge } from "./pack-model";

/** Half the span over which the curve's slope is taken, in table steps: 1 % of depth. */
const SLOPE_STEPS = 5;
const Z90 = 1.6448536269514722;
/** A mass below this is brought back to 1 before it can vanish. */
const FAINT = 1e-60;

/** Highest voltage the pack could show with the widest margin, mV. */
export function impossibleAboveMv(model: PackModel): number {
  return model.curve.restScale * model.curve.restMv[0]! * ASSUMED.impossibleShare;
}

type Circumstances = Pick<PackReading, "at" | "kind" | "loadUa" | "temperatureDc" | "accuracyMv">;

/** Mean (nodeA) and variance (nodeB) of a reading at every depth node, offset aside; mV. */
function expectAt(
  model: PackModel,
  grid: Grid,
  reading: Circumstances,
  belief: ResistanceBelief,
): void {
  const { curve, pack } = model;
  const { nodeA: mean, nodeB: variance } = grid;
  const dc = reading.temperatureDc ?? model.site.at(reading.at);
  const ua = reading.kind === "loaded" ? (reading.loadUa ?? model.peakUa) : 0;
  const aged = resistanceAge(model, reading.at) * belief.mean;
  const drop = freshDropMv(pack, curve, ua, dc) * aged;
  const unsure = belief.sd / belief.mean;
  const drift = curve.driftMvPerKelvin * (dc / 10 - 20);
  const fixed = fixedVariance(model, grid, reading);
  const { restMv, resistance, restScale } = curve;
  const last = CURVE_STEPS - 1;
  const reach = SLOPE_STEPS;
  const depthSd = (ASSUMED.curveDepthSd * (last + 1)) / (2 * reach);
  for (let i = 0; i < grid.nx; i++) {
    const place = (grid.depthFrom + i * grid.depthStep) * (last + 1);
    const k = Math.min(last, Math.max(0, Math.floor(place)));
    const part = Math.min(1, Math.max(0, place - k));
    const rest = restMv[k]! + part * (restMv[k + 1]! - restMv[k]!);
    const drops = drop * (resistance[k]! + part * (resistance[k + 1]! - resistance[k]!));
    const a = Math.max(0, k - reach);
    const b = Math.min(last + 1, k + reach);
    const fall = restScale * (restMv[a]! - restMv[b]!) + drop * (resistance[b]! - resistance[a]!);
    mean[i] = restScale * rest + drift - drops;
    variance[i] = fixed + (fall * depthSd) ** 2 + (unsure * drops) ** 2;
  }
}

/** How well the temperature of a reading is known, K. */
function warmthSdK({ site }: PackModel, { temperatureDc, at }: Circumstances): number {
  if (temperatureDc !== null) return 1;
  return site.logged(at) === null ? ASSUMED.temperatureSdK : ASSUMED.loggedTemperatureSdK;
}

/** The part of a reading's variance that does not depend on depth, mV². */
function fixedVariance(model: PackModel, grid: Grid, reading: Circumstances): number {
  const warmth = warmthSdK(model, reading);
  const accuracy = reading.accuracyMv ?? ASSUMED.accuracyMv;
  return (
    accuracy ** 2 +
    grid.offsetStepMv ** 2 / 12 +
    model.noiseMv ** 2 +
    (model.curve.driftMvPerKelvin * warmth) ** 2 +
    1e-6
  );
}

/**
 * 5th, 50th and 95th percentile of a voltage to be read, mV, after `expectAt`; wants the depth
 * marginal in `nodeC`.
 */
function expectedBand(grid: Grid): [number, number, number] {
  const marginal = grid.nodeC;
  let total = 0;
  for (let i = 0; i < grid.nx; i++) total += marginal[i]!;
  const mean = grid.nodeA;
  let low = mean[0]!;
  let middle = 0;
  let high = low;
  let sum = 0;
  for (let i = 0; i < grid.nx; i++) {
    if (sum <= 0.05 * total) high = mean[i]!;
    if (sum <= 0.5 * total) middle = i;
    if (sum <= 0.95 * total) low = mean[i]!;
    sum += marginal[i]!;
  }
  const noise = Z90 * Math.sqrt(grid.nodeB[middle]! + 0.5 * grid.offsetStepMv ** 2);
  const centre = mean[middle]!;
  return [
    centre - Math.hypot(low - centre, noise),
    centre,
    centre + Math.hypot(high - centre, noise),
  ];
}

/** What is known of a reading beforehand. */
export interface Standing {
  /** Chance that it is the film's, if it is low. */
  readonly film: number;
  /** By how many readings its errors are shared, itself counted in. */
  readonly shared: number;
}

/** Update the grid by one reading (depth marginal in `nodeC`); says how much it counted and why. */
export function observe(
  model: PackModel,
  grid: Grid,
  reading: PackReading,
  resistance: ResistanceBelief,
  { film, shared }: Standing,
): ReadingWeight {
  expectAt(model, grid, reading, resistance);
  const [low, middle, high] = expectedBand(grid);
  // the film only ever lowers a voltage: a higher one is the cell's own
  const dip = reading.millivolts < middle ? film : 0;
  const slip = Math.max(ASSUMED.outlierShare, dip);
  const outlier = slip / impossibleAboveMv(model);
  const weight = multiply(grid, reading.millivolts, { slip, outlier, power: 1 / shared });
  const doubted = dip > ASSUMED.outlierShare ? "passivation" : "doubtful";
  const reason = weight >= 0.5 ? "fits" : doubted;
  return {
    readingId: reading.id,
    weight,
    expectedMv: middle,
    expectedLowMv: low,
    expectedHighMv: high,
    reason,
  };
}

interface Mixture {
  readonly slip: number;
  /** Density of a slip, per mV. */
  readonly outlier: number;
  /** Exponent of the likelihood: 1 for a witness of its own. */
  readonly power: number;
}

/** Multiply by the mixture likelihood; returns the weight of its first term. */
function multiply(grid: Grid, millivolts: number, by: Mixture): number {
  const { p, nx, nr, no, nodeA: mean, nodeB: variance, nodeC: fit, rowMass } = grid;
  const { slip, outlier, power } = by;
  const share = (1 - slip) / Math.sqrt(2 * Math.PI);
  let fitting = 0;
  let total = 0;
  for (let o = 0; o < no; o++) {
    const offset = millivolts - grid.offsetMv[o]!;
    for (let i = 0; i < nx; i++) {
      const off = offset - mean[i]!;
      const v = variance[i]!;
      fit[i] = (share * Math.exp((-0.5 * off * off) / v)) / Math.sqrt(v);
    }
    for (let row = o * nr; row < (o + 1) * nr; row++) {
      if (rowMass[row] === 0) continue;
      for (let i = 0, k = row * nx; i < nx; i++, k++) {
        const m = p[k]!;
        const fits = m * fit[i]!;
        const all = fits + m * outlier;
        fitting += fits;
        total += all;
        p[k] = all;
      }
    }
    if (power < 1) temper(grid, o, outlier, power);
  }
  if (total < FAINT || power < 1) normalise(grid);
  return total > 0 ? Math.min(1, fitting / total) : 0;
}

/** Takes the likelihood of one offset, its densities in `nodeC`, to a power, having been multiplied. */
function temper({ p, nx, nr, nodeC: fit }: Grid, o: number, outlier: number, power: number): void {
  for (let i = 0; i < nx; i++) fit[i] = (fit[i]! + outlier) ** (power - 1);
  for (let row = o * nr; row < (o + 1) * nr; row++) {
    for (let i = 0, k = row * nx; i < nx; i++, k++) p[k]! *= fit[i]!;
  }
}

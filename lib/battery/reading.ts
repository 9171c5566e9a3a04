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
import { gridQuantile } from "../stats/grid-quantile";
import { ASSUMED } from "./assumptions";
import { temperatureAt } from "./climate";
import { CURVES } from "./curve-tables";
import { CURVE_STEPS, atDepth } from "./curves";
import { freshDropMv } from "./cutoff";
import { type Grid, depthMarginal, normalise } from "./grid";
import type { PackReading, ReadingWeight } from "./pack";
import type { PackModel } from "./pack-model";

const SLOPE_REACH = 5 / CURVE_STEPS;
const Z90 = 1.6448536269514722;

interface Expected {
  /** At each depth node: mean and variance of the voltage, mV, offset aside. */
  readonly mean: Float64Array;
  readonly variance: Float64Array;
}

/** Highest voltage the pack could show with the widest margin, mV. */
export function impossibleAboveMv(model: PackModel): number {
  return model.curve.restScale * model.curve.restMv[0]! * ASSUMED.impossibleShare;
}

/** Expected voltage of a reading at every depth node. */
export function expectAt(
  model: PackModel,
  grid: Grid,
  reading: Pick<PackReading, "at" | "kind" | "loadUa" | "temperatureDc" | "accuracyMv">,
): Expected {
  const { curve, pack } = model;
  const dc = reading.temperatureDc ?? temperatureAt(pack.monthlyMeanDc, reading.at);
  const ua = reading.kind === "loaded" ? (reading.loadUa ?? model.peakUa) : 0;
  const drop = freshDropMv(pack, curve, ua, dc);
  const drift = curve.driftMvPerKelvin * (dc / 10 - 20);
  const volts = (depth: number): number =>
    curve.restScale * atDepth(curve.restMv, depth) - drop * atDepth(curve.resistance, depth);
  const warmth = reading.temperatureDc === null ? ASSUMED.temperatureSdK : 1;
  const cell = curve.restScale * CURVES[pack.cell.chemistry].spreadMv * 0.5;
  const fixed =
    (reading.accuracyMv ?? ASSUMED.accuracyMv) ** 2 +
    grid.offsetStepMv ** 2 / 12 +
    cell ** 2 +
    (curve.driftMvPerKelvin * warmth) ** 2 +
    1e-6;
  const mean = new Float64Array(grid.nx);
  const variance = new Float64Array(grid.nx);
  for (let i = 0; i < grid.nx; i++) {
    const depth = grid.depthFrom + i * grid.depthStep;
    const slope = (volts(depth - SLOPE_REACH) - volts(depth + SLOPE_REACH)) / (2 * SLOPE_REACH);
    const resistive = ASSUMED.resistanceSd * drop * atDepth(curve.resistance, depth);
    mean[i] = volts(depth) + drift;
    variance[i] = fixed + (slope * ASSUMED.curveDepthSd) ** 2 + resistive ** 2;
  }
  return { mean, variance };
}

/** 5th, 50th and 95th percentile of a voltage to be read, mV. */
export function expectedBand(grid: Grid, expected: Expected): [number, number, number] {
  const marginal = depthMarginal(grid);
  const at = (probability: number): number => {
    const depth = gridQuantile(marginal, 0, 1, probability);
    return Math.min(grid.nx - 1, Math.max(0, Math.round(depth)));
  };
  const low = at(0.95);
  const middle = at(0.5);
  const high = at(0.05);
  const noise = Z90 * Math.sqrt(expected.variance[middle]! + 0.5 * grid.offsetStepMv ** 2);
  const centre = expected.mean[middle]!;
  return [
    centre - Math.hypot(expected.mean[low]! - centre, noise),
    centre,
    centre + Math.hypot(expected.mean[high]! - centre, noise),
  ];
}

/** Update the grid by one reading; says how much it counted and why. */
export function observe(
  model: PackModel,
  grid: Grid,
  reading: PackReading,
  passivated: boolean,
): ReadingWeight {
  const expected = expectAt(model, grid, reading);
  const [low, middle, high] = expectedBand(grid, expected);
  const said = {
    readingId: reading.id,
    expectedMv: middle,
    expectedLowMv: low,
    expectedHighMv: high,
  };
  if (passivated && reading.millivolts < middle) {
    // the film's transient minimum says nothing about charge; a higher voltage would
    return { ...said, weight: 0, reason: "passivation" };
  }
  const weight = multiply(grid, expected, reading.millivolts, impossibleAboveMv(model));
  return { ...said, weight, reason: weight >= 0.5 ? "fits" : "doubtful" };
}

/** Multiply by the mixture likelihood; returns the weight of its first term. */
function multiply(grid: Grid, expected: Expected, millivolts: number, rangeMv: number): number {
  const { p, nx, nr, no } = grid;
  const outlier = ASSUMED.outlierShare / rangeMv;
  const fit = new Float64Array(nx);
  let fitting = 0;
  for (let o = 0; o < no; o++) {
    for (let i = 0; i < nx; i++) {
      const off = millivolts - expected.mean[i]! - grid.offsetMv[o]!;
      const v = expected.variance[i]!;
      fit[i] =
        ((1 - ASSUMED.outlierShare) * Math.exp((-0.5 * off * off) / v)) /
        Math.sqrt(2 * Math.PI * v);
    }
    for (let r = 0; r < nr; r++) {
      const base = (o * nr + r) * nx;
      for (let i = 0; i < nx; i++) {
        const m = p[base + i]!;
        const f = fit[i]!;
        fitting += m * f;
        p[base + i] = m * (f + outlier);
      }
    }
  }
  const total = normalise(grid);
  return total > 0 ? Math.min(1, fitting / total) : 0;
}

/**
 * What loaded readings teach about this pack's resistance: a Kalman step beside the grid, with
 * the resting voltage taken from the grid as it stood before the reading. The belief is a
 * normal factor on the sheet's resistance; it loosens slowly, for resistance grows unevenly.
 */
import type { EpochDays } from "../units";
import { ASSUMED } from "./assumptions";
import { CURVE_STEPS, atDepth } from "./curves";
import { freshDropMv } from "./cutoff";
import type { ResistanceBelief } from "./end-of-life";
import type { Grid } from "./grid";
import type { PackReading } from "./pack";
import { type PackModel, resistanceAge } from "./pack-model";

/** The factor never leaves this range; only a steady load comes near its top. */
const LOWEST = 0.2;
const HIGHEST = 60;
const REACH = 5 / CURVE_STEPS;

/** Let days pass: the belief loosens, up to what it was at first. */
export function loosen(
  belief: ResistanceBelief,
  firstSd: number,
  days: EpochDays,
): ResistanceBelief {
  const grown = ASSUMED.resistanceWalkPerYear ** 2 * (Math.max(0, days) / 365.2425);
  const sd = Math.sqrt(belief.sd ** 2 + grown * belief.mean ** 2);
  return { mean: belief.mean, sd: Math.min(sd, firstSd * Math.max(1, belief.mean)) };
}

export interface RestGuess {
  readonly restMv: number;
  readonly variance: number;
  /** Fall under the load at the sheet's resistance, mV. */
  readonly dropMv: number;
}

/**
 * Resting voltage and fall under load that the grid expects at a loaded reading; wants the
 * depth marginal in `nodeC`.
 */
export function guessRest(model: PackModel, grid: Grid, reading: PackReading): RestGuess {
  const { curve, pack } = model;
  const dc = reading.temperatureDc ?? model.site.at(reading.at);
  const ua = reading.loadUa ?? model.peakUa;
  const fall = freshDropMv(pack, curve, ua, dc) * resistanceAge(model, reading.at);
  const marginal = grid.nodeC;
  let total = 0;
  let first = 0;
  let second = 0;
  for (let i = 0; i < grid.nx; i++) {
    const depth = grid.depthFrom + i * grid.depthStep;
    total += marginal[i]!;
    first += marginal[i]! * depth;
    second += marginal[i]! * depth * depth;
  }
  const depth = first / total;
  const depthSd = Math.sqrt(Math.max(0, second / total - depth * depth));
  const { restMv, restScale } = curve;
  const fallen = atDepth(restMv, depth - REACH) - atDepth(restMv, depth + REACH);
  const slope = (restScale * fallen) / (2 * REACH);
  const offset = Math.hypot(model.offsetSdMv, model.noiseMv);
  const unsure = Math.hypot(depthSd, ASSUMED.curveDepthSd);
  const accuracy = reading.accuracyMv ?? ASSUMED.accuracyMv;
  return {
    restMv: restScale * atDepth(restMv, depth) + curve.driftMvPerKelvin * (dc / 10 - 20),
    variance: (slope * unsure) ** 2 + offset ** 2 + accuracy ** 2 + 1e-6,
    dropMv: fall * atDepth(curve.resistance, depth),
  };
}

/** The belief after a loaded reading of which `weight` (0..1) is trusted; grid before it. */
export function learnResistance(
  belief: ResistanceBelief,
  guess: RestGuess,
  millivolts: number,
  weight: number,
): ResistanceBelief {
  const { restMv, variance, dropMv } = guess;
  const gain = (dropMv * belief.sd ** 2) / (variance + (dropMv * belief.sd) ** 2);
  const moved = belief.mean + weight * gain * (restMv - millivolts - belief.mean * dropMv);
  const left = 1 - weight * gain * dropMv;
  const mean = Math.min(HIGHEST, Math.max(LOWEST, moved));
  return { mean, sd: Math.max(0.02, belief.sd * Math.sqrt(Math.max(0, left))) };
}

/**
 * The expected band of the voltage plate: what a reading on a date should show, resting or
 * under load, given all that is known now.
 */
import { gridQuantile } from "../stats/grid-quantile";
import type { Decicelsius, EpochDays, Microamps, Millivolts } from "../units";
import { ASSUMED } from "./assumptions";
import { DAYS_PER_YEAR } from "./climate";
import { packMv } from "./cutoff";
import { type Filtered, filterPack } from "./filter";
import { depthMarginal, rateMarginal } from "./grid";
import type { ForecastInput } from "./pack";
import { leakBetween } from "./pack-model";
import { assertForecastable } from "./validate";

const Z90 = 1.6448536269514722;

export interface ExpectedVoltage {
  readonly at: EpochDays;
  readonly lowMv: Millivolts;
  readonly midMv: Millivolts;
  readonly highMv: Millivolts;
}

export interface VoltageQuery {
  readonly kind: "resting" | "loaded";
  /** Load of a loaded voltage; null: the device's peak. */
  readonly loadUa: Microamps | null;
  /** Temperature; null: the month's mean of each date. */
  readonly temperatureDc: Decicelsius | null;
}

/** 5th, 50th and 95th percentile of the voltage on each date. */
export function expectedVoltage(
  input: ForecastInput,
  dates: readonly EpochDays[],
  query: VoltageQuery,
): ExpectedVoltage[] {
  assertForecastable(input);
  const filtered = filterPack(input);
  const marginal = depthMarginal(filtered.grid);
  const rates = rateMarginal(filtered.grid);
  const { grid } = filtered;
  const depth = (p: number): number => gridQuantile(marginal, grid.depthFrom, grid.depthStep, p);
  const lnRate = (p: number): number => gridQuantile(rates, grid.lnRate[0]!, grid.rateStep, p);
  const now: Standing = {
    depth: depth(0.5),
    halfDepth: (depth(0.95) - depth(0.05)) / 2,
    lnRate: lnRate(0.5),
    halfLnRate: (lnRate(0.95) - lnRate(0.05)) / 2,
  };
  return dates.map((at) => bandAt(filtered, now, at, query));
}

/** Medians now, and half the width of their 90 % intervals. */
interface Standing {
  readonly depth: number;
  readonly halfDepth: number;
  readonly lnRate: number;
  readonly halfLnRate: number;
}

function bandAt(
  filtered: Filtered,
  now: Standing,
  at: EpochDays,
  query: VoltageQuery,
): ExpectedVoltage {
  const { model } = filtered;
  const dc = query.temperatureDc ?? model.site.at(at);
  const ua = query.kind === "loaded" ? (query.loadUa ?? model.peakUa) : 0;
  const [depth, half] = depthAt(filtered, now, at);
  const mv = (x: number): number => packMv(model.pack, model.curve, x, ua, dc);
  const mid = mv(depth);
  const resistive = (mid - packMv(model.pack, model.curve, depth, 0, dc)) * ASSUMED.resistanceSd;
  const own = Math.hypot(model.offsetSdMv, model.noiseMv);
  const noise = Z90 * Math.hypot(ASSUMED.accuracyMv, own, resistive);
  return {
    at,
    lowMv: mid - Math.hypot(mid - mv(depth + half), noise),
    midMv: mid,
    highMv: mid + Math.hypot(mv(depth - half) - mid, noise),
  };
}

/** Depth on a date and half its 90 % width: back to the installation, or on at the rate. */
function depthAt(filtered: Filtered, now: Standing, at: EpochDays): [number, number] {
  const { model } = filtered;
  const start = model.pack.installedAt;
  if (at <= filtered.at) {
    const whole = model.drawPerDay * (filtered.at - start) + leakBetween(model, start, filtered.at);
    const gone = model.drawPerDay * (at - start) + leakBetween(model, start, at);
    const part = whole > 0 ? Math.min(1, Math.max(0, gone / whole)) : 0;
    const half = Math.hypot(now.halfDepth * part, Z90 * model.startSd * (1 - part));
    return [model.startDepth + (now.depth - model.startDepth) * part, half];
  }
  const years = (at - filtered.at) / DAYS_PER_YEAR;
  const drawn = model.drawPerDay * Math.exp(now.lnRate) * (at - filtered.at);
  const walk = Z90 * ASSUMED.drawWalkPerYear * Math.sqrt(years / 3);
  const half = now.halfDepth + drawn * Math.hypot(now.halfLnRate, walk);
  const kept = Math.exp(-leakBetween(model, filtered.at, at));
  return [1 - (1 - now.depth) * kept + drawn, half];
}

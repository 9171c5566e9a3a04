/**
 * Where on the depth axis this device stops, month by month: the coldest hour decides, under
 * the peak current, with the resistance as it will be by then. Depends on the resistance of
 * this very pack, which loaded readings teach.
 */
import { normalQuantile } from "../stats/normal";
import type { Decicelsius, Microamps } from "../units";
import { ASSUMED } from "./assumptions";
import { baseCutoffMv, grossCapacity, usableCapacity } from "./capacity";
import { CURVES } from "./curve-tables";
import { type PackCurve, endDepth, freshDropMv } from "./cutoff";
import type { PackSpec } from "./pack";

const TINY = 1e-9;

/** Resistance of this pack relative to its sheet: mean and one standard deviation. */
export interface ResistanceBelief {
  readonly mean: number;
  readonly sd: number;
}

/** What of a pack and its device decides the end. */
export interface EndTerms {
  readonly pack: PackSpec;
  readonly curve: PackCurve;
  readonly peakUa: Microamps;
  /** Depth beyond which the capacity table does not reach at this cut-off. */
  readonly cap: number;
  /** The load hardly ever pauses: the curves, taken from pulses and rest, tell its end less well. */
  readonly steady: boolean;
  /** Resistance at the end of life relative to new. */
  readonly aged: number;
}

export interface EndOfLife {
  /** Depth at which the device stops, each month; January first. */
  readonly byMonth: Float64Array;
  /** The deepest of them: in the warmest month. */
  readonly warm: number;
  /** One standard deviation of all of them. */
  readonly sd: number;
  /** The depth at which it would stop at a temperature. */
  at(temperatureDc: Decicelsius): number;
}

/** End depths given what is believed of the resistance. */
export function endOfLife(terms: EndTerms, resistance: ResistanceBelief): EndOfLife {
  const { pack } = terms;
  const weakest =
    1 - (ASSUMED.weakestCellShare * weakestOf(pack.series)) / Math.sqrt(pack.parallel);
  const at = (dc: Decicelsius): number =>
    weakest * Math.min(terms.cap, depthAt(terms, dc, resistance.mean));
  const byMonth = Float64Array.from({ length: 12 }, (_, m) =>
    at((pack.monthlyMeanDc[m] ?? 200) - coldHourDc(pack)),
  );
  return { byMonth, warm: Math.max(TINY, ...byMonth), sd: spread(terms, resistance), at };
}

/**
 * How far the coldest hour lies below the month's mean, tenths of a degree: nothing where the
 * year has no seasons (indoors, a laboratory), the whole from 10 K between months on.
 */
function coldHourDc({ monthlyMeanDc }: PackSpec): number {
  const swing = Math.max(...monthlyMeanDc) - Math.min(...monthlyMeanDc);
  return 10 * ASSUMED.coldHourK * Math.min(1, swing / 100);
}

function depthAt({ pack, curve, peakUa, aged }: EndTerms, dc: number, resistance: number): number {
  const drop = freshDropMv(pack, curve, peakUa, dc) * aged * resistance;
  return endDepth(curve, pack.cutoffMv, curve.driftMvPerKelvin * (dc / 10 - 20), drop);
}

/** How far the end moves by one spread of the resistance, and by a colder or milder night. */
function spread(terms: EndTerms, { mean, sd }: ResistanceBelief): number {
  const below = coldHourDc(terms.pack);
  const coldest = Math.min(...terms.pack.monthlyMeanDc) - below;
  const swing = (below / ASSUMED.coldHourK) * ASSUMED.coldHourSdK;
  const low = Math.max(0, mean - sd);
  const byResistance = depthAt(terms, coldest, low) - depthAt(terms, coldest, mean + sd);
  const byCold = depthAt(terms, coldest + swing, mean) - depthAt(terms, coldest - swing, mean);
  const table = CURVES[terms.pack.cell.chemistry].endDepthSd;
  const own = terms.steady ? Math.hypot(table, ASSUMED.steadyEndSd) : table;
  return Math.hypot(own, byResistance / 2, byCold / 2);
}

/** How many spreads the weakest of n cells lies below their mean (Blom's approximation). */
function weakestOf(n: number): number {
  return n > 1 ? normalQuantile((n - 0.375) / (n + 0.25)) : 0;
}

/** Depth the table itself allows at the device's cut-off, where it knows several. */
export function tableEndDepth(pack: PackSpec, averageUa: Microamps, fullMah: number): number {
  const base = baseCutoffMv(pack.cell);
  const cutoff = pack.cutoffMv / pack.series;
  const ua = averageUa / pack.parallel;
  const atBase = usableCapacity(pack.cell, ua, base, 200);
  const atCutoff = usableCapacity(pack.cell, ua, cutoff, 200);
  if (atCutoff >= atBase) return 1;
  return (atCutoff / atBase) * (grossCapacity(pack.cell, ua, base, 200) / fullMah);
}

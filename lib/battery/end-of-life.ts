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
/** Three resistances for a normal one: Gauss-Hermite, moments 0 to 5 exact. */
const RESISTANCE_Z = [-Math.sqrt(3), 0, Math.sqrt(3)] as const;
const RESISTANCE_W = [1 / 6, 2 / 3, 1 / 6] as const;
/** Seven severities of a month's coldest hour, mild to cold. */
const SEVERITY_Z = [-2.4, -1.6, -0.8, 0, 0.8, 1.6, 2.4] as const;
export const SEVERITY_W = [0.018, 0.0892, 0.2328, 0.32, 0.2328, 0.0892, 0.018] as const;

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
  /** The part of it that neither the resistance nor the weather explains. */
  readonly ownSd: number;
  /** How far a colder or a milder night moves the end in the coldest month, share of the charge. */
  readonly weather: number;
  /** The depth at which it would stop at a temperature. */
  at(temperatureDc: Decicelsius): number;
  /** End depths over what is unknown: the pack's resistance and each month's coldest hour. */
  nodes(): EndNodes;
}

export interface EndNodes {
  /** Weights of the severities of a month's coldest hour, mild to cold. */
  readonly severities: readonly number[];
  /** For each resistance the end depth by month and severity. */
  readonly resistances: readonly {
    readonly weight: number;
    readonly months: readonly (readonly number[])[];
  }[];
}

/** End depths given what is believed of the resistance. */
export function endOfLife(terms: EndTerms, resistance: ResistanceBelief): EndOfLife {
  const at = (dc: Decicelsius): number => endAt(terms, dc, resistance.mean);
  const byMonth = Float64Array.from({ length: 12 }, (_, m) =>
    at((terms.pack.monthlyMeanDc[m] ?? 200) - coldHourDc(terms.pack)),
  );
  const warm = Math.max(TINY, ...byMonth);
  const nodes = (): EndNodes => endNodes(terms, resistance);
  return { byMonth, warm, ...spreads(terms, resistance), at, nodes };
}

function endAt(terms: EndTerms, dc: Decicelsius, resistance: number): number {
  const { series, parallel } = terms.pack;
  const weakest = 1 - (ASSUMED.weakestCellShare * weakestOf(series)) / Math.sqrt(parallel);
  return weakest * Math.min(terms.cap, depthAt(terms, dc, resistance));
}

function endNodes(terms: EndTerms, { mean, sd }: ResistanceBelief): EndNodes {
  const resistances = RESISTANCE_Z.map((z, k) => ({
    weight: RESISTANCE_W[k]!,
    months: endsBySeverity(terms, Math.max(0, mean + z * sd)),
  }));
  return { severities: SEVERITY_W, resistances };
}

/** End depth at a resistance by month (January first) and severity of its coldest hour. */
export function endsBySeverity(terms: EndTerms, resistance: number): number[][] {
  const { pack } = terms;
  const below = coldHourDc(pack);
  const swing = below * (ASSUMED.coldHourSdK / ASSUMED.coldHourK);
  return pack.monthlyMeanDc.map((dc) =>
    SEVERITY_Z.map((cold) => endAt(terms, dc - below - cold * swing, resistance)),
  );
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
function spreads(terms: EndTerms, { mean, sd }: ResistanceBelief) {
  const below = coldHourDc(terms.pack);
  const coldest = Math.min(...terms.pack.monthlyMeanDc) - below;
  const swing = (below / ASSUMED.coldHourK) * ASSUMED.coldHourSdK;
  const low = Math.max(0, mean - sd);
  const byResistance = depthAt(terms, coldest, low) - depthAt(terms, coldest, mean + sd);
  const byCold = depthAt(terms, coldest + swing, mean) - depthAt(terms, coldest - swing, mean);
  const table = CURVES[terms.pack.cell.chemistry].endDepthSd;
  const ownSd = terms.steady ? Math.hypot(table, ASSUMED.steadyEndSd) : table;
  return { ownSd, weather: byCold / 2, sd: Math.hypot(ownSd, byResistance / 2, byCold / 2) };
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

/**
 * A pack's physics, prepared once for the filter: shares of charge per day, curves scaled
 * to the pack, the end depth of each month.
 */
import { normalQuantile } from "../stats/normal";
import type { EpochDays, Microamps, Millivolts } from "../units";
import { ASSUMED } from "./assumptions";
import { baseCutoffMv, grossCapacity, usableCapacity } from "./capacity";
import { DAYS_PER_YEAR } from "./climate";
import { elementsOf } from "./curves";
import { CURVES } from "./curve-tables";
import { type PackCurve, endDepth, freshDropMv, packCurve, packEndDepth } from "./cutoff";
import { packAverageUa, packPeakUa } from "./duty";
import type { Chemistry, FleetPrior, PackSpec } from "./pack";
import { type Ageing, ageing } from "./self-discharge";

const MIN_FULL_SHARE = 0.5;
const MAX_SHELF_LOSS = 0.9;
const TINY = 1e-9;
const LONGEST_AGE_YEARS = 15;
const RECHARGED: readonly Chemistry[] = ["vrla", "lifepo4"];

/** ln(rate) and ln(draw) before any reading: both normal. */
export interface RatePrior {
  readonly mean: number;
  readonly sd: number;
  readonly drawMean: number;
  readonly drawSd: number;
}

export interface PackModel {
  readonly pack: PackSpec;
  readonly curve: PackCurve;
  readonly averageUa: Microamps;
  readonly peakUa: Microamps;
  /** Share of a full pack drawn per day at the nominal draw and capacity. */
  readonly drawPerDay: number;
  /** Share of the charge left that is lost per day at 20 °C by self-discharge. */
  readonly leakPerDay: number;
  readonly ageing: Ageing;
  /** Depth at which the device stops, each month; January first. */
  readonly endByMonth: Float64Array;
  /** The deepest of them: in the warmest month. */
  readonly endWarm: number;
  readonly endSd: number;
  readonly startDepth: number;
  readonly startSd: number;
  /** Spread of the pack's voltage offset against the curve, mV. */
  readonly offsetSdMv: Millivolts;
  readonly prior: RatePrior;
}

/** Charge of one cell at depth 1 of its curve, at the device's average draw, mAh. */
export function fullCapacity(pack: PackSpec, averageUa: Microamps): number {
  const { cell } = pack;
  const base = baseCutoffMv(cell);
  const single: PackSpec = { ...pack, series: 1, parallel: 1, cutoffMv: base };
  const reached = packEndDepth(single, cell.rated.currentUa, cell.rated.temperatureDc);
  const gross = grossCapacity(cell, averageUa / pack.parallel, base, 200);
  return gross / Math.max(reached, MIN_FULL_SHARE);
}

/** Depth the table itself allows at the device's cut-off, where it knows several. */
function tableEndDepth(pack: PackSpec, averageUa: Microamps, fullMah: number): number {
  const base = baseCutoffMv(pack.cell);
  const cutoff = pack.cutoffMv / pack.series;
  const ua = averageUa / pack.parallel;
  const atBase = usableCapacity(pack.cell, ua, base, 200);
  const atCutoff = usableCapacity(pack.cell, ua, cutoff, 200);
  if (atCutoff >= atBase) return 1;
  return (atCutoff / atBase) * (grossCapacity(pack.cell, ua, base, 200) / fullMah);
}

/** How many spreads the weakest of n cells lies below their mean (Blom's approximation). */
function weakestOf(n: number): number {
  return n > 1 ? normalQuantile((n - 0.375) / (n + 0.25)) : 0;
}

interface EndOfLife {
  readonly peakUa: Microamps;
  /** Depth beyond which the capacity table does not reach at this cut-off. */
  readonly cap: number;
  /** Resistance at the end of life relative to new. */
  readonly aged: number;
}

function monthlyEnds(pack: PackSpec, curve: PackCurve, end: EndOfLife): Float64Array {
  const weakest =
    1 - (ASSUMED.weakestCellShare * weakestOf(pack.series)) / Math.sqrt(pack.parallel);
  return Float64Array.from({ length: 12 }, (_, m) => {
    const dc = (pack.monthlyMeanDc[m] ?? 200) - 10 * ASSUMED.coldHourK;
    const drift = curve.driftMvPerKelvin * (dc / 10 - 20);
    const drop = freshDropMv(pack, curve, end.peakUa, dc) * end.aged;
    return weakest * Math.min(end.cap, endDepth(curve, pack.cutoffMv, drift, drop));
  });
}

/** How far the end depth moves when the resistance is one spread higher or lower. */
function endSpread(pack: PackSpec, curve: PackCurve, end: EndOfLife): number {
  const drop = freshDropMv(pack, curve, end.peakUa, Math.max(...pack.monthlyMeanDc)) * end.aged;
  const high = endDepth(curve, pack.cutoffMv, 0, drop * (1 + ASSUMED.resistanceSd));
  const low = endDepth(curve, pack.cutoffMv, 0, drop * (1 - ASSUMED.resistanceSd));
  return Math.hypot(ASSUMED.endDepthSd, (low - high) / 2);
}

function ratePrior(pack: PackSpec, fleet: FleetPrior | null): RatePrior {
  const capacity = fleet?.capacityFactor ?? {
    mean: ASSUMED.capacityMean,
    relativeSd: ASSUMED.capacitySd,
  };
  const learned = fleet?.drawFactor ?? { mean: 1, relativeSd: ASSUMED.drawSd };
  const draw = pack.measuredDraw ? { mean: 1, relativeSd: pack.measuredDraw.relativeSd } : learned;
  const drawMean = Math.log(draw.mean);
  const drawSd = Math.min(Math.max(draw.relativeSd, 0.01), 1.5);
  const capacitySd = Math.min(Math.max(capacity.relativeSd, 0.01), 1.5);
  return {
    mean: drawMean - Math.log(capacity.mean),
    sd: Math.hypot(drawSd, capacitySd),
    drawMean,
    drawSd,
  };
}

/** Loss on the shelf between the day the cells were made and the installation, 0..0.9. */
function shelfLoss(pack: PackSpec, leakPerDay: number): number {
  if (pack.madeAt === null || pack.madeAt >= pack.installedAt) return 0;
  // rechargeable blocks are charged before they go in
  if (RECHARGED.includes(pack.cell.chemistry)) return 0;
  // stores are taken to be at 20 °C: the site's climate begins with the installation
  return Math.min(MAX_SHELF_LOSS, -Math.expm1(-leakPerDay * (pack.installedAt - pack.madeAt)));
}

/** Prepare a pack for the filter. */
export function packModel(pack: PackSpec, fleet: FleetPrior | null): PackModel {
  const curve = packCurve(pack);
  const averageUa = packAverageUa(pack);
  const peakUa = packPeakUa(pack);
  const fullMah = fullCapacity(pack, averageUa);
  const yearlyLeak = (pack.cell.selfDischargePpmPerYear / 1e6) * pack.cell.rated.capacityMah;
  const leakPerDay = yearlyLeak / fullMah / DAYS_PER_YEAR;
  const drawPerDay = (averageUa * 0.024) / (fullMah * pack.parallel);
  const end: EndOfLife = {
    peakUa,
    cap: tableEndDepth(pack, averageUa, fullMah),
    aged: grown(pack, 1 / Math.max(drawPerDay + leakPerDay, TINY)),
  };
  const endByMonth = monthlyEnds(pack, curve, end);
  const startDepth = shelfLoss(pack, leakPerDay);
  return {
    pack,
    curve,
    averageUa,
    peakUa,
    drawPerDay,
    leakPerDay,
    ageing: ageing(pack.monthlyMeanDc),
    endByMonth,
    endWarm: Math.max(TINY, ...endByMonth),
    endSd: endSpread(pack, curve, end),
    startDepth,
    startSd: Math.hypot(ASSUMED.startDepthSd, startDepth * 0.5),
    offsetSdMv: pack.series * elementsOf(pack.cell) * CURVES[pack.cell.chemistry].spreadMv,
    prior: ratePrior(pack, fleet),
  };
}

/** Exponent of self-discharge between two days: the share kept is e to its negative. */
export function leakBetween(model: PackModel, from: EpochDays, to: EpochDays): number {
  return model.leakPerDay * model.ageing.between(from, to);
}

/** Resistance after some days in service relative to new, at equal depth and temperature. */
function grown(pack: PackSpec, days: number): number {
  const years = Math.min(LONGEST_AGE_YEARS, Math.max(0, days) / DAYS_PER_YEAR);
  return 1 + CURVES[pack.cell.chemistry].resistanceGrowthPerYear * years;
}

/** The same on a date. */
export function resistanceAge(model: PackModel, at: EpochDays): number {
  return grown(model.pack, at - model.pack.installedAt);
}

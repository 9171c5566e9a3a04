/**
 * A pack's physics, prepared once for the filter: shares of charge per day, curves scaled
 * to the pack, the end depth of each month.
 */
import type { EpochDays, Microamps, Millivolts } from "../units";
import { ASSUMED } from "./assumptions";
import { baseCutoffMv, grossCapacity, overload } from "./capacity";
import { DAYS_PER_YEAR } from "./climate";
import { CURVES } from "./curve-tables";
import { type PackCurve, packCurve, packEndDepth } from "./cutoff";
import { isConstant, isSteady, packAverageUa, packPeakUa } from "./duty";
import {
  type EndOfLife,
  type EndTerms,
  type ResistanceBelief,
  endOfLife,
  tableEndDepth,
} from "./end-of-life";
import type {
  Calibration,
  Chemistry,
  CurveLesson,
  FleetPrior,
  LoggedTemperature,
  PackSpec,
} from "./pack";
import { type SiteTemperatures, siteTemperatures } from "./site-temperature";

const MIN_FULL_SHARE = 0.5;
const MAX_SHELF_LOSS = 0.9;
const TINY = 1e-9;
/** How much further off the curve may be where readings show that it does not fit. */
const MISFIT = 3;
/** Share of a table's spread that differs from one reading to the next. */
const UNTAUGHT_NOISE = 0.25;
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
  /** How warm it was and will be at its site. */
  readonly site: SiteTemperatures;
  readonly endTerms: EndTerms;
  /** Where it stops, before any loaded reading has told of the resistance. */
  readonly end: EndOfLife;
  /** The resistance that decides it, relative to the sheet's. */
  readonly endResistance: ResistanceBelief;
  readonly startDepth: number;
  readonly startSd: number;
  /** Spread of the pack's voltage offset against the curve, and of readings around that, mV. */
  readonly offsetSdMv: Millivolts;
  readonly noiseMv: Millivolts;
  /** Depth over which that offset stays the same, roughly. */
  readonly offsetDepth: number;
  /** Resistance of this pack before any reading, relative to its curve. */
  readonly resistance: ResistanceBelief;
  readonly prior: RatePrior;
  readonly calibration: Calibration | null;
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

function ratePrior(pack: PackSpec, fleet: FleetPrior | null): RatePrior {
  const beyond = overload(pack.cell, packAverageUa(pack) / pack.parallel);
  const capacity = fleet?.capacityFactor ?? {
    mean: ASSUMED.capacityMean * Math.exp(beyond.mean),
    relativeSd: Math.hypot(ASSUMED.capacitySd, beyond.sd),
  };
  const assumed = isConstant(pack) ? ASSUMED.constantDrawSd : ASSUMED.drawSd;
  const learned = fleet?.drawFactor ?? { mean: 1, relativeSd: assumed };
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

/**
 * Resistance before any loaded reading. A sheet states what a short pulse meets; a load that
 * hardly ever pauses meets the cell's slow polarisation as well: taken as 40 mV an element at
 * the 20-hour rate, with the square root of the current (an LR6 on 5.5 ohm and an FR6 on 15 ohm
 * fall by 0.11 V and 0.03 V; the rest from memory), and known to two fifths.
 */
function resistanceOf(pack: PackSpec, curve: PackCurve, lesson: CurveLesson | null) {
  if (lesson) return { mean: 1, sd: lesson.resistanceSd };
  const ua = packAverageUa(pack);
  if (!isSteady(pack)) return { mean: 1, sd: ASSUMED.resistanceSd };
  const twentyHourUa = (pack.cell.rated.capacityMah * 1000 * pack.parallel) / 20;
  const slowMv = 40 * curve.restScale * Math.sqrt(ua / twentyHourUa);
  const mean = 1 + Math.min(40, slowMv / Math.max(1e-3, (ua * curve.freshMohm) / 1e6));
  return { mean, sd: Math.hypot(0.4 * mean, mean - 1) };
}

/** A full cell's charge, and the shares of it that a day takes by leak and by draw. */
function charges(pack: PackSpec, averageUa: Microamps) {
  const fullMah = fullCapacity(pack, averageUa);
  const yearlyLeak = (pack.cell.selfDischargePpmPerYear / 1e6) * pack.cell.rated.capacityMah;
  return {
    fullMah,
    leakPerDay: yearlyLeak / fullMah / DAYS_PER_YEAR,
    drawPerDay: (averageUa * 0.024) / (fullMah * pack.parallel),
  };
}

/** Depth at which a pack starts, and how well that is known. */
function startOf(pack: PackSpec, leakPerDay: number) {
  const startDepth = shelfLoss(pack, leakPerDay);
  return { startDepth, startSd: Math.hypot(ASSUMED.startDepthSd, startDepth * 0.5) };
}

/** How far the pack's voltages may lie off its curve. */
function curveErrors(pack: PackSpec, { restScale }: PackCurve, lesson: CurveLesson | null) {
  const { spreadMv } = CURVES[pack.cell.chemistry];
  return {
    offsetSdMv: restScale * (lesson?.spreadMv ?? spreadMv),
    noiseMv: restScale * (lesson?.noiseMv ?? UNTAUGHT_NOISE * spreadMv),
    offsetDepth: lesson ? ASSUMED.taughtErrorDepth : ASSUMED.curveErrorDepth,
  };
}

/** Prepare a pack for the filter. */
export function packModel(
  pack: PackSpec,
  fleet: FleetPrior | null,
  temperatures: readonly LoggedTemperature[] = [],
): PackModel {
  const lesson = fleet?.curve ?? null;
  // the depth axis ends where the published curve does; what was learned lies on that axis
  const published = packCurve(pack);
  const curve = lesson ? packCurve(pack, lesson) : published;
  const averageUa = packAverageUa(pack);
  const peakUa = packPeakUa(pack);
  const { fullMah, leakPerDay, drawPerDay } = charges(pack, averageUa);
  const terms: EndTerms = {
    pack,
    curve: published,
    peakUa,
    cap: tableEndDepth(pack, averageUa, fullMah),
    steady: isSteady(pack),
    aged: grown(pack, 1 / Math.max(drawPerDay + leakPerDay, TINY)),
  };
  const resistance = resistanceOf(pack, curve, lesson);
  const endResistance = fleet?.endResistance ?? resistance;
  return {
    pack,
    curve,
    averageUa,
    peakUa,
    drawPerDay,
    leakPerDay,
    site: siteTemperatures(pack.monthlyMeanDc, temperatures),
    endTerms: terms,
    end: endOfLife(terms, endResistance),
    endResistance,
    ...startOf(pack, leakPerDay),
    ...curveErrors(pack, curve, lesson),
    resistance,
    prior: ratePrior(pack, fleet),
    calibration: fleet?.calibration ?? null,
  };
}

/** The same pack where its readings show that the curve is not that of its cells. */
export function distrusted(model: PackModel): PackModel {
  const { mean, sd } = model.resistance;
  return {
    ...model,
    offsetSdMv: MISFIT * model.offsetSdMv,
    noiseMv: MISFIT * model.noiseMv,
    resistance: { mean, sd: MISFIT * sd },
  };
}

/** Exponent of self-discharge between two days: the share kept is e to its negative. */
export function leakBetween(model: PackModel, from: EpochDays, to: EpochDays): number {
  return model.leakPerDay * model.site.ageing.between(from, to);
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

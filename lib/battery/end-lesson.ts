/**
 * What finished packs teach about the end itself. A pack stopped where the voltage under load
 * in the cold of that month met the cut-off; how much resistance that takes is read off the
 * months and depths at which many packs stopped: the right factor makes the draws that explain
 * their ends agree best, and lets none have stopped in an earlier winter.
 */
import type { EpochDays } from "../units";
import { ASSUMED } from "./assumptions";
import { monthOf } from "./climate";
import { type EndOfLife, endOfLife } from "./end-of-life";
import type { LoggedTemperature, PackSpec } from "./pack";
import { type PackModel, leakBetween, packModel } from "./pack-model";

/** Factors on the resistance that are tried: evenly over the logarithm. */
const TRIED: readonly number[] = Array.from({ length: 13 }, (_, k) => Math.exp((k - 6) * 0.2));
/** Spread of ln(factor) between chemistry and sheet, and between cohorts of a chemistry. */
const CHEMISTRY_SD = 0.4;
const COHORT_SD = 0.25;
/** Scatter of ln(draw) below which no factor is better than another. */
const LEAST_SD = 0.1;
/** How clearly a pack must not have stopped earlier, as ln(depth). */
const EARLIER_SD = 0.15;
const SHALLOWEST = 0.02;
const MONTH_DAYS = 30.44;

export interface Stopped {
  readonly pack: PackSpec;
  readonly stoppedAt: EpochDays;
}

/** A finished pack prepared for the trials. */
export interface Spent {
  readonly model: PackModel;
  readonly outAt: EpochDays;
}

export function spent(
  pack: PackSpec,
  outAt: EpochDays,
  temperatures: readonly LoggedTemperature[] = [],
): Spent {
  return { model: packModel(pack, null, temperatures), outAt };
}

/** End depths of a pack whose resistance at the end is `factor` times the sheet's. */
export function endUnder({ model }: Spent, factor: number): EndOfLife {
  return endOfLife(model.endTerms, { mean: factor, sd: ASSUMED.resistanceSd });
}

/**
 * Draw over capacity, relative to the sheet, by which a pack comes to the end depth of a month
 * on a day, self-discharge apart.
 */
export function paceTo(one: Spent, end: EndOfLife, at: EpochDays): number {
  const { lost, drawn } = courseTo(one, at);
  const left = end.byMonth[monthOf(at)]! - lost;
  return Math.max(SHALLOWEST, left) / Math.max(drawn, 1e-9);
}

/** Depth on a day at a pace: as the filter consumes, 1 - (1 - start) e^-leak + draw. */
export function depthAfter(one: Spent, pace: number, at: EpochDays): number {
  const { lost, drawn } = courseTo(one, at);
  return lost + pace * drawn;
}

/** Share gone by a day without the draw, and what the draw takes at a pace of 1. */
function courseTo({ model }: Spent, at: EpochDays): { lost: number; drawn: number } {
  const from = model.pack.installedAt;
  const leak = leakBetween(model, from, at);
  const kept = Math.exp(-leak);
  const drawn = model.drawPerDay * (at - from) * (leak > 1e-9 ? (1 - kept) / leak : 1);
  return { lost: 1 - (1 - model.startDepth) * kept, drawn };
}

/** How unsure ln(depth) is at which a pack stopped in its month: by the cold and its resistance. */
export function endSdAt(one: Spent, factor: number): number {
  const month = monthOf(one.outAt);
  const depth = (share: number): number =>
    Math.max(SHALLOWEST, endUnder(one, factor * share).byMonth[month]!);
  const sd = ASSUMED.taughtEndSd;
  return Math.abs(Math.log(depth(1 + sd) / depth(1 - sd))) / 2;
}

/** How far ln(pace) lies above what an earlier month of the last year would have borne. */
function contradiction(one: Spent, end: EndOfLife, pace: number): number {
  let worst = 0;
  for (let back = 1; back <= 12; back++) {
    const at = one.outAt - back * MONTH_DAYS;
    if (at <= one.model.pack.installedAt) break;
    worst = Math.max(worst, Math.log(pace / paceTo(one, end, at)));
  }
  return worst;
}

/** Cost of each tried factor for the packs of one cohort: less is likelier (-2 ln likelihood). */
function costs(cohort: readonly Spent[]): number[] {
  return TRIED.map((factor) => {
    const ends = cohort.map((one) => endUnder(one, factor));
    const paces = cohort.map((one, i) => Math.log(paceTo(one, ends[i]!, one.outAt)));
    const mean = paces.reduce((a, b) => a + b, 0) / paces.length;
    const variance = paces.reduce((s, p) => s + (p - mean) ** 2, 0) / paces.length;
    const against = cohort.reduce(
      (s, one, i) => s + (contradiction(one, ends[i]!, Math.exp(paces[i]!)) / EARLIER_SD) ** 2,
      0,
    );
    return cohort.length * Math.log(variance + LEAST_SD ** 2) + against;
  });
}

/** The tried factor with the least cost, a prior of ln(factor) around `centre` counted in. */
function cheapest(cost: readonly number[], centre: number, sd: number): number {
  let best = 0;
  const whole = cost.map((c, k) => c + ((Math.log(TRIED[k]!) - centre) / sd) ** 2);
  whole.forEach((c, k) => {
    if (c < whole[best]!) best = k;
  });
  return TRIED[best]!;
}

/** Resistance at the end relative to the sheet's, by cohort; packs that ran out only. */
export function learnEnds(cohorts: ReadonlyMap<string, readonly Spent[]>): Map<string, number> {
  const each = [...cohorts].map(([cohort, packs]) => ({ cohort, cost: costs(packs) }));
  const all = TRIED.map((_, k) => each.reduce((s, { cost }) => s + cost[k]!, 0));
  const centre = Math.log(cheapest(all, 0, CHEMISTRY_SD));
  return new Map(each.map(({ cohort, cost }) => [cohort, cheapest(cost, centre, COHORT_SD)]));
}

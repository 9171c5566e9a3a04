/**
 * What finished packs teach about the end itself. A pack stopped where the voltage under load
 * in the coldest hour of some month met the cut-off; how much resistance that takes is read off
 * the months in which many packs stopped, and those that they had lived through before. Neither
 * the draw of a pack is known nor how cold its nights were, so both are summed over:
 *
 *   L(factor) = prod over packs of sum over paces of p(pace) prod over months of (1 - h) times h
 *
 * h being the chance that a month's coldest hour stops a pack at the depth it has come to. The
 * same sum, the factor known, tells how fast one pack was used, and how surely.
 */
import { normalCdf } from "../stats/normal";
import type { EpochDays } from "../units";
import { ASSUMED } from "./assumptions";
import { MONTH_STARTS, dayOfYear, monthOf } from "./climate";
import { type EndOfLife, SEVERITY_W, endOfLife, endsBySeverity } from "./end-of-life";
import type { LoggedTemperature, PackSpec } from "./pack";
import { type PackModel, leakBetween, packModel } from "./pack-model";

/** Factors on the resistance that are tried: evenly over the logarithm. */
const TRIED: readonly number[] = Array.from({ length: 13 }, (_, k) => Math.exp((k - 6) * 0.2));
/** Paces that are summed over: ln(draw over capacity, relative to the sheet). */
const PACES: readonly number[] = Array.from({ length: 29 }, (_, k) => (k - 14) * 0.1);
/** Spread of ln(factor) between chemistry and sheet, and between cohorts of a chemistry. */
const CHEMISTRY_SD = 0.4;
const COHORT_SD = 0.25;
/** Spread of the paces of a cohort's packs, and of cohorts around the sheet. */
const PACE_SD = Math.hypot(ASSUMED.capacitySd, ASSUMED.drawSd);
const COHORT_PACE_SD = 0.25;
/** What moves the end of a single pack beside the weather, as a share of the charge. */
const LEAST_END_SD = 0.02;
const SHALLOWEST = 0.02;
/** A spread of ln(pace) that the grid of paces and every end's own scatter leave at the least. */
const CLEAR_SD = 0.07;
/** Months of a long life that are looked at, the last ones. */
const MOST_MONTHS = 120;
const LEAST_CHANCE = 1e-12;
/** How finely the day of a stop is held against the pack's course. */
const LAST_DAYS = 7;
const MONTH_DAYS = 30.44;

/** A finished pack prepared for the trials. */
export interface Spent {
  readonly model: PackModel;
  readonly outAt: EpochDays;
  /** The ends of the months it lived through: share gone by itself, share drawn. */
  readonly months: readonly (Course & { readonly month: number })[];
  /** The same at the start of the month in which it came out, shortly before, and on the day. */
  readonly last: readonly [Course, Course, Course];
}

interface Course {
  readonly lost: number;
  readonly drawn: number;
}

export function spent(
  pack: PackSpec,
  outAt: EpochDays,
  temperatures: readonly LoggedTemperature[] = [],
): Spent {
  const model = packModel(pack, null, temperatures);
  const ends: EpochDays[] = [];
  for (let day = pack.installedAt; day < outAt;) {
    const month = monthOf(day + 1e-6);
    day += Math.max(MONTH_STARTS[month + 1]! - dayOfYear(day + 1e-6), 1e-3) + 1e-6;
    if (day < outAt) ends.push(day);
  }
  const months = ends
    .slice(-MOST_MONTHS)
    .map((at) => ({ month: monthOf(at - 1e-3), ...courseTo(model, at) }));
  const start = ends.at(-1) ?? pack.installedAt;
  const before = Math.max(start, outAt - LAST_DAYS);
  const last = [start, before, outAt].map((at) => courseTo(model, at));
  return { model, outAt, months, last: last as [Course, Course, Course] };
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
  const { lost, drawn } = courseTo(one.model, at);
  const left = end.byMonth[monthOf(at)]! - lost;
  return Math.max(SHALLOWEST, left) / Math.max(drawn, 1e-9);
}

/** Depth on a day at a pace: as the filter consumes, 1 - (1 - start) e^-leak + draw. */
export function depthAfter(one: Spent, pace: number, at: EpochDays): number {
  const { lost, drawn } = courseTo(one.model, at);
  return lost + pace * drawn;
}

/** Share gone by a day without the draw, and what the draw takes at a pace of 1. */
function courseTo(model: PackModel, at: EpochDays): Course {
  const from = model.pack.installedAt;
  const leak = leakBetween(model, from, at);
  const kept = Math.exp(-leak);
  const drawn = model.drawPerDay * (at - from) * (leak > 1e-9 ? (1 - kept) / leak : 1);
  return { lost: 1 - (1 - model.startDepth) * kept, drawn };
}

/** Likelihood of each of PACES for a pack that stopped when it did. */
function paceLikelihoods(one: Spent, factor: number): number[] {
  const ends = endsBySeverity(one.model.endTerms, factor);
  const sd = Math.hypot(LEAST_END_SD, one.model.end.ownSd);
  const stopMonth = ends[monthOf(one.outAt)]!;
  return PACES.map((ln) => {
    const pace = Math.exp(ln);
    let chance = 1;
    for (let k = 0; k < one.months.length && chance > LEAST_CHANCE; k++) {
      const { month, lost, drawn } = one.months[k]!;
      chance *= 1 - stopChance(ends[month]!, sd, lost + pace * drawn);
    }
    const [start, before, out] = one.last.map(({ lost, drawn }) =>
      stopChance(stopMonth, sd, lost + pace * drawn),
    );
    // in its last days by what it drew in them, or by the frost of the month
    const stops = out! - before! + (start! * LAST_DAYS) / MONTH_DAYS;
    return Math.max(LEAST_CHANCE, chance * stops);
  });
}

/** Chance that a month's coldest hour stops a pack at a depth; ends from mild to cold. */
function stopChance(ends: readonly number[], sd: number, depth: number): number {
  if (depth < ends[ends.length - 1]! - 4 * sd) return 0;
  let chance = 0;
  for (let k = 0; k < ends.length; k++) {
    chance += SEVERITY_W[k]! * normalCdf((depth - ends[k]!) / sd);
  }
  return chance;
}

/**
 * How fast a pack that ran out was used, ln(pace), and how much the weather leaves open of it: one
 * standard deviation, beside the scatter that every end has.
 */
export function paceTold(one: Spent, factor: number): { lnPace: number; sd: number } {
  const weights = paceLikelihoods(one, factor);
  const total = weights.reduce((a, b) => a + b, 0);
  const lnPace = weights.reduce((s, w, k) => s + w * PACES[k]!, 0) / total;
  const variance = weights.reduce((s, w, k) => s + w * (PACES[k]! - lnPace) ** 2, 0) / total;
  const open = Math.sqrt(Math.max(0, variance - CLEAR_SD ** 2));
  const byMonth = Math.log(paceTo(one, endUnder(one, factor), one.outAt));
  // what the weather hardly touched is told by the month's end depth to the day
  const part = Math.min(1, open / CLEAR_SD);
  return { lnPace: byMonth + part * (lnPace - byMonth), sd: open };
}

/** Cost of each tried factor for the packs of one cohort: less is likelier (-2 ln likelihood). */
function costs(cohort: readonly Spent[]): number[] {
  return TRIED.map((factor) => {
    const packs = cohort.map((one) => paceLikelihoods(one, factor));
    // the cohort's mean pace at its likeliest
    return Math.min(...PACES.map((mean) => costAround(packs, mean)));
  });
}

function costAround(packs: readonly (readonly number[])[], mean: number): number {
  const weights = PACES.map((ln) => Math.exp(-0.5 * ((ln - mean) / PACE_SD) ** 2));
  const total = weights.reduce((a, b) => a + b, 0);
  return packs.reduce(
    (cost, pack) =>
      cost - 2 * Math.log(pack.reduce((s, chance, k) => s + chance * weights[k]!, 0) / total),
    (mean / COHORT_PACE_SD) ** 2,
  );
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

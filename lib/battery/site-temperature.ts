/**
 * How warm it was at a pack's site: logged where somebody logged it, the month's mean of the
 * climate where nobody did and for all that is to come.
 */
import type { Decicelsius, EpochDays } from "../units";
import { temperatureAt } from "./climate";
import type { LoggedTemperature } from "./pack";
import { type Ageing, ageing, tenDegreeFactor } from "./self-discharge";

/** Between two logged temperatures further apart than this the climate holds, days. */
const LONGEST_GAP = 3;

export interface SiteTemperatures {
  /** Temperature of a moment: between the logged ones, or the mean of its month. */
  at(day: EpochDays): Decicelsius;
  /** The same, null where nothing was logged about then. */
  logged(day: EpochDays): Decicelsius | null;
  /** The lowest of what was logged in a stretch and at its ends; null where nothing was. */
  lowest(from: EpochDays, to: EpochDays): Decicelsius | null;
  /** The ten-degree rule summed over it; its mean factor is the climate's. */
  readonly ageing: Ageing;
}

/** Sites without a log share few climates: each is prepared once. */
const UNLOGGED = new WeakMap<readonly Decicelsius[], SiteTemperatures>();

/** A site's temperatures: `log` in any order, may be empty. */
export function siteTemperatures(
  monthlyMeanDc: readonly Decicelsius[],
  log: readonly LoggedTemperature[] = [],
): SiteTemperatures {
  if (log.length > 0) return fromLog(monthlyMeanDc, log);
  const known = UNLOGGED.get(monthlyMeanDc) ?? {
    at: (day) => temperatureAt(monthlyMeanDc, day),
    logged: () => null,
    lowest: () => null,
    ageing: ageing(monthlyMeanDc),
  };
  UNLOGGED.set(monthlyMeanDc, known);
  return known;
}

function fromLog(
  monthlyMeanDc: readonly Decicelsius[],
  log: readonly LoggedTemperature[],
): SiteTemperatures {
  const sorted = [...log].sort((a, b) => a.at - b.at);
  const logged = (day: EpochDays): Decicelsius | null => loggedAt(sorted, day);
  return {
    at: (day) => logged(day) ?? temperatureAt(monthlyMeanDc, day),
    logged,
    lowest(from, to) {
      const inside = sorted.slice(countUpTo(sorted, from), countUpTo(sorted, to));
      const known = [logged(from), logged(to), ...inside.map((t) => t.temperatureDc)];
      const lowest = known.reduce<number>((low, dc) => Math.min(low, dc ?? Infinity), Infinity);
      return lowest < Infinity ? lowest : null;
    },
    ageing: loggedAgeing(ageing(monthlyMeanDc), sorted),
  };
}

/** How many were logged up to a day; ascending. */
function countUpTo(sorted: readonly LoggedTemperature[], day: EpochDays): number {
  let low = 0;
  let high = sorted.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (sorted[middle]!.at <= day) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** In a straight line between neighbours; next to a lone one for half the longest gap. */
function loggedAt(sorted: readonly LoggedTemperature[], day: EpochDays): Decicelsius | null {
  const count = countUpTo(sorted, day);
  const before = sorted[count - 1];
  const after = sorted[count];
  if (before && after && after.at - before.at <= LONGEST_GAP) {
    const part = (day - before.at) / (after.at - before.at);
    return before.temperatureDc + part * (after.temperatureDc - before.temperatureDc);
  }
  if (before && day - before.at <= LONGEST_GAP / 2) return before.temperatureDc;
  return after && after.at - day <= LONGEST_GAP / 2 ? after.temperatureDc : null;
}

/** The climate's sum with what the logged stretches did instead. */
function loggedAgeing(climate: Ageing, sorted: readonly LoggedTemperature[]): Ageing {
  const instead = sorted.map(() => 0);
  for (let k = 1; k < sorted.length; k++) {
    instead[k] = instead[k - 1]! + differing(climate, sorted, k, sorted[k]!.at);
  }
  const until = (day: EpochDays): number => {
    const count = countUpTo(sorted, day);
    if (count === 0) return 0;
    const whole = instead[count - 1]!;
    return count < sorted.length ? whole + differing(climate, sorted, count, day) : whole;
  };
  return {
    meanFactor: climate.meanFactor,
    between: (from, to) => climate.between(from, to) + until(to) - until(from),
  };
}

/**
 * Days at 20 °C by which the stretch that ends with the k-th differs from the climate, up to a
 * day in it. The rule over a straight line is the logarithmic mean of its ends.
 */
function differing(
  climate: Ageing,
  sorted: readonly LoggedTemperature[],
  k: number,
  day: EpochDays,
): number {
  const from = sorted[k - 1]!;
  const to = sorted[k]!;
  if (to.at - from.at > LONGEST_GAP || !(day > from.at)) return 0;
  const part = (day - from.at) / (to.at - from.at);
  const dc = from.temperatureDc + part * (to.temperatureDc - from.temperatureDc);
  const a = tenDegreeFactor(from.temperatureDc / 10);
  const b = tenDegreeFactor(dc / 10);
  const mean = Math.abs(b - a) < 1e-9 * a ? a : (b - a) / Math.log(b / a);
  return mean * (day - from.at) - climate.between(from.at, day);
}

/**
 * What it costs to visit a pack on one day rather than another. Two things pull: the chance that
 * the device is silent until then, and the life still in the cells that a swap throws away.
 *
 *   V(d) = E[ silence before d ] + g · E[ (T − d)⁺ ],   g = cost of a cycle / expected cycle
 *
 * T is the day the device stops. Renewal reasoning: each day of life left in the pack on the day
 * of its swap brings every later swap one day forward, and a day of service costs g in the long
 * run (Barlow & Proschan 1965, see age-replacement.ts). V(d) − V(d*) is then the penalty of
 * shifting a job (Wildeman, Dekker & Smit 1997, see grouping.ts) with the failure cost taken
 * from this pack's own posterior instead of a population's.
 */
import type { EpochDays, Minor } from "@/lib/units";
import { chanceOutBy, expectation, meanLife, type LifeQuantiles } from "./life";

export interface SilencePrices {
  readonly silenceMinorPerHour: Minor;
  /** A trip for this pack alone, out of turn. */
  readonly urgentTripMinor: Minor;
  /** Hours until such a trip arrives, silence running. */
  readonly urgentResponseH: number;
}

export interface WaitingPack extends SilencePrices {
  readonly life: LifeQuantiles;
  /** Cost of one more day of service in the long run, g. */
  readonly keepMinorPerDay: Minor;
}

export interface VisitPrice {
  /** Probability that the device has stopped before the visit. */
  readonly chanceOut: number;
  /** Expected cost of silence, of urgent trips where they are cheaper. */
  readonly silenceMinor: Minor;
  /** Unused life thrown away. */
  readonly thrownMinor: Minor;
  readonly totalMinor: Minor;
}

/**
 * Cost of a device that stops at `stopsAt` when its visit is due at `visitAt`: silence until then,
 * or an urgent trip where that is cheaper. For a device that is out already the visit itself is
 * the answer, so its silence counts in full.
 */
export function costOfStopping(
  prices: SilencePrices,
  now: EpochDays,
  stopsAt: EpochDays,
  visitAt: EpochDays,
): Minor {
  if (stopsAt >= visitAt) return 0;
  const silentH = (visitAt - Math.max(stopsAt, now)) * 24;
  const waiting = Math.max(0, silentH) * prices.silenceMinorPerHour;
  if (stopsAt <= now) return waiting;
  const urgent = prices.urgentTripMinor + prices.urgentResponseH * prices.silenceMinorPerHour;
  return Math.min(waiting, urgent);
}

/** Prices a visit at one moment. */
export function priceVisit(pack: WaitingPack, now: EpochDays, visitAt: EpochDays): VisitPrice {
  const silenceMinor = expectation(pack.life, (t) => costOfStopping(pack, now, t, visitAt));
  const unusedDays = expectation(pack.life, (t) => Math.max(0, t - visitAt));
  const thrownMinor = unusedDays * pack.keepMinorPerDay;
  return {
    chanceOut: chanceOutBy(pack.life, visitAt),
    silenceMinor,
    thrownMinor,
    totalMinor: silenceMinor + thrownMinor,
  };
}

/**
 * Cost of one more day of service in the long run: what a cycle costs over how long it is
 * expected to last from installation.
 */
export function keepCostPerDay(
  life: LifeQuantiles,
  installedAt: EpochDays,
  cycleMinor: Minor,
): Minor {
  return cycleMinor / Math.max(30, meanLife(life) - installedAt);
}

/**
 * What one more week without a visit costs, from `at` on; never below zero, because nobody is
 * forced to visit. The Horizon is ordered by it.
 */
export function waitingCostPerWeek(pack: WaitingPack, now: EpochDays, at: EpochDays): Minor {
  const change = priceVisit(pack, now, at + 7).totalMinor - priceVisit(pack, now, at).totalMinor;
  return Math.max(0, change);
}

/** The cheapest of several moments, and its price. @throws RangeError when none is given */
export function cheapestVisit(
  pack: WaitingPack,
  now: EpochDays,
  moments: readonly EpochDays[],
): { readonly index: number; readonly price: VisitPrice } {
  if (moments.length === 0) throw new RangeError("no moment to visit was given");
  let index = 0;
  let price = priceVisit(pack, now, moments[0]!);
  for (let i = 1; i < moments.length; i++) {
    const other = priceVisit(pack, now, moments[i]!);
    if (other.totalMinor < price.totalMinor) [index, price] = [i, other];
  }
  return { index, price };
}

/**
 * What it costs to visit a pack on one day rather than another. Two things pull: the chance that
 * the device is silent until then, and the life still in the cells that a swap throws away.
 *
 *   V(d) = E[ silence before d ] + g · E[ (T − d)⁺ ],   g = cost of a cycle / expected cycle
 *
 * T is the day the device stops. A device that stops before its visit does not stay silent until
 * then: it is due in the next weekly round, or worth an urgent trip; the cheapest way out counts. Renewal reasoning: each day of life left in the pack on the day
 * of its swap brings every later swap one day forward, and a day of service costs g in the long
 * run (Barlow & Proschan 1965, see age-replacement.ts). V(d) − V(d*) is then the penalty of
 * shifting a job (Wildeman, Dekker & Smit 1997, see grouping.ts) with the failure cost taken
 * from this pack's own posterior instead of a population's.
 */
import type { EpochDays, Minor } from "@/lib/units";
import { chanceOutBy, countUpTo, meanLife, sumBetween, type LifeQuantiles } from "./life";

export interface SilencePrices {
  readonly silenceMinorPerHour: Minor;
  /** A trip for this pack alone, out of turn, beyond the planned visit that it saves. */
  readonly urgentTripMinor: Minor;
  /** Hours until such a trip arrives, silence running. */
  readonly urgentResponseH: number;
  /** Hours until an ordinary round comes by, once the device is known to have stopped. */
  readonly nextRoundH: number;
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
 * What a failure costs beyond the planned swap that it replaces: silence until the next round,
 * or an urgent trip and the silence until it arrives.
 */
export function costOfFailure(prices: SilencePrices): Minor {
  const { silenceMinorPerHour: hourly } = prices;
  const urgent = prices.urgentTripMinor + prices.urgentResponseH * hourly;
  return Math.min(prices.nextRoundH * hourly, urgent);
}

/**
 * Cost of a device that stops at `stopsAt` when its visit is due at `visitAt`: silence until then
 * or until the next round, or an urgent trip where that is cheaper. For a device that is out
 * already the visit itself is the answer, so its silence counts in full.
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
  return Math.min(waiting, costOfFailure(prices));
}

/** Expected silence before a visit: quantiles by whether they are out, capped or running. */
function expectedSilence(pack: WaitingPack, now: EpochDays, visitAt: EpochDays): Minor {
  const { life, silenceMinorPerHour: hourly } = pack;
  if (hourly === 0) return 0;
  const perDay = hourly * 24;
  const most = costOfFailure(pack);
  const before = countUpTo(life, Math.min(now, visitAt));
  // Between now and the visit silence runs; what stops long before it costs the cap.
  const capped = Math.max(before, countUpTo(life, visitAt - most / perDay));
  const stopped = Math.max(capped, countUpTo(life, visitAt));
  const out = before * Math.max(0, visitAt - now) * perDay;
  const running = (stopped - capped) * visitAt - sumBetween(life, capped, stopped);
  return (out + (capped - before) * most + running * perDay) / life.length;
}

/** Expected cost of the life that a swap throws away. */
function expectedThrown({ life, keepMinorPerDay }: WaitingPack, visitAt: EpochDays): Minor {
  const from = countUpTo(life, visitAt);
  const unusedDays = sumBetween(life, from, life.length) - (life.length - from) * visitAt;
  return (unusedDays / life.length) * keepMinorPerDay;
}

/** Prices a visit at one moment. Costs a few bisections, however many quantiles there are. */
export function priceVisit(pack: WaitingPack, now: EpochDays, visitAt: EpochDays): VisitPrice {
  const silenceMinor = expectedSilence(pack, now, visitAt);
  const thrownMinor = expectedThrown(pack, visitAt);
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

/** What the silence of a device that is out for certain has cost until now; 0 for any other. */
export function sufferedSoFar(pack: WaitingPack, now: EpochDays): Minor {
  if (countUpTo(pack.life, now) < pack.life.length) return 0;
  return (now - meanLife(pack.life)) * 24 * pack.silenceMinorPerHour;
}

/** The cheapest of several moments, and its price. @throws RangeError when none is given */
export function cheapestVisit(
  pack: WaitingPack,
  now: EpochDays,
  moments: readonly EpochDays[],
): { readonly index: number; readonly price: VisitPrice } {
  if (moments.length === 0) throw new RangeError("no moment to visit was given");
  let index = 0;
  let least = Infinity;
  for (let i = 0; i < moments.length; i++) {
    const total = expectedSilence(pack, now, moments[i]!) + expectedThrown(pack, moments[i]!);
    if (total < least) [index, least] = [i, total];
  }
  return { index, price: priceVisit(pack, now, moments[index]!) };
}

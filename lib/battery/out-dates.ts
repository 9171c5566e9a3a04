/**
 * From the filter's grid to the dates on which the device stops. The time left (`time-left.ts`) is
 * carried through the seasons and cut to what is known (alive then, found stopped then): along the
 * year's course where the cold hardly matters, else through winters whose frosts are not yet known
 * (`cold-stops.ts`).
 */
import { normalCdf, normalQuantile } from "../stats/normal";
import { interpolate } from "../stats/interpolate";
import type { EpochDays } from "../units";
import { ASSUMED } from "./assumptions";
import { type StopCurve, coldStops } from "./cold-stops";
import type { Filtered } from "./filter";
import type { Calibration } from "./pack";
import { type SeasonalClock, seasonalClock } from "./season-clock";
import { type TimeLeft, cumulative, daysAt, massBelow, timeLeftOf } from "./time-left";

/** When the evidence leaves no mass at all, the stop is put into this many days. */
const FALLBACK_DAYS = 30;
const SHALLOWEST = 1e-3;
/** A colder or a milder night that moves the end by less than this share is not followed. */
const WORTH_WEATHER = 0.01;

export interface OutDates {
  /** Day by which the device has stopped with this probability. */
  quantile(probability: number): EpochDays;
  /** Days left on the even clock at a probability, and that clock. */
  daysLeft(probability: number): number;
  readonly clock: SeasonalClock;
  /** Probability of having stopped by `now`. */
  readonly outNow: number;
  /** Depth at which it will likely stop: the warmest end, or what a frost leaves of it. */
  endDepth(depthNow: number): number;
}

/** Distribution of the day the device stops. */
export function outDates(filtered: Filtered, now: EpochDays): OutDates {
  const { model, at, aliveAt, stoppedAt, end } = filtered;
  const left = timeLeftOf(filtered, end.sd);
  const clock = seasonalClock(filtered, left);
  const below = aliveAt === null ? 0 : massBelow(left, aliveAt - at);
  const above = stoppedAt === null ? 1 : massBelow(left, stoppedAt - at);
  const sums = cumulative(left.mass);
  const daysLeft = (probability: number): number =>
    daysAt(left, sums, below + probability * (above - below));
  const range: Range = { below, above, known: above - below > 1e-9 };
  const found =
    end.weather > WORTH_WEATHER
      ? byWeather(filtered, clock, now)
      : byClock(left, range, daysLeft, clock);
  const earliest = model.pack.installedAt;
  const latest = Math.max(now, earliest) + ASSUMED.horizonDays;
  const quantile = (probability: number): EpochDays => {
    if (!found.known) return fallback(probability, filtered);
    const day = found.dateOf(calibrated(probability, model.calibration));
    return Math.min(stoppedAt ?? latest, Math.max(aliveAt ?? earliest, day));
  };
  const share = found.known ? found.chanceBy(now) : 0;
  const outNow = stoppedAt === null ? held(share, model.calibration) : 1;
  const endDepth = (depthNow: number): number => {
    if (!(end.weather > WORTH_WEATHER) || !found.known) return end.warm;
    const likely = depthNow + left.ratePerDay * clock.progress(found.dateOf(0.5));
    return Math.min(end.warm, Math.max(SHALLOWEST, likely));
  };
  return { quantile, daysLeft, clock, outNow, endDepth };
}

interface Range {
  readonly below: number;
  readonly above: number;
  readonly known: boolean;
}

/** The distribution before it is calibrated. */
interface Found {
  /** False: the evidence leaves no mass. */
  readonly known: boolean;
  dateOf(probability: number): EpochDays;
  chanceBy(date: EpochDays): number;
}

function byClock(
  left: TimeLeft,
  { below, above, known }: Range,
  daysLeft: (probability: number) => number,
  clock: SeasonalClock,
): Found {
  return {
    known,
    dateOf: (probability) => clock.dateOf(daysLeft(probability)),
    chanceBy(date) {
      const gone = massBelow(left, clock.reachedAt(date));
      return Math.min(1, Math.max(0, gone - below) / (above - below));
    },
  };
}

function byWeather(filtered: Filtered, clock: SeasonalClock, now: EpochDays): Found {
  const { model, end, aliveAt, stoppedAt } = filtered;
  const from = aliveAt ?? model.pack.installedAt;
  const left = timeLeftOf(filtered, end.ownSd);
  const { days, chances }: StopCurve = coldStops(left, end.nodes(), {
    from,
    until: stoppedAt ?? Math.max(now, from) + ASSUMED.horizonDays,
    progress: clock.progress,
    daysPerDepth: 1 / left.ratePerDay,
    warm: end.warm,
  });
  const all = stoppedAt === null ? 1 : chances.at(-1)!;
  return {
    known: chances.at(-1)! > 1e-9,
    dateOf: (probability) => interpolate(chances, days, probability * all),
    chanceBy: (date) => Math.min(1, interpolate(days, chances, date) / all),
  };
}

/** The probability of the raw distribution that stands for `probability` of the calibrated one. */
function calibrated(probability: number, by: Calibration | null): number {
  if (!by) return probability;
  return normalCdf(by.shift + by.spread * normalQuantile(probability));
}

/** And back. */
function held(chance: number, by: Calibration | null): number {
  if (!by || chance <= 0 || chance >= 1) return chance;
  return normalCdf((normalQuantile(chance) - by.shift) / by.spread);
}

function fallback(probability: number, { aliveAt, stoppedAt, at }: Filtered): EpochDays {
  const from = aliveAt ?? (stoppedAt ?? at) - FALLBACK_DAYS;
  const to = stoppedAt ?? from + FALLBACK_DAYS;
  return from + probability * (to - from);
}

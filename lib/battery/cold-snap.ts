/**
 * A pack can stop in January and come back in March: cold raises its resistance, warmth gives
 * the voltage back. Both dates are worth showing, and the day it stops for good.
 */
import type { EpochDays } from "../units";
import { filterPack } from "./filter";
import { outDates } from "./out-dates";
import type { ForecastInput } from "./pack";
import { assertForecastable } from "./validate";

export interface ColdSnap {
  /** Likely day (median) on which the cold stops the device. */
  readonly stopsAt: EpochDays;
  /** Likely day on which it would come back by itself. */
  readonly returnsAt: EpochDays;
  /** Likely day on which it stops for good. */
  readonly endsAt: EpochDays;
}

/** A cold stop is followed for this long. */
const FOLLOWED_DAYS = 730;
/** A pack that comes back for less than this is not worth the telling. */
const LEAST_RETURN_DAYS = 7;

/**
 * The cold stop ahead of the final one, along the median course; null when the first stop is
 * the last, when it has stopped already, or nothing is known to stop it.
 */
export function coldSnap(input: ForecastInput): ColdSnap | null {
  assertForecastable(input);
  const filtered = filterPack(input);
  const dates = outDates(filtered, input.now);
  const daysLeft = dates.daysLeft(0.5);
  const stopsAt = dates.quantile(0.5);
  if (filtered.stoppedAt !== null || !(daysLeft > 0)) return null;
  let returnsAt: EpochDays | null = null;
  let endsAt = stopsAt;
  for (let day = Math.floor(stopsAt) + 1; day < stopsAt + FOLLOWED_DAYS; day++) {
    if (dates.clock.reachedAt(day) >= daysLeft) continue;
    returnsAt ??= day;
    endsAt = day;
  }
  if (returnsAt === null || endsAt - returnsAt < LEAST_RETURN_DAYS) return null;
  return { stopsAt, returnsAt, endsAt };
}

import type { Decicelsius, EpochDays } from "../units";

/** Mean Gregorian year in days. */
export const DAYS_PER_YEAR = 365.2425;

const MONTH_DAYS = [31, 28.2425, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31] as const;

/** Day of the mean year on which each month begins, with the year's end as 13th entry. */
export const MONTH_STARTS: readonly number[] = MONTH_DAYS.reduce<number[]>(
  (starts, days) => [...starts, starts[starts.length - 1]! + days],
  [0],
);

/** Whole mean years since 1970, rounded down. */
export function yearOf(at: EpochDays): number {
  return Math.floor(at / DAYS_PER_YEAR);
}

/** Day of the mean year (0..365.2425) of a day since 1970-01-01; off by at most a day. */
export function dayOfYear(at: EpochDays): number {
  return Math.max(0, at - yearOf(at) * DAYS_PER_YEAR);
}

/** Month 0..11 of a day since the epoch. */
export function monthOf(at: EpochDays): number {
  const day = dayOfYear(at);
  let month = Math.min(11, Math.floor(day / 30.4));
  while (month > 0 && MONTH_STARTS[month]! > day) month--;
  while (month < 11 && MONTH_STARTS[month + 1]! <= day) month++;
  return month;
}

/** Temperature of a moment: the mean of its month. 20 °C where no climate is given. */
export function temperatureAt(monthlyMeanDc: readonly Decicelsius[], at: EpochDays): Decicelsius {
  return monthlyMeanDc[monthOf(at)] ?? 200;
}

/**
 * Local calendar days and the wall clock of one time zone. The planner's axis is seconds
 * from local midnight as they really pass: on the day the clocks go forward, 08:00 lies seven
 * hours after midnight. So durations stay durations and no visit is an hour out.
 */
import { TZDate } from "@date-fns/tz";
import { MS_PER_DAY, toEpochDays, type EpochDays, type IsoDay, type Seconds } from "@/lib/units";

/** Whole days since 1970-01-01, free of time zones. @throws RangeError when not YYYY-MM-DD */
export function dayNumber(day: IsoDay): number {
  const at = Date.parse(`${day}T00:00:00Z`);
  if (!/^\d{4}-\d{2}-\d{2}$/.test(day) || Number.isNaN(at)) {
    throw new RangeError(`not a calendar day (YYYY-MM-DD): ${day}`);
  }
  return at / MS_PER_DAY;
}

/** The calendar day so many whole days after 1970-01-01. */
export function dayOfNumber(days: number): IsoDay {
  return new Date(Math.floor(days) * MS_PER_DAY).toISOString().slice(0, 10);
}

/** The day `count` days later (earlier when negative). */
export function addDays(day: IsoDay, count: number): IsoDay {
  return dayOfNumber(dayNumber(day) + count);
}

/** Days from `from` to `to`, negative when `to` comes first. */
export function daysBetween(from: IsoDay, to: IsoDay): number {
  return dayNumber(to) - dayNumber(from);
}

/** ISO weekday: Monday 1 to Sunday 7. */
export function weekdayOf(day: IsoDay): number {
  return ((dayNumber(day) + 3) % 7) + 1;
}

/** The Monday of the ISO week in which the day lies. */
export function mondayOf(day: IsoDay): IsoDay {
  return addDays(day, 1 - weekdayOf(day));
}

/** Every day from the first to the last, both included. */
export function daysFrom(first: IsoDay, last: IsoDay): IsoDay[] {
  return Array.from({ length: daysBetween(first, last) + 1 }, (_, i) => addDays(first, i));
}

/** The local calendar day of an instant. */
export function localDay(at: Date, timeZone: string): IsoDay {
  const local = new TZDate(at.getTime(), timeZone);
  const pad = (value: number) => String(value).padStart(2, "0");
  return `${local.getFullYear()}-${pad(local.getMonth() + 1)}-${pad(local.getDate())}`;
}

/** The instant at which a wall clock shows this time; a time that is skipped counts as later. */
export function instantOfWall(day: IsoDay, wallS: Seconds, timeZone: string): Date {
  const [year, month, date] = day.split("-").map(Number) as [number, number, number];
  return new Date(new TZDate(year, month - 1, date, 0, 0, wallS, timeZone).getTime());
}

/**
 * Local midnights by zone and day. They never change, and asking the time zone's rules for one
 * costs more than all the rest of a stop's pricing.
 */
const midnights = new Map<string, number>();
const MOST_MIDNIGHTS = 20_000;

function midnightMs(day: IsoDay, timeZone: string): number {
  const key = `${timeZone} ${day}`;
  const known = midnights.get(key);
  if (known !== undefined) return known;
  if (midnights.size >= MOST_MIDNIGHTS) midnights.clear();
  const at = instantOfWall(day, 0, timeZone).getTime();
  midnights.set(key, at);
  return at;
}

/** Seconds that really pass from local midnight until a wall clock shows this time. */
export function elapsedOfWall(day: IsoDay, wallS: Seconds, timeZone: string): Seconds {
  const midnight = midnightMs(day, timeZone);
  if (midnightMs(addDays(day, 1), timeZone) - midnight === MS_PER_DAY) return wallS;
  return Math.round((instantOfWall(day, wallS, timeZone).getTime() - midnight) / 1000);
}

/** The instant so many seconds after local midnight. */
export function instantOfElapsed(day: IsoDay, elapsedS: Seconds, timeZone: string): Date {
  return new Date(midnightMs(day, timeZone) + elapsedS * 1000);
}

/** Seconds from the local midnight of `day` to an instant. */
export function elapsedOfInstant(day: IsoDay, at: Date, timeZone: string): Seconds {
  return Math.round((at.getTime() - midnightMs(day, timeZone)) / 1000);
}

/** Midday on the forecasts' axis: where a visit on that day is counted. */
export function midday(day: IsoDay, timeZone: string): EpochDays {
  return (
    toEpochDays(new Date(midnightMs(day, timeZone))) + elapsedOfWall(day, 43_200, timeZone) / 86_400
  );
}

/** Seconds from midnight of a clock time HH:MM or HH:MM:SS. @throws RangeError on anything else */
export function secondsOfClock(time: string): Seconds {
  const match = /^([01]\d|2[0-4]):([0-5]\d)(?::([0-5]\d))?$/.exec(time);
  if (!match) throw new RangeError(`not a clock time (HH:MM): ${time}`);
  return Number(match[1]) * 3600 + Number(match[2]) * 60 + Number(match[3] ?? 0);
}

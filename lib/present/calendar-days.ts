import { MS_PER_DAY, type IsoDay } from "@/lib/units";
import { dateFormatter } from "./formatters";

/** A calendar day as whole days since 1970-01-01: free of time zones and of daylight saving. */
export function dayNumber(day: IsoDay): number {
  const at = Date.parse(`${day}T00:00:00Z`);
  if (!/^\d{4}-\d{2}-\d{2}$/.test(day) || Number.isNaN(at)) {
    throw new RangeError(`not a calendar day (YYYY-MM-DD): ${day}`);
  }
  return at / MS_PER_DAY;
}

/** The calendar day so many whole days after 1970-01-01. */
export function dayFromNumber(days: number): IsoDay {
  return new Date(Math.floor(days) * MS_PER_DAY).toISOString().slice(0, 10);
}

/** One for each zone: a page of the Horizon asks for the day of a thousand instants. */
const dayFormatters = new Map<string, Intl.DateTimeFormat>();

/** The calendar day that an instant falls on in a time zone. */
export function dayOfInstant(at: Date, timeZone: string): IsoDay {
  // Swedish writes calendar days as ISO 8601 does; whole texts come four times as fast as parts.
  const formatter =
    dayFormatters.get(timeZone) ??
    new Intl.DateTimeFormat("sv-SE", {
      timeZone,
      year: "numeric",
      month: "2-digit",
      day: "2-digit",
    });
  dayFormatters.set(timeZone, formatter);
  return formatter.format(at).padStart(10, "0");
}

/**
 * An instant on the time axis of the charts, in days since 1970-01-01 as the local calendar counts
 * them: the whole part is the local day, the fraction the share of a 24-hour dial gone by.
 */
export function axisDay(at: Date, timeZone: string): number {
  const parts = dateFormatter("en-US", {
    timeZone,
    hourCycle: "h23",
    hour: "2-digit",
    minute: "2-digit",
  }).formatToParts(at);
  const part = (type: string) => Number(parts.find((p) => p.type === type)?.value ?? 0);
  return dayNumber(dayOfInstant(at, timeZone)) + (part("hour") * 60 + part("minute")) / 1440;
}

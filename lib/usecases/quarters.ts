import type { QuarterStart } from "@/db/queries/forecast-claims";
import type { IsoDay } from "@/lib/units";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { localInstant } from "./local-instant";

/** First day of the quarter that a day lies in. */
export function quarterOf(day: IsoDay): IsoDay {
  const [year, month] = day.split("-");
  return firstDay(Number(year), Math.floor((Number(month) - 1) / 3) * 3 + 1);
}

/** First day of the quarter after the one that begins on a day. */
export function nextQuarter(quarter: IsoDay): IsoDay {
  const [year, month] = quarter.split("-").map(Number) as [number, number];
  return month > 9 ? firstDay(year + 1, 1) : firstDay(year, month + 3);
}

/** The quarter that an instant lies in, with the moment it starts in the time zone. */
export function quarterAround(at: Date, timeZone: string): QuarterStart {
  return startOf(quarterOf(dayOfInstant(at, timeZone)), timeZone);
}

/** Every quarter from the one that `from` lies in to the one of `until`, earliest first. */
export function quartersBetween(from: Date, until: Date, timeZone: string): QuarterStart[] {
  const quarters: QuarterStart[] = [];
  for (let one = quarterAround(from, timeZone); one.at <= until;) {
    quarters.push(one);
    one = startOf(nextQuarter(one.day), timeZone);
  }
  return quarters;
}

/** At four in the morning, an hour that no change of clocks skips. */
function startOf(day: IsoDay, timeZone: string): QuarterStart {
  return { day, at: localInstant(`${day} 04:00`, timeZone, "day") };
}

function firstDay(year: number, month: number): IsoDay {
  return `${year}-${String(month).padStart(2, "0")}-01`;
}

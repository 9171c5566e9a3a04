import { tz } from "@date-fns/tz";
import { getISOWeek, getISOWeekYear } from "date-fns";
import { MS_PER_DAY, type IsoDay } from "@/lib/units";
import { dayNumber, dayOfInstant } from "./calendar-days";
import { formatDay } from "./format-day";
import { NBSP, type Presentation } from "./locale";

/** ISO 8601 week of a calendar day; the week's year may differ from the day's. */
export function isoWeek(day: IsoDay): { year: number; week: number } {
  const at = new Date(dayNumber(day) * MS_PER_DAY);
  const context = { in: tz("UTC") };
  return { year: getISOWeekYear(at, context), week: getISOWeek(at, context) };
}

/** "week 49", with the week's year where it is not today's. */
export function weekLabel(day: IsoDay, today: IsoDay): string {
  const { year, week } = isoWeek(day);
  return `week${NBSP}${week}${year === isoWeek(today).year ? "" : ` of ${year}`}`;
}

/** For the masthead: "Tue 1 Dec 2026 · week 49". */
export function formatToday(now: Date, { locale, timeZone }: Presentation): string {
  const today = dayOfInstant(now, timeZone);
  return `${formatDay(today, locale, { weekday: true, year: true })} · ${weekLabel(today, today)}`;
}

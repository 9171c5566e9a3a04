import { MS_PER_DAY, type IsoDay } from "@/lib/units";
import { dayNumber } from "./calendar-days";
import { EN_DASH, NBSP } from "./locale";
import { dateFormatter } from "./formatters";

export interface DayStyle {
  weekday?: boolean;
  /** "auto" (the default) writes the year where the day could be mistaken without it. */
  year?: boolean | "auto";
  /** For "auto": the day from which it is read. Without it the year is written. */
  today?: IsoDay;
}

/** A day and month without a year is plain only within half a year of today. */
const MISTAKEN_BEYOND_DAYS = 182;

/** A calendar day: "1 Dec", "Tue 1 Dec", "7 Jun 2027" (en-GB), "7. Juni 2027" (de-DE). */
export function formatDay(day: IsoDay, locale: string, style: DayStyle = {}): string {
  const { weekday = false, year = "auto", today } = style;
  const near =
    today !== undefined && Math.abs(dayNumber(day) - dayNumber(today)) <= MISTAKEN_BEYOND_DAYS;
  const withYear = year === "auto" ? !near : year;
  const text = dateFormatter(locale, {
    timeZone: "UTC",
    day: "numeric",
    month: "short",
    ...(weekday && { weekday: "short" }),
    ...(withYear && { year: "numeric" }),
  }).format(new Date(dayNumber(day) * MS_PER_DAY));
  // Some versions of the locale data put a comma after the weekday ("Tue, 1 Dec"); we never do.
  return text.replace(/^(\p{L}+), /u, "$1 ");
}

/** The month in which a calendar day lies: "Dec 2026". */
export function formatMonth(day: IsoDay, locale: string): string {
  const style = { timeZone: "UTC", month: "short", year: "numeric" } as const;
  return dateFormatter(locale, style).format(new Date(dayNumber(day) * MS_PER_DAY));
}

/** Likely cut-off and its range as calendar days. */
export interface CutoffDays {
  readonly p5: IsoDay;
  readonly p50: IsoDay;
  readonly p95: IsoDay;
}

export interface WindowLabel {
  readonly from: string;
  readonly likely: string;
  readonly to: string;
  /** "5 Dec – 1 Jan, likely 15 Dec", for reading out and for plain text. */
  readonly text: string;
}

/** The cut-off window: from the 5th to the 95th percentile, with the median. */
export function formatWindow(window: CutoffDays, locale: string, today: IsoDay): WindowLabel {
  const to = formatDay(window.p95, locale, { today });
  const likely = formatDay(window.p50, locale, yearUnlessSameAs(window.p95, window.p50, today));
  const from = formatDay(window.p5, locale, yearUnlessSameAs(window.p50, window.p5, today));
  return { from, likely, to, text: `${from} ${EN_DASH} ${to}, likely ${likely}` };
}

/** Within a range the year is written once: a day borrows it from the one that follows. */
function yearUnlessSameAs(next: IsoDay, day: IsoDay, today: IsoDay): DayStyle {
  return day.slice(0, 4) === next.slice(0, 4) ? { year: false } : { today };
}

/** Distance in days in words: "today", "in 3 days", "5 days ago". */
export function formatDaysAway(day: IsoDay, today: IsoDay): string {
  const days = dayNumber(day) - dayNumber(today);
  if (days === 0) return "today";
  if (days === 1) return "tomorrow";
  if (days === -1) return "yesterday";
  return days > 0 ? `in ${days}${NBSP}days` : `${-days}${NBSP}days ago`;
}

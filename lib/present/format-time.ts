import { formatNumber, NBSP, type Presentation } from "./locale";
import { dayOfInstant } from "./calendar-days";
import { formatDay, type DayStyle } from "./format-day";
import { dateFormatter } from "./formatters";

const MINUTE_MS = 60_000;

function clock(at: Date, locale: string, timeZone: string, zone: boolean): string {
  return dateFormatter(locale, {
    timeZone,
    hour: "2-digit",
    minute: "2-digit",
    hourCycle: "h23",
    ...(zone && { timeZoneName: "short" }),
  }).format(at);
}

/** Clocks go back by half an hour or by an hour; that local time then comes twice. */
function comesTwice(at: Date, timeZone: string): boolean {
  const stamp = (instant: Date) =>
    `${dayOfInstant(instant, timeZone)} ${clock(instant, "en-GB", timeZone, false)}`;
  const here = stamp(at);
  return [-60, -30, 30, 60].some(
    (minutes) => stamp(new Date(at.getTime() + minutes * MINUTE_MS)) === here,
  );
}

/**
 * Local time of day on 24 hours, "09:52". In the hour that comes twice when summer time ends the
 * zone is added ("01:30 GMT"), so that it cannot be mistaken.
 */
export function formatTime(at: Date, { locale, timeZone }: Presentation): string {
  return clock(at, locale, timeZone, comesTwice(at, timeZone));
}

/** Day and time of an instant: "Tue 1 Dec 2026, 09:52". */
export function formatInstant(at: Date, presentation: Presentation, style: DayStyle = {}): string {
  const day = dayOfInstant(at, presentation.timeZone);
  const date = formatDay(day, presentation.locale, { weekday: true, ...style });
  return `${date}, ${formatTime(at, presentation)}`;
}

/** Working time as decimal hours: "31.5 h". */
export function formatHours(seconds: number, locale: string): string {
  return `${formatNumber(seconds / 3600, locale, 1)}${NBSP}h`;
}

/** A length of time in hours and minutes: "6 h 50 min", "35 min". Rounded to the minute. */
export function formatDuration(seconds: number, locale: string): string {
  const minutes = Math.round(Math.abs(seconds) / 60);
  const sign = seconds < 0 && minutes > 0 ? "−" : "";
  const hours = Math.floor(minutes / 60);
  const rest = minutes % 60;
  if (hours === 0) return `${sign}${rest}${NBSP}min`;
  const head = `${sign}${formatNumber(hours, locale)}${NBSP}h`;
  return rest === 0 ? head : `${head} ${rest}${NBSP}min`;
}

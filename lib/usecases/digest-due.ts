import { dayNumber, dayOfInstant } from "@/lib/present/calendar-days";

export interface DigestTiming {
  /** ISO weekdays, Monday 1. */
  readonly weekdays: readonly number[];
  /** Local time of day, "HH:MM" or "HH:MM:SS". */
  readonly sendAt: string;
  /** The local day of the last one, YYYY-MM-DD. */
  readonly lastSentOn: string | null;
}

/**
 * Whether a digest is to be sent now: on a chosen weekday, from the chosen local time on, once a
 * day. A time that the clocks jump over is due at the jump; one that comes twice is sent at the
 * first. One missed (nobody was working) is sent late the same day, never the next.
 */
export function digestDue(timing: DigestTiming, now: Date, timeZone: string): boolean {
  const today = dayOfInstant(now, timeZone);
  if (!timing.weekdays.includes(isoWeekday(today))) return false;
  if (timing.lastSentOn !== null && timing.lastSentOn >= today) return false;
  return localClock(now, timeZone) >= timing.sendAt.slice(0, 5);
}

/** Monday 1 to Sunday 7; 1970-01-01 was a Thursday. */
function isoWeekday(day: string): number {
  return ((((dayNumber(day) + 3) % 7) + 7) % 7) + 1;
}

/** Local time as "HH:MM", which sorts as it runs. */
function localClock(at: Date, timeZone: string): string {
  return new Intl.DateTimeFormat("en-GB", {
    timeZone,
    hour: "2-digit",
    minute: "2-digit",
    hourCycle: "h23",
  }).format(at);
}

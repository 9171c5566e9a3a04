import { tzOffset } from "@date-fns/tz";

export type DayOrder = "year-first" | "day-first" | "month-first";

export type InstantReading =
  { readonly at: Date; readonly trouble: null } | { readonly at: null; readonly trouble: string };

const OFFSET = /(Z|[+-]\d{2}:?\d{2})$/i;
const TIME = /^(\d{1,2}):(\d{2})(?::(\d{2})(?:[.,]\d+)?)?$/;
const YEAR_FIRST = /^(\d{4})[-/.](\d{1,2})[-/.](\d{1,2})$/;
const YEAR_LAST = /^(\d{1,2})[-/.](\d{1,2})[-/.](\d{4})$/;
const MINUTE_MS = 60_000;
const DAY_MS = 86_400_000;

/**
 * Reads a day and time: ISO 8601 with an offset, or local time in the organisation's zone.
 * A local time that the spring change skips is refused; of one that comes twice the first is
 * taken. A day alone is its noon.
 */
export function readInstant(text: string, timeZone: string, order: DayOrder): InstantReading {
  const offset = OFFSET.exec(text.trim())?.[1];
  const bare = offset ? text.trim().slice(0, -offset.length) : text.trim();
  const [dayText = "", timeText = "12:00", ...rest] = bare.split(/[T\s]+/);
  const day = readDay(dayText, order);
  const time = TIME.exec(timeText);
  if (!day || !time || rest.length > 0) return trouble(`"${text}" is no date and time`);
  const [hour, minute, second] = [Number(time[1]), Number(time[2]), Number(time[3] ?? 0)];
  if (hour > 23 || minute > 59 || second > 59) return trouble(`${timeText} is no time of day`);
  const wall = Date.parse(`${day}T00:00:00Z`) + ((hour * 60 + minute) * 60 + second) * 1000;
  if (offset) return { at: new Date(wall - offsetMinutes(offset) * MINUTE_MS), trouble: null };
  const at = fromWall(wall, timeZone);
  return at ?? trouble(`${day} ${timeText} does not exist: the clocks went forward`);
}

/** A calendar day as YYYY-MM-DD; null when it is none. */
export function readDay(text: string, order: DayOrder): string | null {
  const first = YEAR_FIRST.exec(text.trim());
  if (first) return calendarDay(first[1], first[2], first[3]);
  const last = YEAR_LAST.exec(text.trim());
  if (!last) return null;
  return order === "month-first"
    ? calendarDay(last[3], last[1], last[2])
    : calendarDay(last[3], last[2], last[1]);
}

function calendarDay(year = "", month = "", day = ""): string | null {
  const inMonth = Number(day) >= 1 && Number(day) <= daysIn(Number(year), Number(month));
  return inMonth ? `${year}-${month.padStart(2, "0")}-${day.padStart(2, "0")}` : null;
}

/** Days in a month of the Gregorian calendar; none in a month that is none. */
function daysIn(year: number, month: number): number {
  const leap = year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0);
  return [31, leap ? 29 : 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31][month - 1] ?? 0;
}

/** The instant at which local clocks show this; the first where they show it twice. */
function fromWall(wall: number, timeZone: string): InstantReading | null {
  const day = Math.floor(wall / DAY_MS);
  const before = offsetAtDay(timeZone, day - 1);
  const after = offsetAtDay(timeZone, day + 2);
  // The larger offset gives the earlier instant.
  for (const minutes of before === after ? [before] : [before, after].sort((a, b) => b - a)) {
    const at = wall - minutes * MINUTE_MS;
    if (before === after || tzOffset(timeZone, new Date(at)) === minutes) {
      return { at: new Date(at), trouble: null };
    }
  }
  return null;
}

/** Offsets by the day: a file of years needs few, and a zone's offset is slow to ask for. */
const offsets = new Map<string, number>();

function offsetAtDay(timeZone: string, day: number): number {
  const key = `${timeZone} ${day}`;
  const known = offsets.get(key);
  if (known !== undefined) return known;
  const value = tzOffset(timeZone, new Date(day * DAY_MS));
  if (offsets.size > 50_000) offsets.clear();
  offsets.set(key, value);
  return value;
}

function offsetMinutes(text: string): number {
  if (text.toUpperCase() === "Z") return 0;
  const [, sign, hours, minutes] = /^([+-])(\d{2}):?(\d{2})$/.exec(text) ?? [];
  return (sign === "-" ? -1 : 1) * (Number(hours) * 60 + Number(minutes));
}

function trouble(message: string): InstantReading {
  return { at: null, trouble: message };
}

import { tzOffset } from "@date-fns/tz";

/** Days of the organisation and instants, in its time zone. */
export const TIME_ZONE = "Europe/London";

const MINUTE_MS = 60_000;
const HOUR_MS = 3_600_000;
const DAY_MS = 86_400_000;

/** The local calendar day of an instant, as an epoch-day number. */
export function localDay(at: Date): number {
  return Math.floor((at.getTime() + tzOffset(TIME_ZONE, at) * MINUTE_MS) / DAY_MS);
}

const offsets = new Map<number, number>();

/** Offset of the zone at an instant, minutes; looked up once an hour at most, for speed. */
function offsetAt(utcMs: number): number {
  const hour = Math.floor(utcMs / HOUR_MS);
  let offset = offsets.get(hour);
  if (offset === undefined) {
    offset = tzOffset(TIME_ZONE, new Date(hour * HOUR_MS));
    offsets.set(hour, offset);
  }
  return offset;
}

/** The instant at `minutes` past local midnight of a day. */
export function localInstant(day: number, minutes: number): Date {
  const utc = day * DAY_MS + minutes * MINUTE_MS;
  const first = utc - offsetAt(utc) * MINUTE_MS;
  return new Date(utc - offsetAt(first) * MINUTE_MS);
}

/** Monday 1 … Sunday 7. */
export function weekdayOf(day: number): number {
  return ((((day + 3) % 7) + 7) % 7) + 1;
}

export function isoDay(day: number): string {
  return new Date(day * DAY_MS).toISOString().slice(0, 10);
}

/** Fractional epoch day of an instant: the simulator's time. */
export function worldTime(at: Date): number {
  return at.getTime() / DAY_MS;
}

export function fromWorldTime(day: number): Date {
  return new Date(Math.round(day * DAY_MS));
}

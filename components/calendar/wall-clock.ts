/**
 * The calendar library works on the browser's own clock. Visits are shown on the organisation's:
 * an instant becomes the local date whose parts read as that clock does, and back to a day.
 */
export function onWallClock(iso: string, timeZone: string): Date {
  const parts = new Intl.DateTimeFormat("en-GB", {
    timeZone,
    hourCycle: "h23",
    year: "numeric",
    month: "numeric",
    day: "numeric",
    hour: "numeric",
    minute: "numeric",
  }).formatToParts(new Date(iso));
  const part = (type: string) => Number(parts.find((p) => p.type === type)?.value ?? 0);
  return new Date(part("year"), part("month") - 1, part("day"), part("hour"), part("minute"));
}

/** The calendar day that a local date shows. */
export function dayShown(date: Date): string {
  const pad = (value: number) => String(value).padStart(2, "0");
  return `${date.getFullYear()}-${pad(date.getMonth() + 1)}-${pad(date.getDate())}`;
}

/** Noon of a calendar day on the browser's clock. */
export function dateOfDay(day: string): Date {
  const [year = 1970, month = 1, date = 1] = day.split("-").map(Number);
  return new Date(year, month - 1, date, 12);
}

const WEEK_MS = 7 * 86_400_000;

/** The same weekday so many weeks later; calendar days have no time zone. */
export function weekAfter(day: string, weeks: number): string {
  return new Date(Date.parse(`${day}T00:00:00Z`) + weeks * WEEK_MS).toISOString().slice(0, 10);
}

/** 1970-01-05 was a Monday. */
const MONDAY_MS = 4 * 86_400_000;

/** An ISO weekday (Monday 1) in the locale's words: "Monday", or "Mon" when short. */
export function weekdayName(
  weekday: number,
  locale: string,
  style: "long" | "short" = "long",
): string {
  return new Intl.DateTimeFormat(locale, { weekday: style, timeZone: "UTC" }).format(
    new Date(MONDAY_MS + (weekday - 1) * 86_400_000),
  );
}

export const WEEKDAYS = [1, 2, 3, 4, 5, 6, 7] as const;

/** "Mon, Wed and Fri"; "every day" for all seven. */
export function weekdayList(weekdays: readonly number[], locale: string): string {
  if (weekdays.length === 7) return "every day";
  const names = [...weekdays].sort().map((day) => weekdayName(day, locale, "short"));
  return names.length < 2
    ? (names[0] ?? "no day")
    : `${names.slice(0, -1).join(", ")} and ${names.at(-1)}`;
}

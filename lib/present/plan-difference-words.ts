import { weekdayOf } from "@/lib/planning/local-time";
import { formatNumber } from "./locale";
import { weekdayName } from "./weekday-names";

interface DifferenceInput {
  readonly moved: { readonly length: number };
  readonly added: { readonly length: number };
  readonly dropped: { readonly length: number };
  readonly kept: number;
  readonly touchedDays: readonly string[];
  readonly untouchedDays: readonly string[];
}

/** "3 visits moved, 1 new, 2 dropped; nobody's Monday or Tuesday is touched." */
export function differenceWords(difference: DifferenceInput, locale: string): string {
  const { moved, added, dropped, kept } = difference;
  const number = (n: number) => formatNumber(n, locale);
  const parts = [
    moved.length > 0 && `${number(moved.length)} ${moved.length === 1 ? "visit" : "visits"} moved`,
    added.length > 0 && `${number(added.length)} new`,
    dropped.length > 0 && `${number(dropped.length)} dropped`,
  ].filter(Boolean);
  if (parts.length === 0) return kept > 0 ? "No visit changes its day or its technician." : "";
  const days = calmWeekdays(difference).map((weekday) => weekdayName(weekday, locale));
  const calm = days.length > 0 ? `; nobody's ${either(days)} is touched` : "";
  return `${parts.join(", ")}${calm}.`;
}

/** Weekdays of which none is touched, in the order of the plan. */
function calmWeekdays({ touchedDays, untouchedDays }: DifferenceInput): number[] {
  const touched = new Set(touchedDays.map(weekdayOf));
  return [...new Set(untouchedDays.map(weekdayOf))].filter((weekday) => !touched.has(weekday));
}

function either(words: readonly string[]): string {
  if (words.length < 2) return words.join();
  return `${words.slice(0, -1).join(", ")} or ${words.at(-1)}`;
}

import type { IsoDay } from "@/lib/units";
import { dayNumber } from "./calendar-days";
import { formatDay } from "./format-day";
import { weekLabel } from "./format-week";

export interface LeftOutInput {
  readonly reason: string;
  readonly detail: string;
  readonly earliestDay: IsoDay | null;
}

/** Why something is left out, with the day from which it could be done. */
export function leftOutWords(row: LeftOutInput, today: IsoDay, locale: string): string {
  const { earliestDay: day, detail } = row;
  if (!day) return detail;
  if (row.reason === "cheaper_later") {
    const far = dayNumber(day) - dayNumber(today) > 60;
    const when = far
      ? formatDay(day, locale, { today })
      : `${weekLabel(day, today)} (${formatDay(day, locale, { weekday: true, today })})`;
    return detail.replace("cheaper later", far ? `cheaper about ${when}` : `cheaper in ${when}`);
  }
  return `${detail}: earliest ${formatDay(day, locale, { weekday: true, today })}`;
}

import type { IsoDay } from "@/lib/units";
import { dayNumber } from "./calendar-days";
import { formatDay } from "./format-day";

export interface SurpriseInput {
  /** It stopped before its window; else it outlived the window. */
  readonly stopped: boolean;
  readonly endedOn: IsoDay;
  readonly reasonOut: string | null;
  readonly readings: number;
  readonly monthlyMeanDc: readonly number[] | null;
  readonly weakLot: string | null;
  readonly drawShiftSince: IsoDay | null;
  readonly drawFactor: number | null;
}

/** A finding dates a shift late: voltages show it only after some weeks of the new draw. */
const SHIFT_SEEN_LATE_DAYS = 200;
/** Months this mild stop nobody by their cold; tenths of a degree. */
const COLD_MONTH_DC = 60;

/** The likeliest reason why a pack ended outside its window, in words. */
export function surpriseCause(pack: SurpriseInput, locale: string): string {
  if (pack.reasonOut === "fault") return "came out for a fault: perhaps not the cells";
  if (pack.reasonOut === "device_removed") return "the device was taken away";
  if (pack.stopped && pack.weakLot) return `its lot ${pack.weakLot} is weak`;
  const shifted = shiftedBefore(pack);
  if (shifted !== null && shifted > 1 === pack.stopped) {
    const since = formatDay(pack.drawShiftSince ?? pack.endedOn, locale);
    return `its model draws ${shifted > 1 ? "more" : "less"} since about ${since}`;
  }
  if (pack.stopped && isCold(pack)) return "stopped in the coldest months";
  if (pack.readings === 0) return "no voltage was taken: only the data sheet spoke";
  return pack.stopped ? "not explained" : "draws less, or holds more, than its sheets say";
}

function shiftedBefore({ drawShiftSince, drawFactor, endedOn }: SurpriseInput): number | null {
  if (drawShiftSince === null || drawFactor === null) return null;
  return dayNumber(endedOn) > dayNumber(drawShiftSince) - SHIFT_SEEN_LATE_DAYS ? drawFactor : null;
}

/** One of the three coldest months of a place with a winter. */
function isCold({ monthlyMeanDc, endedOn }: SurpriseInput): boolean {
  if (!monthlyMeanDc) return false;
  const month = Number(endedOn.slice(5, 7)) - 1;
  const own = monthlyMeanDc[month] ?? Infinity;
  const third = [...monthlyMeanDc].sort((a, b) => a - b)[2] ?? -Infinity;
  return own <= third && own <= COLD_MONTH_DC;
}

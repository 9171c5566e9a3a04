import { MS_PER_DAY, type IsoDay } from "@/lib/units";
import { dayNumber } from "./calendar-days";

export interface AxisTick {
  readonly x: number;
  readonly label: string;
}

/** A shared time axis as plain data: every strip under one head is drawn on the same one. */
export interface TimeAxis {
  /** Days since 1970-01-01. */
  readonly fromDay: number;
  readonly toDay: number;
  readonly widthPx: number;
  readonly ticks: readonly AxisTick[];
}

/** Where a day (days since 1970-01-01, may be fractional or beyond the ends) falls, in px. */
export function xOf(axis: Pick<TimeAxis, "fromDay" | "toDay" | "widthPx">, day: number): number {
  const share = (day - axis.fromDay) / (axis.toDay - axis.fromDay);
  return Math.round(share * axis.widthPx * 10) / 10;
}

const MIN_TICK_PX = 46;
const LABEL_PX = 40;

export interface TimeAxisInput {
  from: IsoDay;
  to: IsoDay;
  widthPx: number;
  locale: string;
}

/** An axis with a tick on the first of each month, or of fewer where months would crowd. */
export function timeAxis({ from, to, widthPx, locale }: TimeAxisInput): TimeAxis {
  const fromDay = dayNumber(from);
  const toDay = dayNumber(to);
  if (toDay <= fromDay) throw new RangeError(`a time axis must run forward: ${from} to ${to}`);
  const pxPerMonth = (widthPx / (toDay - fromDay)) * 30.44;
  const step = [1, 2, 3, 6, 12].find((months) => months * pxPerMonth >= MIN_TICK_PX) ?? 24;
  const scale = { fromDay, toDay, widthPx };
  const start = new Date(fromDay * MS_PER_DAY);
  const ticks: AxisTick[] = [];
  for (let month = -start.getUTCMonth(); ; month += step) {
    const first = Date.UTC(start.getUTCFullYear(), start.getUTCMonth() + month, 1);
    const day = first / MS_PER_DAY;
    if (day > toDay) break;
    if (day < fromDay) continue;
    ticks.push({ x: xOf(scale, day), label: tickLabel(new Date(first), step, locale) });
  }
  return { ...scale, ticks: ticks.map((tick) => withoutCrowdedLabel(tick, widthPx)) };
}

function tickLabel(first: Date, step: number, locale: string): string {
  const january = first.getUTCMonth() === 0;
  return new Intl.DateTimeFormat(locale, {
    timeZone: "UTC",
    ...(step < 12 && { month: "short" }),
    ...((january || step >= 12) && { year: "numeric" }),
  }).format(first);
}

/** A label that would run out of the picture is left off; its tick stays. */
function withoutCrowdedLabel(tick: AxisTick, widthPx: number): AxisTick {
  return tick.x + LABEL_PX > widthPx ? { ...tick, label: "" } : tick;
}

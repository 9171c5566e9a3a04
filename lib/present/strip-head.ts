import { scaleLinear } from "d3-scale";
import type { IsoDay } from "@/lib/units";
import { dayNumber } from "./calendar-days";
import { formatDay } from "./format-day";
import { formatNumber } from "./locale";
import { xOf, type AxisTick, type TimeAxis } from "./time-axis";

export interface WeekExpectation {
  /** The week's first day. */
  readonly from: IsoDay;
  /** Packs expected to reach cut-off in the week, with the 5th and 95th percentile. */
  readonly expected: number;
  readonly low: number;
  readonly high: number;
}

export interface StripHeadInput {
  axis: TimeAxis;
  today: IsoDay;
  weeks: readonly WeekExpectation[];
  /** Weeks that begin before this day are drawn as soon. */
  soonUntil: IsoDay;
  locale: string;
}

export interface WeekBar {
  readonly x: number;
  readonly width: number;
  readonly top: number;
  readonly lowY: number;
  readonly highY: number;
  readonly soon: boolean;
  readonly label: string;
}

export interface StripHeadModel {
  readonly title: string;
  readonly description: string;
  readonly width: number;
  readonly height: number;
  readonly baseline: number;
  readonly nowX: number;
  readonly bars: readonly WeekBar[];
  readonly months: readonly AxisTick[];
  /** The one ruled line of the scale, with its number. */
  readonly scaleLine: { readonly y: number; readonly label: string } | null;
}

export const HEAD_HEIGHT = 62;
const BASELINE = 44;
const TOP = 6;
const DAYS_PER_WEEK = 7;

/** The head of a stack of strips: the fleet's expected cut-offs a week, with their spread. */
export function stripHead(input: StripHeadInput): StripHeadModel {
  const { axis, weeks, soonUntil, today, locale } = input;
  const most = Math.max(1, ...weeks.map((week) => week.high));
  const y = scaleLinear([0, most], [BASELINE, TOP]);
  const round = (value: number) => Math.round(value * 10) / 10;
  const rule = y
    .ticks(3)
    .filter((tick) => tick > 0 && tick <= most && Number.isInteger(tick))
    .at(-1);
  const bars = weeks.flatMap((week): WeekBar[] => {
    const x1 = Math.max(0, xOf(axis, dayNumber(week.from)));
    const x2 = Math.min(axis.widthPx, xOf(axis, dayNumber(week.from) + DAYS_PER_WEEK));
    if (x2 - x1 < 2) return [];
    return [
      {
        x: round(x1 + 0.75),
        width: round(x2 - x1 - 1.5),
        top: round(y(week.expected)),
        lowY: round(y(week.low)),
        highY: round(y(week.high)),
        soon: dayNumber(week.from) < dayNumber(soonUntil),
        label: weekWords(week, today, locale),
      },
    ];
  });
  return {
    title: "Packs expected to reach cut-off, a week",
    description: bars.map((bar) => bar.label).join("; "),
    width: axis.widthPx,
    height: HEAD_HEIGHT,
    baseline: BASELINE,
    nowX: xOf(axis, dayNumber(today)),
    bars,
    months: axis.ticks,
    scaleLine: rule === undefined ? null : { y: round(y(rule)), label: formatNumber(rule, locale) },
  };
}

function weekWords(week: WeekExpectation, today: IsoDay, locale: string): string {
  const count = (value: number) => formatNumber(value, locale, value < 10 ? 1 : 0, false);
  const range = `${count(week.low)}–${count(week.high)}`;
  return `week of ${formatDay(week.from, locale, { today })}: ${count(week.expected)} (${range})`;
}

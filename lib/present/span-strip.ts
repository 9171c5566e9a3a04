import type { IsoDay } from "@/lib/units";
import { dayNumber } from "./calendar-days";
import { formatDay, formatWindow, type CutoffDays } from "./format-day";
import { xOf, type TimeAxis } from "./time-axis";
import type { Tone } from "./tone";

export interface StripVisit {
  readonly day: IsoDay;
  /** Published visits bind; the others are proposed. */
  readonly published: boolean;
}

export interface SpanStripInput {
  axis: TimeAxis;
  today: IsoDay;
  /** Whose strip it is, for reading out: a tag. */
  subject: string;
  installed: IsoDay | null;
  /** The day the device stopped or the pack came out. */
  ended: IsoDay | null;
  readings: readonly IsoDay[];
  cutoff: CutoffDays | null;
  visits: readonly StripVisit[];
  tone: Tone;
  locale: string;
  /** The cut-off and the visit stand in words beside the strip: they are not read out twice. */
  datesBeside?: boolean;
}

/** What all strips of one axis share. */
export interface StripScale {
  readonly width: number;
  readonly gridX: readonly number[];
  readonly nowX: number;
}

/** From x1 to x2, in px along the axis. */
export interface Span {
  readonly x1: number;
  readonly x2: number;
}

export interface Spindle {
  readonly fromX: number;
  readonly medianX: number;
  readonly toX: number;
}

export interface Pennant {
  readonly x: number;
  readonly published: boolean;
}

export interface SpanStripModel {
  readonly title: string;
  readonly description: string;
  readonly tone: Tone;
  /** In service, known. */
  readonly past: Span | null;
  /** In service, expected: from today to the 5th percentile. */
  readonly ahead: Span | null;
  readonly endX: number | null;
  readonly dots: readonly number[];
  readonly spindle: Spindle | null;
  /** The likely cut-off lies outside the axis at that side. */
  readonly beyond: "before" | "after" | null;
  readonly pennants: readonly Pennant[];
}

export const STRIP_HEIGHT = 38;
export const STRIP_MID = STRIP_HEIGHT / 2;
export const SPINDLE_TOP = STRIP_MID - 11;
export const SPINDLE_BOTTOM = STRIP_MID + 11;
/** Narrower than this a spindle could not be seen. */
const SPINDLE_HALF_WIDTH_MIN = 2.5;

/** The ground under a stack of strips: where the ticks of the axis and today stand. */
export function stripScale(axis: TimeAxis, today: IsoDay): StripScale {
  return {
    width: axis.widthPx,
    gridX: axis.ticks.map((tick) => tick.x),
    nowX: xOf(axis, dayNumber(today)),
  };
}

/** One pack on a shared time axis: service, readings, cut-off window and visits. */
export function spanStrip(input: SpanStripInput): SpanStripModel {
  const { axis, readings, visits, ended } = input;
  const at = (day: IsoDay) => xOf(axis, dayNumber(day));
  const inside = (x: number) => x >= 0 && x <= axis.widthPx;
  const spindle = input.cutoff && spindleOf(input.cutoff, at);
  return {
    title: input.subject,
    description: describe(input),
    tone: input.tone,
    ...serviceSpans(input, at, spindle),
    endX: ended && inside(at(ended)) ? at(ended) : null,
    dots: readings.map(at).filter(inside),
    spindle,
    beyond: beyondOf(spindle, axis.widthPx),
    pennants: visits
      .filter((visit) => inside(at(visit.day)))
      .map((visit) => ({ x: at(visit.day), published: visit.published })),
  };
}

function serviceSpans(
  { axis, today, installed, ended }: SpanStripInput,
  at: (day: IsoDay) => number,
  spindle: Spindle | null,
): Pick<SpanStripModel, "past" | "ahead"> {
  if (installed === null) return { past: null, ahead: null };
  const clip = (x1: number, x2: number): Span | null => {
    const span = { x1: Math.max(0, x1), x2: Math.min(axis.widthPx, x2) };
    return span.x2 > span.x1 ? span : null;
  };
  const nowX = at(today);
  const knownUntil = ended === null ? nowX : at(ended);
  const serviceEnds = spindle ? Math.min(knownUntil, spindle.fromX) : knownUntil;
  return {
    past: clip(at(installed), ended === null ? serviceEnds : knownUntil),
    ahead: ended === null && spindle ? clip(nowX, spindle.fromX) : null,
  };
}

function spindleOf({ p5, p50, p95 }: CutoffDays, at: (day: IsoDay) => number): Spindle {
  const medianX = at(p50);
  return {
    fromX: Math.min(at(p5), medianX - SPINDLE_HALF_WIDTH_MIN),
    medianX,
    toX: Math.max(at(p95), medianX + SPINDLE_HALF_WIDTH_MIN),
  };
}

/** Thin as a needle at both ends, full at the median. */
export function spindlePath({ fromX: a, medianX: m, toX: b }: Spindle): string {
  const [mid, top, bottom] = [STRIP_MID, SPINDLE_TOP, SPINDLE_BOTTOM];
  const left = m - a;
  const right = b - m;
  const n = (value: number) => Math.round(value * 10) / 10;
  const l1 = n(a + left * 0.6);
  const l2 = n(m - left * 0.25);
  const r1 = n(b - right * 0.6);
  const r2 = n(m + right * 0.25);
  return (
    `M${a} ${mid}C${l1} ${mid} ${l2} ${top} ${m} ${top}C${r2} ${top} ${r1} ${mid} ${b} ${mid}` +
    `C${r1} ${mid} ${r2} ${bottom} ${m} ${bottom}C${l2} ${bottom} ${l1} ${mid} ${a} ${mid}Z`
  );
}

function beyondOf(spindle: Spindle | null, width: number): SpanStripModel["beyond"] {
  if (!spindle) return null;
  if (spindle.medianX > width) return "after";
  return spindle.medianX < 0 ? "before" : null;
}

/** A pole with a swallow-tailed flag; near the right edge the flag flies to the left. */
export function pennantPath(x: number, width: number): string {
  const way = x + 14 > width ? -1 : 1;
  return `M${x} 36V4h${13 * way}l${-4 * way} 5 ${4 * way} 5h${-13 * way}`;
}

function describe(input: SpanStripInput): string {
  const { installed, ended, readings, today, locale } = input;
  const day = (value: IsoDay) => formatDay(value, locale, { today });
  return [
    installed ? `in service since ${day(installed)}` : "no pack installed",
    ended && `ended ${day(ended)}`,
    `${readings.length} ${readings.length === 1 ? "reading" : "readings"}`,
    ...(input.datesBeside ? [] : datesInWords(input)),
  ]
    .filter(Boolean)
    .join("; ");
}

function datesInWords({ cutoff, visits, today, locale }: SpanStripInput): string[] {
  return [
    cutoff ? `cut-off ${formatWindow(cutoff, locale, today).text}` : "no forecast",
    ...visits.map(
      (visit) =>
        `visit ${visit.published ? "published" : "proposed"} for ` +
        formatDay(visit.day, locale, { today, weekday: true }),
    ),
  ];
}

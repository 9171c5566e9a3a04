import type { IsoDay } from "@/lib/units";
import { dayFromNumber, dayNumber, dayOfInstant } from "./calendar-days";
import { dayShift } from "./day-shift";
import { type CutoffDays, formatDaysAway, formatWindow, type WindowLabel } from "./format-day";
import { formatCurrent } from "./format-quantity";
import { shareLabel } from "./format-share";
import type { Presentation } from "./locale";
import { type SpanStripModel, spanStrip, type StripScale, stripScale } from "./span-strip";
import { type TimeAxis, timeAxis } from "./time-axis";
import { packTone, type Tone } from "./tone";

/** A forecast as two of them are compared. */
export interface ComparedForecast {
  readonly p05: Date;
  readonly p50: Date;
  readonly p95: Date;
  readonly shareLeft: number;
  readonly drawUa: number;
  readonly outNow: number;
}

export interface WhatIfRow {
  readonly key: "now" | "then";
  readonly label: string;
  readonly strip: SpanStripModel;
  readonly window: WindowLabel;
  readonly away: string;
  readonly left: string;
  readonly draw: string;
  readonly tone: Tone;
}

export interface WhatIfModel {
  readonly axis: TimeAxis;
  readonly scale: StripScale;
  readonly rows: readonly WhatIfRow[];
  /** "9 days earlier". */
  readonly shift: string;
}

/** On a desk, and on a phone 390 px wide. */
const AXIS_PX = { wide: 620, narrow: 324 } as const;
/** More likely out than not. */
const OUT = 0.5;

export interface WhatIfInput {
  readonly tag: string;
  readonly installedAt: Date;
  readonly today: IsoDay;
  readonly now: ComparedForecast;
  readonly then: ComparedForecast;
  readonly room: keyof typeof AXIS_PX;
}

/** The forecast as it stands and as it would be: two strips on one axis, the dates in words. */
export function whatIfModel(input: WhatIfInput, presentation: Presentation): WhatIfModel {
  const axis = axisOf(input, presentation);
  const row = (key: "now" | "then", label: string) =>
    rowOf(input, { key, label, axis }, presentation);
  const days = (input.then.p50.getTime() - input.now.p50.getTime()) / 86_400_000;
  return {
    axis,
    scale: stripScale(axis, input.today),
    rows: [row("now", "As it is"), row("then", "What if")],
    shift: dayShift(days),
  };
}

/** From a little before today to past both windows, or to where their middles still show. */
function axisOf(
  { today, now, then, room }: WhatIfInput,
  { locale, timeZone }: Presentation,
): TimeAxis {
  const day = (at: Date) => dayNumber(dayOfInstant(at, timeZone));
  const start = dayNumber(today) - 45;
  const middles = Math.max(day(now.p50), day(then.p50), dayNumber(today));
  const ends = Math.max(day(now.p95), day(then.p95));
  const to = Math.max(middles + 30, Math.min(ends + 14, middles + 2 * (middles - start)));
  return timeAxis({
    from: dayFromNumber(start),
    to: dayFromNumber(to),
    widthPx: AXIS_PX[room],
    locale,
  });
}

function rowOf(
  input: WhatIfInput,
  place: { readonly key: "now" | "then"; readonly label: string; readonly axis: TimeAxis },
  { locale, timeZone }: Presentation,
): WhatIfRow {
  const { today, tag } = input;
  const forecast = input[place.key];
  const day = (at: Date) => dayOfInstant(at, timeZone);
  const cutoff: CutoffDays = {
    p5: day(forecast.p05),
    p50: day(forecast.p50),
    p95: day(forecast.p95),
  };
  const isOut = forecast.outNow >= OUT;
  const tone = packTone({ isOut, daysToLikely: dayNumber(cutoff.p50) - dayNumber(today) });
  return {
    key: place.key,
    label: place.label,
    tone,
    window: formatWindow(cutoff, locale, today),
    away: formatDaysAway(cutoff.p50, today),
    left: shareLabel({ share: forecast.shareLeft, isOut }, locale),
    draw: formatCurrent(forecast.drawUa, locale),
    strip: spanStrip({
      ...{ axis: place.axis, today, cutoff, tone, locale, ended: null, readings: [], visits: [] },
      ...{ subject: `${tag}, ${place.label}`, installed: day(input.installedAt) },
    }),
  };
}

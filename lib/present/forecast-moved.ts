import { dayOfInstant } from "./calendar-days";
import { dayShift } from "./day-shift";
import { formatDay } from "./format-day";
import { formatVolts } from "./format-quantity";
import type { Presentation } from "./locale";

export interface MovedInput {
  readonly kind: "reading" | "measured-draw" | "event" | "stopped";
  readonly reading: { readonly millivolts: number; readonly kind: string } | null;
  readonly at: Date;
  readonly likely: Date;
  readonly without: Date;
  readonly days: number;
}

export interface MovedWords {
  /** "Reading of 12 Nov, 2.71 V resting". */
  readonly what: string;
  /** "likely date 9 days earlier". */
  readonly shift: string;
  /** "21 Dec without it, 12 Dec with it"; null where nothing moved. */
  readonly dates: string | null;
}

/** What moved a forecast last and by how much. */
export function movedWords(
  moved: MovedInput,
  now: Date,
  { locale, timeZone }: Presentation,
): MovedWords {
  const today = dayOfInstant(now, timeZone);
  const day = (at: Date) => formatDay(dayOfInstant(at, timeZone), locale, { today });
  const still = Math.round(Math.abs(moved.days)) === 0;
  return {
    what: `${whatMoved(moved)} of ${day(moved.at)}${voltsOf(moved, locale)}`,
    shift: still
      ? "likely date as before: it was as expected"
      : `likely date ${dayShift(moved.days)}`,
    dates: still ? null : `${day(moved.without)} without it, ${day(moved.likely)} with it`,
  };
}

function whatMoved({ kind }: MovedInput): string {
  if (kind === "reading") return "Reading";
  if (kind === "measured-draw") return "Measured draw";
  return kind === "stopped" ? "The stop" : "The change of the device";
}

function voltsOf({ reading }: MovedInput, locale: string): string {
  if (!reading) return "";
  const how = reading.kind === "loaded" ? "under load" : "resting";
  return `, ${formatVolts(reading.millivolts, locale)} ${how}`;
}

export interface ColdSnapInput {
  readonly stopsAt: Date;
  readonly returnsAt: Date;
  readonly endsAt: Date;
}

/** A pack that stops in the cold and comes back: all three days. */
export function coldSnapSentence(
  snap: ColdSnapInput,
  now: Date,
  { locale, timeZone }: Presentation,
): string {
  const today = dayOfInstant(now, timeZone);
  const day = (at: Date) => formatDay(dayOfInstant(at, timeZone), locale, { today });
  return `The cold is likely to stop it on ${day(snap.stopsAt)}; left alone it would come back by itself on ${day(snap.returnsAt)} and stop for good on ${day(snap.endsAt)}.`;
}

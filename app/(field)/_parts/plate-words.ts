import type { CutoffWindow, PlateReading } from "@/lib/offline/plate";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { formatWindow } from "@/lib/present/format-day";
import { formatVoltBand } from "@/lib/present/format-quantity";
import { formatPercentRange } from "@/lib/present/format-share";
import type { Verdict } from "@/lib/present/voltage-plate";

export interface PlateWords {
  /** "Lower than expected". */
  readonly verdict: string;
  /** "(3.58–3.64 V)". */
  readonly band: string;
  /** How the window moves. */
  readonly window: string;
  readonly left: string;
  /** Worth measuring again before it is kept. */
  readonly surprising: boolean;
  /** It cannot be; why. */
  readonly impossible: string | null;
}

interface Place {
  readonly locale: string;
  readonly timeZone: string;
  readonly now: Date;
}

/** A reading's meaning in words. */
export function plateWords(
  reading: PlateReading,
  verdict: Verdict | null,
  place: Place,
): PlateWords {
  const { expected, before, after, shareLeft } = reading;
  const [was, is] = [windowText(before, place), windowText(after, place)];
  const impossible =
    reading.reason === "impossible"
      ? "No pack of these cells can show this. Check the meter’s range and the leads."
      : null;
  const film =
    reading.reason === "passivation"
      ? " A fresh lithium-thionyl cell dips at first: measure again after a minute under load."
      : "";
  return {
    verdict: verdict?.word ?? "",
    band: `(${formatVoltBand(expected.lowMv, expected.highMv, place.locale)})`,
    window: `${was === is ? `Window stays ${is}` : `Window moves to ${is}`}.${film}`,
    left: `${formatPercentRange(shareLeft.p05, shareLeft.p95, place.locale)} left`,
    surprising: reading.reason === "doubtful",
    impossible,
  };
}

function windowText({ p05, p50, p95 }: CutoffWindow, { locale, timeZone, now }: Place): string {
  const day = (at: Date) => dayOfInstant(at, timeZone);
  return formatWindow({ p5: day(p05), p50: day(p50), p95: day(p95) }, locale, day(now)).text;
}

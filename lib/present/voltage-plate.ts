import { scaleLinear } from "d3-scale";
import type { Millivolts } from "@/lib/units";
import { formatVoltBand, formatVolts } from "./format-quantity";
import { formatNumber } from "./locale";
import type { Tone } from "./tone";

export interface MvBand {
  readonly lowMv: Millivolts;
  readonly highMv: Millivolts;
}

export interface VoltagePlateInput {
  readingMv: Millivolts | null;
  /** The band a reading of this kind is expected in. */
  expected: MvBand | null;
  cutoffMv: Millivolts;
  locale: string;
}

/** What a reading says beside its band. */
export interface Verdict {
  readonly word: string;
  readonly tone: Tone;
}

export interface VoltagePlateModel {
  readonly title: string;
  readonly description: string;
  readonly width: number;
  readonly height: number;
  readonly baseline: number;
  readonly ticks: readonly {
    readonly x: number;
    readonly label: string;
    readonly anchor: string;
  }[];
  readonly cutoffX: number;
  readonly cutoffAnchor: "start" | "end";
  readonly band: { readonly x: number; readonly width: number } | null;
  readonly readingX: number | null;
  readonly verdict: Verdict | null;
}

export const PLATE_WIDTH = 354;
const HEIGHT = 78;
const BASELINE = 50;
const INSET = 10;

/** A reading against the expected band and the cut-off, on a ruled scale. */
export function voltagePlate(input: VoltagePlateInput): VoltagePlateModel {
  const { readingMv, expected, cutoffMv, locale } = input;
  const values = [cutoffMv, readingMv, expected?.lowMv, expected?.highMv].filter(
    (value): value is number => value !== null && value !== undefined,
  );
  const low = Math.min(...values);
  const high = Math.max(...values);
  const room = Math.max(50, (high - low) * 0.12);
  const scale = scaleLinear([low - room, high + room], [INSET, PLATE_WIDTH - INSET]).nice(5);
  const x = (mv: number) => Math.round(scale(mv) * 10) / 10;
  const ticks = scale.ticks(5);
  const decimals = ticks.every((tick) => tick % 100 === 0) ? 1 : 2;
  return {
    title: readingMv === null ? "No reading yet" : `Reading ${formatVolts(readingMv, locale)}`,
    description: describe(input),
    width: PLATE_WIDTH,
    height: HEIGHT,
    baseline: BASELINE,
    ticks: ticks.map((tick) => ({
      x: x(tick),
      label: formatNumber(tick / 1000, locale, decimals),
      anchor: anchorAt(x(tick)),
    })),
    cutoffX: x(cutoffMv),
    cutoffAnchor: x(cutoffMv) > PLATE_WIDTH / 2 ? "end" : "start",
    band: expected && { x: x(expected.lowMv), width: x(expected.highMv) - x(expected.lowMv) },
    readingX: readingMv === null ? null : x(readingMv),
    verdict: verdictOf(input),
  };
}

function anchorAt(x: number): string {
  if (x < INSET + 4) return "start";
  return x > PLATE_WIDTH - INSET - 4 ? "end" : "middle";
}

/** The words beside the plate, so that nothing is told by place alone. */
export function verdictOf({ readingMv, expected, cutoffMv }: VoltagePlateInput): Verdict | null {
  if (readingMv === null) return null;
  if (readingMv <= cutoffMv) return { word: "At or below cut-off", tone: "out" };
  if (expected === null) return { word: "Nothing to compare with yet", tone: "quiet" };
  if (readingMv < expected.lowMv) return { word: "Lower than expected", tone: "soon" };
  if (readingMv > expected.highMv) return { word: "Higher than expected", tone: "soon" };
  return { word: "As expected", tone: "order" };
}

function describe(input: VoltagePlateInput): string {
  const { expected, cutoffMv, locale } = input;
  return [
    verdictOf(input)?.word,
    expected && `expected ${formatVoltBand(expected.lowMv, expected.highMv, locale)}`,
    `cut-off ${formatVolts(cutoffMv, locale)}`,
  ]
    .filter(Boolean)
    .join("; ");
}

import type { Seconds } from "@/lib/units";
import { formatDuration } from "./format-time";

/** A stretch of a round, in seconds after the shift's start. */
export interface Leg {
  readonly kind: "drive" | "work" | "wait";
  readonly fromS: Seconds;
  readonly toS: Seconds;
}

export interface DayBarInput {
  shiftS: Seconds;
  legs: readonly Leg[];
  locale: string;
  /** Seconds that the whole bar stands for, to draw several rounds to one scale. */
  scaleS?: Seconds;
}

export interface BarPart {
  readonly kind: "drive" | "work";
  readonly x: number;
  readonly width: number;
  /** Past the end of the shift. */
  readonly over: boolean;
}

export interface DayBarModel {
  readonly title: string;
  readonly description: string;
  readonly width: number;
  readonly height: number;
  /** Width of the shift's paper ground. */
  readonly shiftWidth: number;
  readonly parts: readonly BarPart[];
  /** "over by 20 min", or null within the shift. */
  readonly overLabel: string | null;
}

export const DAY_BAR_WIDTH = 240;
export const DAY_BAR_HEIGHT = 26;

/** A round to the scale of the shift: driving a thin line, working a block, idle the paper. */
export function dayBar({ shiftS, legs, locale, scaleS = 0 }: DayBarInput): DayBarModel {
  const endS = Math.max(0, ...legs.map((leg) => leg.toS));
  const wholeS = Math.max(shiftS, endS, scaleS);
  const x = (seconds: number) => Math.round((seconds / wholeS) * DAY_BAR_WIDTH * 100) / 100;
  const overS = endS - shiftS;
  const overLabel = overS > 0 ? `over by ${formatDuration(overS, locale)}` : null;
  return {
    title: legs.length === 0 ? "No round" : "Round against the shift",
    description: describe(legs, shiftS, overLabel, locale),
    width: DAY_BAR_WIDTH,
    height: DAY_BAR_HEIGHT,
    shiftWidth: x(shiftS),
    parts: legs.flatMap((leg) => partsOf(leg, shiftS, x)),
    overLabel,
  };
}

/** A leg that runs past the end of the shift is cut there, so that only the rest is over. */
function partsOf(leg: Leg, shiftS: Seconds, x: (seconds: number) => number): BarPart[] {
  if (leg.kind === "wait") return [];
  const kind = leg.kind;
  const part = (fromS: number, toS: number, over: boolean): BarPart[] =>
    toS > fromS ? [{ kind, x: x(fromS), width: x(toS) - x(fromS), over }] : [];
  return [
    ...part(leg.fromS, Math.min(leg.toS, shiftS), false),
    ...part(Math.max(leg.fromS, shiftS), leg.toS, true),
  ];
}

function describe(
  legs: readonly Leg[],
  shiftS: Seconds,
  overLabel: string | null,
  locale: string,
): string {
  const total = (kind: Leg["kind"]) =>
    legs.filter((leg) => leg.kind === kind).reduce((sum, leg) => sum + leg.toS - leg.fromS, 0);
  return [
    `driving ${formatDuration(total("drive"), locale)}`,
    `working ${formatDuration(total("work"), locale)}`,
    `shift ${formatDuration(shiftS, locale)}`,
    overLabel,
  ]
    .filter(Boolean)
    .join(", ");
}

import { shareLabel, shareSentence } from "./format-share";
import type { Tone } from "./tone";

/** Radius of the disc in its own units; the component scales it. */
export const DISC_RADIUS = 10;

export interface WaneDiscModel {
  readonly title: string;
  /** The word that stands beside the disc: "9 %", "out". */
  readonly label: string;
  readonly tone: Tone;
  /** "lit": a waning disc. "out": a ring with a cross. "unknown": a dashed ring. */
  readonly state: "lit" | "out" | "unknown";
  /** SVG path of the lit part; its area is `share` of the disc's, exactly. */
  readonly litPath: string | null;
}

export interface WaneDiscInput {
  /** Share of charge left, 0 to 1; null when nothing is known. */
  share: number | null;
  isOut: boolean;
  tone: Tone;
  locale: string;
}

/** The share of charge left as a waning disc, lit from the left. */
export function waneDisc({ share, isOut, tone, locale }: WaneDiscInput): WaneDiscModel {
  const title = shareSentence({ share, isOut }, locale);
  const words = { title, label: shareLabel({ share, isOut }, locale) };
  if (isOut) return { ...words, tone: "out", state: "out", litPath: null };
  if (share === null) return { ...words, tone: "quiet", state: "unknown", litPath: null };
  return { ...words, tone, state: "lit", litPath: share > 0 ? litPath(share) : null };
}

/**
 * The left half-circle closed by a half-ellipse, the terminator. With the half-axis k = (1 − 2s)r
 * the lit area is πr²/2 − πrk/2 = s·πr².
 */
function litPath(share: number): string {
  const r = DISC_RADIUS;
  const k = (1 - 2 * share) * r;
  const halfAxis = Math.round(Math.abs(k) * 1000) / 1000;
  const sweep = k < 0 ? 0 : 1;
  // An ellipse without width is the straight terminator of the half disc.
  const back = halfAxis === 0 ? `L0 ${-r}` : `A${halfAxis} ${r} 0 0 ${sweep} 0 ${-r}`;
  return `M0 ${-r}A${r} ${r} 0 0 0 0 ${r}${back}Z`;
}

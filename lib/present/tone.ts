/**
 * The five tones of the almanac. `order`: nothing to do. `soon`: to be booked. `out`: stopped, or
 * past its likely cut-off. `visit`: a booked or proposed visit. `quiet`: nothing known, or over.
 */
export type Tone = "order" | "soon" | "out" | "visit" | "quiet";

/** Days ahead of the likely cut-off at which a pack is called soon: five weeks, time to plan two. */
export const SOON_DAYS = 35;

export interface ToneInput {
  /** The device is known to have stopped. */
  isOut: boolean;
  /** Days from today to the median cut-off; null when there is no forecast. */
  daysToLikely: number | null;
  soonWithinDays?: number;
}

/** The tone of a pack by when it will reach cut-off; one tone for its disc, strip and words. */
export function packTone({ isOut, daysToLikely, soonWithinDays = SOON_DAYS }: ToneInput): Tone {
  if (isOut) return "out";
  if (daysToLikely === null) return "quiet";
  if (daysToLikely <= 0) return "out";
  return daysToLikely <= soonWithinDays ? "soon" : "order";
}

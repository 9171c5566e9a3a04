/**
 * The working clock: wall time with the breaks cut out. On it a break takes no room, so drives
 * and work that a break interrupts need no special case, and a route stays a plain sequence of
 * times that can be tested in O(1). Breaks are sorted and do not overlap (see `assertProblem`).
 */
import type { DayWindow } from "./problem";

/** Seconds of the day up to `wallS` that are not break. */
export function workedS(breaks: readonly DayWindow[], wallS: number): number {
  let pausedS = 0;
  for (const pause of breaks) {
    pausedS += Math.max(0, Math.min(wallS, pause.closeS) - Math.min(wallS, pause.openS));
  }
  return wallS - pausedS;
}

/**
 * Working time of the latest start allowed by a window that closes at `closeS`. Nothing starts
 * inside a break, so a window that closes in one ends a second before it.
 */
export function latestStartS(breaks: readonly DayWindow[], closeS: number): number {
  const pause = breaks.find((p) => p.openS <= closeS && closeS < p.closeS);
  return pause ? workedS(breaks, pause.openS) - 1 : workedS(breaks, closeS);
}

/** Wall time at which `worked` seconds are done: at a break, its beginning. */
export function wallAtEndS(breaks: readonly DayWindow[], worked: number): number {
  let wallS = worked;
  for (const pause of breaks) {
    if (pause.openS < wallS) wallS += pause.closeS - pause.openS;
  }
  return wallS;
}

/** Wall time at which work due after `worked` seconds begins: at a break, its end. */
export function wallAtStartS(breaks: readonly DayWindow[], worked: number): number {
  let wallS = worked;
  for (const pause of breaks) {
    if (pause.openS <= wallS && pause.closeS > pause.openS) wallS += pause.closeS - pause.openS;
  }
  return wallS;
}

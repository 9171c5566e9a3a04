/**
 * A device that works otherwise from now on: its duty cycle changed, and what that does to a
 * forecast that stands. What the pack has consumed so far stays; from now on the days left run
 * in proportion to the current, self-discharge beside it:
 *
 *   left' = left · (D + L) / (k D + L) · (e' − x) / (e − x)
 *
 * D is the draw as the forecast knows it, k the new average over the old, L the self-discharge,
 * x the depth now, e and e' the depths at which the old and the new peak current meet the
 * cut-off. The seasons are not run anew: a stop moved from winter to summer keeps its width.
 */
import {
  averageUa,
  type DutyState,
  type Forecast,
  packAverageUa,
  packEndDepth,
  packPeakUa,
  type PackSpec,
  selfDischargeUa,
} from "@/lib/battery";
import type { Fault } from "@/lib/errors";
import type { EpochDays, Microamps } from "@/lib/units";

export interface DutyChange {
  /** From one period to the next, milliseconds; null: as it is. */
  readonly periodMs: number | null;
  /** One state's current; null: as it is. */
  readonly state: { readonly name: string; readonly currentUa: Microamps } | null;
}

/** The period of a duty cycle: one pass through all states, milliseconds. */
export function periodMs(duty: readonly DutyState[]): number {
  return duty.reduce((sum, state) => sum + state.durationMs, 0);
}

/**
 * A duty cycle changed: work takes its time as before, the longest state (rest) gives or takes
 * what a longer or shorter period needs. A fault where rest would be gone, or no state is so called.
 */
export function changedDuty(
  duty: readonly DutyState[],
  change: DutyChange,
): { readonly states: readonly DutyState[] } | { readonly fault: Fault } {
  const { state, periodMs: period } = change;
  if (state && !duty.some((s) => s.name === state.name)) {
    const message = "Choose one of the states of the duty cycle.";
    return { fault: { field: "stateName", message } };
  }
  const states = duty.map((s) =>
    s.name === state?.name ? { ...s, currentUa: state.currentUa } : s,
  );
  if (period === null) return { states };
  const longest = Math.max(...duty.map((s) => s.durationMs));
  const rest = duty.findIndex((s) => s.durationMs === longest);
  const work = periodMs(duty) - longest;
  if (rest < 0 || period <= work) {
    const message = `Its work alone takes ${Math.ceil(work / 1000)} s: give a longer time from one sample to the next.`;
    return { fault: { field: "periodMinutes", message } };
  }
  return { states: states.map((s, i) => (i === rest ? { ...s, durationMs: period - work } : s)) };
}

/** The pack in the device with another duty cycle; a measured draw changes in proportion. */
export function withDuty(pack: PackSpec, duty: readonly DutyState[]): PackSpec {
  const ratio = averageUa(duty) / Math.max(1e-9, averageUa(pack.duty));
  const measured = pack.measuredDraw;
  return {
    ...pack,
    duty,
    measuredDraw: measured && { ...measured, averageUa: measured.averageUa * ratio },
  };
}

type Dates = Pick<Forecast, "quantiles" | "shareLeft" | "drawUa" | "outNow">;

/** The forecast of `pack` from `now` on in a device with another duty cycle. */
export function forecastAfterChange(
  forecast: Dates,
  pack: PackSpec,
  duty: readonly DutyState[],
  now: EpochDays,
): Dates {
  const changed = withDuty(pack, duty);
  const ratio = packAverageUa(changed) / Math.max(1e-9, packAverageUa(pack));
  const draw = forecast.drawUa.p50;
  const leak = leakOf(pack);
  const stretch = ((draw + leak) / (draw * ratio + leak)) * roomRatio(forecast, pack, changed);
  const moved = (day: EpochDays) => (day <= now ? day : now + (day - now) * stretch);
  const { quantiles: q, drawUa: ua } = forecast;
  return {
    quantiles: {
      p05: moved(q.p05),
      p20: moved(q.p20),
      p50: moved(q.p50),
      p80: moved(q.p80),
      p95: moved(q.p95),
    },
    shareLeft: forecast.shareLeft,
    drawUa: { p05: ua.p05 * ratio, p50: ua.p50 * ratio, p95: ua.p95 * ratio },
    outNow: forecast.outNow,
  };
}

/** Half of what is in the cells leaks over a life that the draw empties evenly. */
function leakOf({ cell, parallel }: PackSpec): Microamps {
  return (selfDischargeUa(cell.rated.capacityMah, cell.selfDischargePpmPerYear) * parallel) / 2;
}

/** Charge left to the new end over charge left to the old one, in the mean of the year. */
function roomRatio(forecast: Dates, pack: PackSpec, changed: PackSpec): number {
  const mean = pack.monthlyMeanDc.reduce((sum, dc) => sum + dc, 0) / pack.monthlyMeanDc.length;
  const before = packEndDepth(pack, packPeakUa(pack), mean);
  const after = packEndDepth(changed, packPeakUa(changed), mean);
  const room = before * forecast.shareLeft.p50;
  return room > 0 ? Math.max(0, (room + after - before) / room) : 1;
}

import type { Microamps } from "../units";
import type { DutyState, PackSpec } from "./pack";

/**
 * Time-weighted mean current of a duty cycle: sum(I t) / sum(t), in microamps. Zero for a
 * cycle without time in it.
 */
export function averageUa(duty: readonly DutyState[]): Microamps {
  let charge = 0;
  let time = 0;
  for (const state of duty) {
    charge += state.currentUa * state.durationMs;
    time += state.durationMs;
  }
  return time > 0 ? charge / time : 0;
}

/** Highest current of any state that lasts at all, in microamps. */
export function peakUa(duty: readonly DutyState[]): Microamps {
  let peak = 0;
  for (const state of duty) {
    if (state.durationMs > 0 && state.currentUa > peak) peak = state.currentUa;
  }
  return peak;
}

/** Average draw of the pack's device: measured on site where there is one, else the cycle's. */
export function packAverageUa(pack: PackSpec): Microamps {
  return pack.measuredDraw?.averageUa ?? averageUa(pack.duty);
}

/** Current under which the pack must hold its voltage: the cycle's peak, never below average. */
export function packPeakUa(pack: PackSpec): Microamps {
  return Math.max(peakUa(pack.duty), packAverageUa(pack));
}

/** A load that hardly ever pauses: its mean is a good part of its peak. */
export function isSteady(pack: PackSpec): boolean {
  return packAverageUa(pack) > 0.3 * packPeakUa(pack);
}

/** A load that does not pulse at all: no duty cycle that could be otherwise than stated. */
export function isConstant(pack: PackSpec): boolean {
  return packAverageUa(pack) > 0.9 * packPeakUa(pack);
}

/** Charge of one period in microamp-hours. */
export function periodChargeUah(duty: readonly DutyState[]): number {
  return duty.reduce((sum, s) => sum + (s.currentUa * s.durationMs) / 3_600_000, 0);
}

/**
 * Capacitor that carries a pulse while the pack's voltage may fall by `dropMv`: C = I t / dV.
 * Microamps, milliseconds and millivolts in, microfarads out.
 */
export function holdUpCapacitorUf(currentUa: number, durationMs: number, dropMv: number): number {
  return (currentUa * durationMs) / dropMv;
}

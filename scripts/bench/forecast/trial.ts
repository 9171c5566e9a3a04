/**
 * What a forecast is tried on: devices whose every pack ran to its end, read now and then by
 * someone who could not know when that would be. Only `end` is hidden from the forecast.
 */
import type { Chemistry, PackReading, PackSpec } from "../../../lib/battery/pack";

export interface TrialPack {
  readonly spec: PackSpec;
  /** Days on which somebody was there and the device ran. */
  readonly visits: readonly number[];
  readonly readings: readonly PackReading[];
  /** The day on which the device stopped. */
  readonly end: number;
}

export interface TrialDevice {
  readonly key: string;
  /** Devices of one model on one cell type in one climate learn from each other. */
  readonly cohort: string;
  readonly chemistry: Chemistry;
  /** In order: the first pack teaches, the second is scored. */
  readonly packs: readonly TrialPack[];
}

/** A family of simulated devices; the same seed makes the same devices. */
export type TrialFamily = (chemistry: Chemistry, count: number, seed: string) => TrialDevice[];

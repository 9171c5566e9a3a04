import type { Rng } from "./prng";
import { yearFraction } from "./weather";

/** What is known of a device in the field, as its model's sheet would give it. */
export interface DeviceConfig {
  /** Average and highest current of the whole pack by the sheet, microamps. */
  readonly averageUa: number;
  readonly peakUa: number;
  readonly cutoffMv: number;
  readonly series: number;
  readonly parallel: number;
  /** How much more it draws at the height of its season, share of the average. */
  readonly seasonalShare: number;
  /** Share of the year (0..1) at which that height falls. */
  readonly seasonalPeak: number;
  /** Degrees by which its place is warmer than the air. */
  readonly exposureC: number;
}

/** What only the simulator knows about one device. */
export interface DeviceTruth {
  readonly drawFactor: number;
  readonly peakFactor: number;
  readonly seasonalShare: number;
  /** A leak on the board that no sheet mentions, microamps. */
  readonly faultUa: number;
  readonly cutoffMv: number;
  /** Slow wander of the draw (first-order autoregression of its logarithm, daily). */
  wander: number;
  /** What firmware made of it. */
  firmwareFactor: number;
}

/** Spread among devices of one model. Source: from memory. */
export const DEVICE_SPREAD = {
  draw: 0.15,
  peak: 0.07,
  cutoff: 0.006,
  wander: 0.09,
  persistence: 0.985,
  faultChance: 0.02,
} as const;

export function drawDevice(config: DeviceConfig, rng: Rng): DeviceTruth {
  return {
    drawFactor: rng.logNormal(DEVICE_SPREAD.draw),
    peakFactor: rng.logNormal(DEVICE_SPREAD.peak),
    seasonalShare: config.seasonalShare * rng.uniform(0.5, 1.5),
    faultUa: rng.chance(DEVICE_SPREAD.faultChance) ? config.averageUa * rng.uniform(0.3, 0.9) : 0,
    cutoffMv: config.cutoffMv * (1 + rng.normal(0, DEVICE_SPREAD.cutoff)),
    wander: rng.normal(0, DEVICE_SPREAD.wander),
    firmwareFactor: 1,
  };
}

/** Average current over one day, mA, and one day's move of the wander. */
export function dailyDrawMa(
  config: DeviceConfig,
  truth: DeviceTruth,
  day: number,
  rng: Rng,
): number {
  const { persistence, wander } = DEVICE_SPREAD;
  truth.wander =
    persistence * truth.wander + rng.normal(0, wander * Math.sqrt(1 - persistence ** 2));
  const season =
    1 + truth.seasonalShare * Math.cos(2 * Math.PI * (yearFraction(day) - config.seasonalPeak));
  const drawn =
    config.averageUa * truth.drawFactor * truth.firmwareFactor * season * Math.exp(truth.wander);
  return (drawn + truth.faultUa) / 1000;
}

/** The highest current of the device, mA: what its radio or pump really takes. */
export function peakMa(config: DeviceConfig, truth: DeviceTruth): number {
  return (config.peakUa * truth.peakFactor) / 1000;
}

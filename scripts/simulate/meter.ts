import { type CellString, stringVolts } from "./cell-string";
import type { Rng } from "./prng";

/** How voltages come to be written down: a meter's error, a hand's error, and impatience. */
export interface Meter {
  /** One standard deviation of the meter, mV, and its proportional part. */
  readonly noiseMv: number;
  readonly noiseShare: number;
  /** Last digit shown, mV. */
  readonly stepMv: number;
  /** Chance that what is written is not what was there. */
  readonly grossChance: number;
}

export const HAND_METER: Meter = {
  noiseMv: 6,
  noiseShare: 0.0015,
  stepMv: 10,
  grossChance: 0.03,
};

export type Slip = "misread-digit" | "loaded-as-resting" | "not-settled";

/** What stands in the log, and beside it what only the simulator knows. */
export interface Measurement {
  readonly millivolts: number;
  readonly kind: "resting" | "loaded";
  readonly loadUa: number | null;
  readonly temperatureDc: number;
  readonly truth: { readonly millivolts: number; readonly slip: Slip | null };
}

export interface MeterContext {
  readonly at: number;
  readonly celsius: number;
  /** What the device draws at rest and at its peak, mA. */
  readonly idleMa: number;
  readonly peakMa: number;
  /** Days since the pack last carried a real load, for the film. */
  readonly restedDays: number;
}

/** Sag of the first seconds of a load through the film that grew at rest, volts of the pack. */
function filmSag(s: CellString, c: MeterContext, loadMa: number): number {
  const law = s.weak.law;
  if (law.filmVolts === 0) return 0;
  const grown = 1 - Math.exp(-Math.sqrt(Math.max(0, c.restedDays) / 60));
  const cold = Math.min(1.8, Math.exp((20 - c.celsius) / 45));
  const pull = loadMa / (loadMa + 6 * s.parallel);
  return law.filmVolts * grown * cold * pull * s.series;
}

function misread(mv: number, rng: Rng): number {
  const place = rng.pick([100, 100, 1000]);
  const digit = Math.floor(mv / place) % 10;
  const other = (digit + rng.pick([1, 2, 3, 7, 8, 9])) % 10;
  return Math.max(0, mv + (other - digit) * place);
}

function chooseSlip(kind: "resting" | "loaded", meter: Meter, rng: Rng): Slip | null {
  if (!rng.chance(meter.grossChance)) return null;
  if (kind === "loaded") return "misread-digit";
  return rng.pick(["misread-digit", "loaded-as-resting", "not-settled"] as const);
}

/**
 * Reads a pack. `loadMa` null means the device's own peak is the load of a loaded reading and
 * nobody knew its size.
 */
export function readPack(
  s: CellString,
  kind: "resting" | "loaded",
  loadMa: number | null,
  context: MeterContext,
  meter: Meter,
  rng: Rng,
): Measurement {
  const slip = chooseSlip(kind, meter, rng);
  const under = loadMa ?? context.peakMa;
  const resting = stringVolts(s, context.idleMa, context.celsius, context.at);
  const loaded =
    stringVolts(s, under, context.celsius, context.at) -
    filmSag(s, context, under) * rng.uniform(0.1, 1);
  const settled = slip === "not-settled" ? rng.uniform(0.3, 0.8) : 0;
  const seen =
    kind === "loaded" || slip === "loaded-as-resting"
      ? loaded
      : resting - settled * (resting - loaded);
  const noisy = seen * 1000 * (1 + rng.normal(0, meter.noiseShare)) + rng.normal(0, meter.noiseMv);
  const shown = Math.max(0, Math.round(noisy / meter.stepMv) * meter.stepMv);
  return {
    millivolts: slip === "misread-digit" ? misread(shown, rng) : shown,
    kind,
    loadUa: kind === "loaded" && loadMa !== null ? Math.round(loadMa * 1000) : null,
    temperatureDc: Math.round((context.celsius + rng.normal(0, 0.8)) * 10),
    truth: { millivolts: Math.round(seen * 1000), slip },
  };
}

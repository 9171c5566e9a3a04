/**
 * The hidden physics of eight chemistries, kept apart from the product's forecast on purpose:
 * a kinetic two-well charge law (Manwell & McGowan, Solar Energy 50:399, 1993) whose rate
 * follows temperature, and an open-circuit law of Shepherd's family (Shepherd, J. Electrochem.
 * Soc. 112:657, 1965) with an initial exponential and a hyperbolic knee. Voltages are per
 * electrochemical cell. Coefficients were fitted to published curves by least squares where
 * the line says so, and are from memory elsewhere; every lot and every cell departs from them.
 */
export interface ChemistryLaw {
  /** E = e0 + slope·s + early·exp(−earlyRate·(1−s)) − knee/(s+kneeOffset) (+ step), volts. */
  readonly e0: number;
  readonly slope: number;
  readonly early: number;
  readonly earlyRate: number;
  readonly knee: number;
  readonly kneeOffset: number;
  /** A second plateau: `height` volts are lost around s = `at`. */
  readonly step: { readonly at: number; readonly width: number; readonly height: number } | null;
  readonly voltsPerKelvin: number;
  /** Share of charge in the well that feeds the terminals, rate between wells at 20 °C. */
  readonly wellShare: number;
  readonly wellRatePerHour: number;
  readonly wellActivationKj: number;
  /** Charge lost by itself at 20 °C, share of full charge a year, and how heat speeds it. */
  readonly leakPerYear: number;
  readonly leakActivationKj: number;
  /** R = r0·(1 + a·(1−s) + b·exp(−s/w)), growing with age and in the cold. */
  readonly resistanceSlope: number;
  readonly resistanceKnee: number;
  readonly resistanceKneeWidth: number;
  readonly resistanceActivationKj: number;
  readonly resistanceGrowthPerYear: number;
  /** A film that grows at rest and makes the first seconds of a load sag, volts at most. */
  readonly filmVolts: number;
  /** Volts of one cell in the terms of its nominal: what a block is made of. */
  readonly unitNominalMv: number;
}

const GAS_KJ = 0.008314462618;
const REFERENCE_K = 293.15;

/** Arrhenius factor against 20 °C: above 1 where warmth speeds a process. */
export function arrhenius(activationKj: number, celsius: number): number {
  return Math.exp((activationKj / GAS_KJ) * (1 / REFERENCE_K - 1 / (celsius + 273.15)));
}

/** Open-circuit volts of one cell whose terminals' well stands at `level` (0..1). */
export function openCircuitVolts(law: ChemistryLaw, level: number, celsius: number): number {
  const s = Math.min(1, Math.max(0, level));
  const early = law.early * Math.exp(-law.earlyRate * (1 - s));
  const knee = law.knee / (s + law.kneeOffset);
  const step = law.step ? law.step.height / (1 + Math.exp(-(s - law.step.at) / law.step.width)) : 0;
  return law.e0 + law.slope * s + early - knee + step + law.voltsPerKelvin * (celsius - 20);
}

/** Ohms of one cell relative to fresh at 20 °C. */
export function relativeResistance(
  law: ChemistryLaw,
  level: number,
  celsius: number,
  years: number,
): number {
  const s = Math.min(1, Math.max(0, level));
  const depleted =
    1 + law.resistanceSlope * (1 - s) + law.resistanceKnee * Math.exp(-s / law.resistanceKneeWidth);
  const aged = 1 + law.resistanceGrowthPerYear * years;
  return (depleted * aged) / arrhenius(law.resistanceActivationKj, celsius);
}

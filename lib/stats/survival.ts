/**
 * Non-parametric survival of right-censored lives.
 * Sources: Kaplan & Meier, JASA 53, 1958; Greenwood, 1926; Nelson, 1969; Aalen, 1978;
 * log-rank after Mantel, 1966.
 */
import { normalQuantile } from "./normal";

/** A life: how long, and whether it ended (true) or was cut short by something else. */
export interface Life {
  readonly time: number;
  readonly ended: boolean;
}

/** What happened at one moment at which at least one life ended. */
export interface SurvivalStep {
  readonly time: number;
  readonly atRisk: number;
  readonly ended: number;
  /** Kaplan-Meier estimate just after `time`, and Greenwood's standard error. */
  readonly survival: number;
  readonly se: number;
  /** Nelson-Aalen cumulative hazard. */
  readonly hazard: number;
}

/** Distinct end times, ascending, with the estimates there. Empty when nothing ended. */
export function survivalSteps(lives: readonly Life[]): SurvivalStep[] {
  const sorted = [...lives].sort((a, b) => a.time - b.time);
  const steps: SurvivalStep[] = [];
  let survival = 1;
  let greenwood = 0;
  let hazard = 0;
  for (let i = 0; i < sorted.length;) {
    const { time } = sorted[i]!;
    const atRisk = sorted.length - i;
    let ended = 0;
    for (; i < sorted.length && sorted[i]!.time === time; i++) if (sorted[i]!.ended) ended++;
    if (ended === 0) continue;
    survival *= 1 - ended / atRisk;
    // at survival 0 Greenwood's sum is infinite and the error 0
    greenwood += ended < atRisk ? ended / (atRisk * (atRisk - ended)) : 0;
    hazard += ended / atRisk;
    steps.push({ time, atRisk, ended, survival, se: survival * Math.sqrt(greenwood), hazard });
  }
  return steps;
}

/** The step in force at a time, or null before the first end. */
export function stepAt(steps: readonly SurvivalStep[], time: number): SurvivalStep | null {
  let last: SurvivalStep | null = null;
  for (const step of steps) {
    if (step.time > time) break;
    last = step;
  }
  return last;
}

/** First time at which survival is at or below `share`; null when it never gets there. */
export function survivalQuantile(steps: readonly SurvivalStep[], share = 0.5): number | null {
  return steps.find((s) => s.survival <= share + 1e-12)?.time ?? null;
}

/** Confidence interval of survival on the log(-log) scale, which keeps it within 0..1. */
export function logLogInterval(step: SurvivalStep, confidence = 0.95): [number, number] {
  const { survival, se } = step;
  if (survival <= 0 || survival >= 1) return [survival, survival];
  const z = normalQuantile(0.5 + confidence / 2);
  const half = (z * se) / (survival * Math.abs(Math.log(survival)));
  return [survival ** Math.exp(half), survival ** Math.exp(-half)];
}

export interface LogRank {
  /** Chi-squared with one degree of freedom. */
  readonly chiSquared: number;
  readonly observed: readonly [number, number];
  readonly expected: readonly [number, number];
}

/** Log-rank comparison of two groups; chi-squared 0 when nothing can be compared. */
export function logRank(a: readonly Life[], b: readonly Life[]): LogRank {
  const steps = survivalSteps([...a, ...b]);
  let observedA = 0;
  let expectedA = 0;
  let variance = 0;
  let all = 0;
  for (const { time, atRisk, ended } of steps) {
    const riskA = a.filter((life) => life.time >= time).length;
    observedA += a.filter((life) => life.ended && life.time === time).length;
    expectedA += (ended * riskA) / atRisk;
    all += ended;
    if (atRisk > 1) {
      const shareA = riskA / atRisk;
      variance += (ended * shareA * (1 - shareA) * (atRisk - ended)) / (atRisk - 1);
    }
  }
  return {
    chiSquared: variance > 0 ? (observedA - expectedA) ** 2 / variance : 0,
    observed: [observedA, all - observedA],
    expected: [expectedA, all - expectedA],
  };
}

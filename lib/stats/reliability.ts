/**
 * Are stated distributions of an end date sound? Each pack gives u = F(end), the chance its
 * forecast gave to ending no later than it did (probability integral transform). Sound
 * forecasts make u uniform, so a share p of packs ends by u = p. A pack taken out alive has
 * only shown that its u is larger: it is right-censored, and Kaplan-Meier on the scale of u
 * gives the share all the same.
 * Sources: Dawid, JRSS A 147 (1984) 278-292 (the transform); Cox & Snell, JRSS B 30 (1968)
 * 248-275 (residuals -ln(1-u), whose sum estimates the number of ends); both from memory.
 */
import { logLogInterval, stepAt, survivalSteps } from "./survival";

export interface StatedEnd {
  /** u, 0..1 */
  readonly chance: number;
  /** false: taken out alive. */
  readonly ended: boolean;
}

export interface ReliabilityPoint {
  readonly forecast: number;
  readonly observed: number;
  /** 90 % interval. */
  readonly low: number;
  readonly high: number;
  /** Packs still at risk there. */
  readonly count: number;
}

const TENTHS = [0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9];

/**
 * Share that had ended by each stated chance. Points at which no pack is left to judge by are
 * left out.
 */
export function reliabilityCurve(
  stated: readonly StatedEnd[],
  at: readonly number[] = TENTHS,
): ReliabilityPoint[] {
  const steps = survivalSteps(stated.map(({ chance, ended }) => ({ time: chance, ended })));
  return at.flatMap((forecast) => {
    const count = stated.filter((s) => s.chance >= forecast).length;
    const step = stepAt(steps, forecast);
    if (!step || count === 0) return [];
    const [low, high] = logLogInterval(step, 0.9);
    return [{ forecast, observed: 1 - step.survival, low: 1 - high, high: 1 - low, count }];
  });
}

/** No forecast says more than 99 %: a residual beyond that would only show the tail's grain. */
const MOST = 0.99;

/**
 * How many ends the forecasts expected of these packs up to the moment each was taken out,
 * with the half-width of the 90 % range (the sum of residuals has the variance of its mean).
 */
export function expectedEnds(stated: readonly StatedEnd[]): { mean: number; spread: number } {
  const mean = stated.reduce((sum, { chance }) => sum - Math.log(1 - Math.min(MOST, chance)), 0);
  return { mean, spread: 1.645 * Math.sqrt(mean) };
}

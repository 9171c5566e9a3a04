/**
 * Scores of probabilistic forecasts. Lower is better unless said otherwise.
 * Sources: Gneiting & Raftery, JASA 102, 2007 (CRPS, interval score); Koenker (pinball);
 * Saxena et al., IJPHM 2010 (relative accuracy, alpha-lambda).
 */
import { normalCdf, normalPdf } from "./normal";

/** CRPS of N(mean, sd) at y: s [z (2 Phi(z) - 1) + 2 phi(z) - 1/sqrt(pi)]; |y - mean| at sd 0. */
export function crpsNormal(mean: number, sd: number, y: number): number {
  if (!(sd > 0)) return Math.abs(y - mean);
  const z = (y - mean) / sd;
  return sd * (z * (2 * normalCdf(z) - 1) + 2 * normalPdf(z) - 1 / Math.sqrt(Math.PI));
}

/** CRPS of an equal-weight sample: E|X - y| - E|X - X'|/2. NaN for an empty sample. */
export function crpsSample(sample: readonly number[], y: number): number {
  const sorted = [...sample].sort((a, b) => a - b);
  const n = sorted.length;
  let distance = 0;
  let spread = 0;
  sorted.forEach((x, i) => {
    distance += Math.abs(x - y);
    spread += x * (2 * i + 1 - n);
  });
  return distance / n - spread / (n * n);
}

/** Pinball loss of a quantile forecast q at level tau. */
export function pinball(tau: number, q: number, y: number): number {
  return y >= q ? tau * (y - q) : (1 - tau) * (q - y);
}

/** Interval score of a central (1 - a) interval: width plus 2/a times the miss. */
export function intervalScore(a: number, low: number, high: number, y: number): number {
  const miss = Math.max(0, low - y) + Math.max(0, y - high);
  return high - low + (2 / a) * miss;
}

/** Relative accuracy 1 - |true - predicted| / true of a remaining life; higher is better. */
export function relativeAccuracy(trueLeft: number, predictedLeft: number): number {
  return 1 - Math.abs(trueLeft - predictedLeft) / trueLeft;
}

/** Does the predicted remaining life lie within alpha of the true one? */
export function withinAlpha(alpha: number, trueLeft: number, predictedLeft: number): boolean {
  return Math.abs(trueLeft - predictedLeft) <= alpha * trueLeft;
}

/** Probability that alpha-lambda puts on trueEnd +/- alpha trueLeft, given the forecast's CDF. */
export function alphaMass(
  alpha: number,
  trueEnd: number,
  trueLeft: number,
  cdf: (day: number) => number,
): number {
  return cdf(trueEnd + alpha * trueLeft) - cdf(trueEnd - alpha * trueLeft);
}

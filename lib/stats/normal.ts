/**
 * The normal distribution.
 * Source: W. J. Cody, "Rational Chebyshev approximation for the error function", 1969, for
 * the accuracy wanted; the series and continued fraction below are Abramowitz & Stegun
 * 7.1.5 and 26.2.14. Quantile: P. J. Acklam's rational start refined by one Halley step.
 */
const SQRT_2PI = Math.sqrt(2 * Math.PI);

/** Density of N(0, 1). */
export function normalPdf(z: number): number {
  return Math.exp(-0.5 * z * z) / SQRT_2PI;
}

/** P(Z <= z) for N(0, 1); absolute error below 1e-14. */
export function normalCdf(z: number): number {
  if (Number.isNaN(z)) return Number.NaN;
  const a = Math.abs(z);
  if (a > 38) return z > 0 ? 1 : 0;
  const tail = a < 3 ? 0.5 - centralMass(a) : upperTail(a);
  return z > 0 ? 1 - tail : tail;
}

/** P(0 < Z < a) by its power series (A&S 26.2.11): short for small a. */
function centralMass(a: number): number {
  let term = a;
  let sum = a;
  for (let k = 1; Math.abs(term) > 1e-17 * sum && k < 200; k++) {
    term *= (a * a) / (2 * k + 1);
    sum += term;
  }
  return sum * normalPdf(a);
}

/** P(Z > a) for a >= 3 by continued fraction, evaluated from the far end. */
function upperTail(a: number): number {
  let fraction = 0;
  for (let k = 80; k >= 1; k--) fraction = k / (a + fraction);
  return normalPdf(a) / (a + fraction);
}

/** z with P(Z <= z) = p; -Infinity and Infinity at 0 and 1. */
export function normalQuantile(p: number): number {
  if (!(p >= 0 && p <= 1)) return Number.NaN;
  if (p === 0) return -Infinity;
  if (p === 1) return Infinity;
  if (p > 0.5) return -normalQuantile(1 - p);
  const start = p < 0.02425 ? tailStart(p) : centreStart(p);
  const error = (normalCdf(start) - p) / normalPdf(start);
  return start - error / (1 + (start * error) / 2);
}

function horner(coefficients: readonly number[], x: number): number {
  return coefficients.reduce((sum, c) => sum * x + c, 0);
}

function tailStart(p: number): number {
  const q = Math.sqrt(-2 * Math.log(p));
  const c = [
    -7.784894002430293e-3, -3.223964580411365e-1, -2.400758277161838, -2.549732539343734,
    4.374664141464968, 2.938163982698783,
  ];
  const d = [7.784695709041462e-3, 3.224671290700398e-1, 2.445134137142996, 3.754408661907416, 1];
  return horner(c, q) / horner(d, q);
}

function centreStart(p: number): number {
  const q = p - 0.5;
  const a = [
    -3.969683028665376e1, 2.209460984245205e2, -2.759285104469687e2, 1.38357751867269e2,
    -3.066479806614716e1, 2.506628277459239,
  ];
  const b = [
    -5.447609879822406e1, 1.615858368580409e2, -1.556989798598866e2, 6.680131188771972e1,
    -1.328068155288572e1, 1,
  ];
  return (horner(a, q * q) * q) / horner(b, q * q);
}

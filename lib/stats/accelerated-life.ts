/**
 * Accelerated failure time by maximum likelihood: log T = b0 + b1 x1 + ... + sigma W, with W
 * the smallest extreme value (T is Weibull) or normal (T is log-normal). Right-censored lives
 * add their survival. Newton's method on (b, log sigma) with halved steps; the covariance is
 * the inverse of the observed information.
 * Source: Kalbfleisch & Prentice, The Statistical Analysis of Failure Time Data, ch. 3.
 */
import { invert } from "./linear-solve";
import { normalCdf, normalPdf, normalQuantile } from "./normal";
import type { Life } from "./survival";

export type LifeLaw = "weibull" | "log-normal";

export interface CovariateLife extends Life {
  /** Values beside the intercept; the same count for every life. */
  readonly x?: readonly number[];
}

export interface AcceleratedLife {
  readonly law: LifeLaw;
  /** Intercept first. */
  readonly coefficients: readonly number[];
  readonly sigma: number;
  readonly logLikelihood: number;
  /** Of the coefficients, then of log sigma. */
  readonly covariance: readonly (readonly number[])[];
}

/** Log density or log survival of W at z, with first and second derivative. */
type Term = readonly [value: number, first: number, second: number];

function weibullTerm(z: number, ended: boolean): Term {
  const e = Math.exp(Math.min(z, 700));
  return ended ? [z - e, 1 - e, -e] : [-e, -e, -e];
}

function normalTerm(z: number, ended: boolean): Term {
  if (ended) return [-0.5 * z * z - 0.5 * Math.log(2 * Math.PI), -z, -1];
  const survival = normalCdf(-z);
  if (survival < 1e-300) return [-0.5 * z * z, -z, -1];
  const hazard = normalPdf(z) / survival;
  return [Math.log(survival), -hazard, -hazard * (hazard - z)];
}

interface Sums {
  value: number;
  gradient: number[];
  information: number[][];
}

function likelihood(lives: readonly CovariateLife[], law: LifeLaw, beta: readonly number[]): Sums {
  const size = beta.length;
  const sigma = Math.exp(beta[size - 1]!);
  const term = law === "weibull" ? weibullTerm : normalTerm;
  const sums: Sums = {
    value: 0,
    gradient: beta.map(() => 0),
    information: beta.map(() => beta.map(() => 0)),
  };
  for (const life of lives) {
    const row = [1, ...(life.x ?? [])];
    const z = (Math.log(life.time) - row.reduce((s, x, j) => s + x * beta[j]!, 0)) / sigma;
    const [value, first, second] = term(z, life.ended);
    sums.value += value - (life.ended ? Math.log(sigma) + Math.log(life.time) : 0);
    // dz/db = -x/sigma, dz/d(log sigma) = -z
    const slopes = [...row.map((x) => -x / sigma), -z];
    slopes.forEach((a, i) => {
      sums.gradient[i]! += first * a - (i === size - 1 && life.ended ? 1 : 0);
      slopes.forEach((b, j) => {
        const curved = i === size - 1 ? -b : j === size - 1 ? -a : 0;
        sums.information[i]![j]! -= second * a * b + first * curved;
      });
    });
  }
  return sums;
}

function startingPoint(lives: readonly CovariateLife[], covariates: number): number[] {
  const logs = lives.map((life) => Math.log(life.time));
  const mean = logs.reduce((a, b) => a + b, 0) / logs.length;
  const variance = logs.reduce((s, l) => s + (l - mean) ** 2, 0) / logs.length;
  const zeros = Array.from({ length: covariates }, () => 0);
  return [mean + 0.3, ...zeros, Math.log(Math.max(Math.sqrt(variance) * 0.8, 0.02))];
}

/**
 * Fit a law to lives. Null when fewer than two lives ended, a time is not above 0, or the
 * likelihood has no inner maximum (for instance all lives equal).
 */
export function fitAcceleratedLife(
  lives: readonly CovariateLife[],
  law: LifeLaw,
): AcceleratedLife | null {
  const usable = lives.every((life) => life.time > 0 && Number.isFinite(life.time));
  if (!usable || lives.filter((life) => life.ended).length < 2) return null;
  let beta = startingPoint(lives, lives[0]?.x?.length ?? 0);
  let at = likelihood(lives, law, beta);
  for (let round = 0; round < 100; round++) {
    const step = newtonStep(at);
    const next = climb(lives, law, beta, at.value, step);
    if (next === null) break;
    const gain = next.at.value - at.value;
    ({ beta, at } = next);
    if (gain < 1e-13 * (1 + Math.abs(at.value))) break;
  }
  return summarise(law, beta, at);
}

/** Newton's step; where the information is not positive, the gradient made short. */
function newtonStep(at: Sums): number[] {
  const inverse = invert(at.information);
  const step = inverse?.map((row) => row.reduce((s, v, j) => s + v * at.gradient[j]!, 0));
  const rising = step ? step.reduce((s, v, j) => s + v * at.gradient[j]!, 0) > 0 : false;
  if (step && rising) return step;
  const norm = Math.hypot(...at.gradient) || 1;
  return at.gradient.map((g) => (0.1 * g) / norm);
}

function climb(
  lives: readonly CovariateLife[],
  law: LifeLaw,
  beta: readonly number[],
  value: number,
  step: readonly number[],
): { beta: number[]; at: Sums } | null {
  for (let shrink = 1; shrink > 1e-9; shrink /= 2) {
    const trial = beta.map((b, j) => b + shrink * step[j]!);
    const at = likelihood(lives, law, trial);
    if (Number.isFinite(at.value) && at.value >= value) return { beta: trial, at };
  }
  return null;
}

function summarise(law: LifeLaw, beta: readonly number[], at: Sums): AcceleratedLife | null {
  const covariance = invert(at.information);
  const sigma = Math.exp(beta[beta.length - 1]!);
  const settled = covariance?.every((row, i) => row[i]! > 0) ?? false;
  if (!covariance || !settled || !(sigma > 1e-6) || Math.hypot(...at.gradient) > 1e-3) return null;
  return {
    law,
    coefficients: beta.slice(0, -1),
    sigma,
    logLikelihood: at.value,
    covariance,
  };
}

/** Life by which a share of the population (x all zero) has ended. */
export function lifeQuantile(fit: AcceleratedLife, share: number): number {
  const w = fit.law === "weibull" ? Math.log(-Math.log1p(-share)) : normalQuantile(share);
  return Math.exp(fit.coefficients[0]! + fit.sigma * w);
}

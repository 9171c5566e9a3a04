/**
 * What packs that came out teach about those still in. Each finished pack gives the ratio of
 * its life to the life its data sheet promised; a pack swapped early gives only that the ratio
 * is larger (right-censored, never a failure). Cohorts (device model x cell type x climate)
 * are fitted log-normal by maximum likelihood and drawn towards the whole fleet by empirical
 * Bayes. A life tells capacity over draw; the two share what it says by their variances.
 */
import { fitAcceleratedLife } from "../stats/accelerated-life";
import { type GroupMean, poolGroups, shrink } from "../stats/shrinkage";
import { ASSUMED } from "./assumptions";
import type { FleetPrior } from "./pack";

export interface FinishedPack {
  readonly packKey: string;
  readonly deviceKey: string;
  readonly cohort: string;
  readonly lot: string | null;
  /** Days in service over the median life forecast at installation without a fleet prior. */
  readonly lifeRatio: number;
  /** True: the device stopped. False: swapped before that. */
  readonly ranOut: boolean;
  /** How unsure the depth was at which it stopped, as one standard deviation of ln(life ratio). */
  readonly endSd?: number;
  /**
   * For a pack swapped early: the ln(life ratio) that its readings promised when it came out,
   * under its cohort's prior, and one standard deviation.
   */
  readonly expected?: { readonly lnRatio: number; readonly sd: number } | null;
}

export interface CohortLife {
  readonly cohort: string;
  /** Mean of ln(life ratio) after shrinking, its error, and the spread of single packs. */
  readonly mean: number;
  readonly se: number;
  readonly spread: number;
  readonly packs: number;
  /** Mean life where it is known, years, and the packs' mean variance of `endSd`. */
  readonly years?: number;
  readonly endVariance?: number;
}

const VARIANCE = { capacity: ASSUMED.capacitySd ** 2, draw: ASSUMED.drawSd ** 2 };
const DRAW_PART = VARIANCE.draw / (VARIANCE.draw + VARIANCE.capacity);
/** A cohort's own spread counts as much as this many packs of the assumed spread. */
const SPREAD_WEIGHT = 6;
/** At least this share of the spread of lives is the devices' own. */
const LEAST_DEVICE = 0.25;

/** No factor is believed beyond this: a pack that failed on its first day tells of a fault. */
const FARTHEST = Math.log(20);

const clamped = (ln: number): number => Math.min(FARTHEST, Math.max(-FARTHEST, ln));

interface OwnFit extends GroupMean {
  readonly cohort: string;
  readonly spread: number;
  readonly packs: number;
}

/** Learn every cohort that has at least two packs run out; empty when none has. */
export function learnCohorts(finished: readonly FinishedPack[]): CohortLife[] {
  const groups = new Map<string, FinishedPack[]>();
  for (const pack of finished) {
    if (!(pack.lifeRatio > 0)) continue;
    const group = groups.get(pack.cohort);
    if (group) group.push(pack);
    else groups.set(pack.cohort, [pack]);
  }
  const fits = [...groups].flatMap(([cohort, packs]) => ownFit(cohort, packs) ?? []);
  const pool = poolGroups(fits);
  if (!pool) return [];
  return fits.map((fit) => {
    const drawn = fits.length > 1 ? shrink(fit, pool) : fit;
    return { cohort: fit.cohort, ...drawn, spread: fit.spread, packs: fit.packs };
  });
}

function ownFit(cohort: string, packs: readonly FinishedPack[]): OwnFit | null {
  const lives = packs.map((p) => ({ time: p.lifeRatio, ended: p.ranOut }));
  const fit = fitAcceleratedLife(lives, "log-normal");
  if (!fit) return null;
  const ended = lives.filter((life) => life.ended).length;
  const assumed = VARIANCE.capacity + VARIANCE.draw;
  const variance = (ended * fit.sigma ** 2 + SPREAD_WEIGHT * assumed) / (ended + SPREAD_WEIGHT);
  const own = Math.max(fit.covariance[0]![0]!, variance / ended);
  return {
    cohort,
    mean: fit.coefficients[0]!,
    se: Math.sqrt(own),
    spread: Math.sqrt(variance),
    packs: packs.length,
  };
}

/**
 * What is known of a cohort nobody has seen the end of: the fleet's mean, with the spread
 * between cohorts in its error. Null when no cohort taught anything.
 */
export function pooledLife(lives: readonly CohortLife[]): CohortLife | null {
  const pool = poolGroups(lives);
  if (!pool) return null;
  const spread = Math.sqrt(lives.reduce((s, l) => s + l.spread ** 2, 0) / lives.length);
  const packs = lives.reduce((s, l) => s + l.packs, 0);
  return { cohort: "", mean: pool.mean, se: Math.sqrt(pool.se ** 2 + pool.tau2), spread, packs };
}

/** Variance of ln(life) by device, and by pack within a device. */
function parts({ spread, se, years, endVariance }: CohortLife): { device: number; pack: number } {
  const whole = spread ** 2 + se ** 2;
  // a short life does not average the seasons out, in its draw or in what the cold leaves of it
  const seasons = (4 * ASSUMED.seasonalDrawSd) / (Math.PI * Math.max(years ?? 3, 0.5));
  const pack = Math.min(ASSUMED.packLifeSd ** 2 + seasons ** 2, whole / 2);
  return { device: Math.max(whole - pack - (endVariance ?? 0), LEAST_DEVICE * whole), pack };
}

/** Prior of a pack whose device is new: the cohort's mean, its error and spread together. */
export function cohortPrior(life: CohortLife): FleetPrior {
  const { device, pack } = parts(life);
  return priorOf(life, life.mean, device, pack);
}

function priorOf(life: CohortLife, mean: number, device: number, pack: number): FleetPrior {
  const drawMean = life.mean * DRAW_PART + (mean - life.mean);
  return {
    capacityFactor: {
      mean: ASSUMED.capacityMean * Math.exp(clamped(life.mean * (1 - DRAW_PART))),
      relativeSd: Math.sqrt(pack),
    },
    drawFactor: {
      mean: Math.exp(clamped(-drawMean)),
      relativeSd: Math.sqrt(device),
    },
    packs: life.packs,
  };
}

/**
 * Prior of a device that has had packs before: what made them live long or short is mostly the
 * device's own and carries over; the next pack's cells are its own again. An early swap tells
 * what its readings promised.
 */
export function devicePrior(life: CohortLife, own: readonly FinishedPack[]): FleetPrior {
  const { device, pack } = parts(life);
  let precision = 1 / device;
  let sum = life.mean / device;
  for (const one of own) {
    const told = toldBy(one, life.mean, device + pack);
    if (!told) continue;
    precision += 1 / (pack + told.variance);
    sum += told.lnRatio / (pack + told.variance);
  }
  return priorOf(life, sum / precision, 1 / precision, pack);
}

/** What one pack alone says of its ln(life ratio): an expectation has the prior taken out. */
function toldBy(
  { lifeRatio, ranOut, expected, endSd }: FinishedPack,
  mean: number,
  variance: number,
): { lnRatio: number; variance: number } | null {
  if (!(lifeRatio > 0)) return null;
  if (ranOut) return { lnRatio: Math.log(lifeRatio), variance: (endSd ?? 0) ** 2 };
  if (!expected) return null;
  const precision = 1 / Math.max(expected.sd ** 2, 1e-6) - 1 / variance;
  // hardly narrower than the prior: nothing was read
  if (precision * variance < 0.05) return null;
  const own = expected.lnRatio / expected.sd ** 2 - mean / variance;
  return { lnRatio: own / precision, variance: 1 / precision };
}

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
}

export interface CohortLife {
  readonly cohort: string;
  /** Mean of ln(life ratio) after shrinking, its error, and the spread of single packs. */
  readonly mean: number;
  readonly se: number;
  readonly spread: number;
  readonly packs: number;
}

const VARIANCE = { capacity: ASSUMED.capacitySd ** 2, draw: ASSUMED.drawSd ** 2 };
const DRAW_PART = VARIANCE.draw / (VARIANCE.draw + VARIANCE.capacity);
/** A cohort's own spread counts as much as this many packs of the assumed spread. */
const SPREAD_WEIGHT = 6;

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

/** Prior of a pack whose device is new: the cohort's mean, its error and spread together. */
export function cohortPrior(life: CohortLife): FleetPrior {
  const variance = life.spread ** 2 + life.se ** 2;
  return {
    capacityFactor: {
      mean: ASSUMED.capacityMean * Math.exp(life.mean * (1 - DRAW_PART)),
      relativeSd: Math.sqrt(variance * (1 - DRAW_PART)),
    },
    drawFactor: {
      mean: Math.exp(-life.mean * DRAW_PART),
      relativeSd: Math.sqrt(variance * DRAW_PART),
    },
    packs: life.packs,
  };
}

/**
 * Prior of a device that has had packs before: its own draw carries over, the capacity of the
 * next pack does not. Each own life tells the draw with the error of one pack's capacity and
 * of the draw's walk; an early swap tells nothing here.
 */
export function devicePrior(life: CohortLife, own: readonly FinishedPack[]): FleetPrior {
  const base = cohortPrior(life);
  const lives = own.filter((p) => p.ranOut && p.lifeRatio > 0);
  if (lives.length === 0) return base;
  const capacity = base.capacityFactor.relativeSd ** 2;
  const between = Math.max(base.drawFactor.relativeSd ** 2, 1e-6);
  const noise = capacity + ASSUMED.drawWalkPerYear ** 2;
  const excess = lives.reduce((s, p) => s + (life.mean - Math.log(p.lifeRatio)), 0) / lives.length;
  const weight = between / (between + noise / lives.length);
  const left = between * (1 - weight) + ASSUMED.drawWalkPerYear ** 2;
  return {
    ...base,
    drawFactor: {
      mean: base.drawFactor.mean * Math.exp(weight * excess),
      relativeSd: Math.sqrt(Math.min(between, left)),
    },
  };
}

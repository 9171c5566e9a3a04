/** Scores of one method over devices, taken at visit dates. */
import type { FleetPrior } from "../../../lib/battery/pack";
import { crpsSample, withinAlpha } from "../../../lib/stats/scores";
import type { Method } from "./methods";
import type { TrialPack } from "./trial";

export interface Score {
  readonly devices: number;
  /** Share of all visits whose 80 % window held the day the device stopped. */
  readonly coverage80: number;
  /** Mean share of charge stated on the very day the device stopped: 0 would be right. */
  readonly biasAtEmpty: number;
  /** Mean CRPS as a share of the life, at the visit nearest to 50, 75 and 90 % of it. */
  readonly crps50: number;
  readonly crps75: number;
  readonly crps90: number;
  /** Share of devices whose median at mid-life was within 20 % of the true time left. */
  readonly alphaLambda50: number;
}

export interface Trial {
  readonly pack: TrialPack;
  readonly prior: FleetPrior | null;
}

/** Score a method; packs that were never visited are left out of what needs a visit. */
export function score(method: Method, trials: readonly Trial[]): Score {
  const seen = trials.filter(({ pack }) => pack.visits.length > 0);
  const each = seen.map((trial) => scorePack(method, trial));
  const mean = (pick: (s: PackScore) => number): number =>
    each.reduce((sum, s) => sum + pick(s), 0) / each.length;
  const visits = each.reduce((sum, s) => sum + s.visits, 0);
  return {
    devices: seen.length,
    coverage80: each.reduce((sum, s) => sum + s.covered, 0) / visits,
    biasAtEmpty: mean((s) => s.shareAtEnd),
    crps50: mean((s) => s.crps[0]),
    crps75: mean((s) => s.crps[1]),
    crps90: mean((s) => s.crps[2]),
    alphaLambda50: mean((s) => (s.midwayHit ? 1 : 0)),
  };
}

interface PackScore {
  readonly visits: number;
  readonly covered: number;
  readonly shareAtEnd: number;
  readonly crps: readonly [number, number, number];
  readonly midwayHit: boolean;
}

function scorePack(method: Method, { pack, prior }: Trial): PackScore {
  const { spec, visits, readings, end } = pack;
  const life = end - spec.installedAt;
  const at = (now: number, aliveAt: number) =>
    method({ spec, prior, now, aliveAt, readings: readings.filter((r) => r.at <= now) });
  const stated = visits.map((visit) => at(visit, visit).days);
  const nearest = (share: number): number => {
    const wanted = spec.installedAt + share * life;
    let best = 0;
    visits.forEach((v, i) => {
      if (Math.abs(v - wanted) < Math.abs(visits[best]! - wanted)) best = i;
    });
    return best;
  };
  const crps = (share: number): number => crpsSample(stated[nearest(share)]!, end) / life;
  const midway = nearest(0.5);
  return {
    visits: visits.length,
    covered: stated.filter((days) => end >= tenth(days) && end <= ninetieth(days)).length,
    shareAtEnd: at(end, visits.at(-1)!).shareLeft,
    crps: [crps(0.5), crps(0.75), crps(0.9)],
    midwayHit: withinAlpha(0.2, end - visits[midway]!, median(stated[midway]!) - visits[midway]!),
  };
}

/** The stated days stand at probabilities 0.01, 0.03 ... 0.99. */
const tenth = (days: readonly number[]): number => (days[4]! + days[5]!) / 2;
const median = (days: readonly number[]): number => (days[24]! + days[25]!) / 2;
const ninetieth = (days: readonly number[]): number => (days[44]! + days[45]!) / 2;

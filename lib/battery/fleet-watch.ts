/**
 * Findings worth telling, from all packs there were: bad lots and draw shifts by the tests of
 * `fleet-findings.ts`, each kept from passing for the other, with a bar above the tests' own.
 *
 * A weak lot looks like a thirsty device and a thirsty firmware like a weak lot. So draws are
 * looked at without the packs of bad lots, then lots without the packs that a shifted draw wore.
 * The tests take packs of a cohort for alike; they are not quite (sites, installers, winters), so
 * their chances are too small and the bar is higher. The bar was set on the demonstration fleet,
 * where the one bad lot and the one firmware change are found and nothing else is.
 */
import type { EpochDays } from "../units";
import { type DepthObservation, levelByDepth } from "./draw-observations";
import {
  type BadLot,
  badLots,
  type DrawObservation,
  type DrawShift,
  drawShifts,
} from "./fleet-findings";
import { type FinishedPack, learnCohorts } from "./fleet-prior";

/** A lot or a shift that moves dates by less is not worth a visit. */
const WORTH = { lifeFactor: 0.85, drawFactor: 1.15 } as const;
const LEAST_PACKS = 8;
const LEAST_CHANCE = 1e-5;
/** A stretch between two voltages is dated by its middle: a shift began up to this long before. */
const SHIFT_SEEN_LATE_DAYS = 200;
/** Observations looked at in each model; the search for a step takes the square of their number. */
const MOST_OBSERVATIONS = 1500;

/** A pack that came out, or one still in (never ended, its life so far). */
export interface WatchedPack extends FinishedPack {
  readonly model: string;
  readonly cellType: string;
  /** The day it came out, or today. */
  readonly until: EpochDays;
}

export interface FleetFindings {
  readonly lots: readonly BadLot[];
  readonly shifts: readonly DrawShift[];
}

/** Bad lots and draw shifts of a fleet, the clearest first. */
export function watchFleet(
  packs: readonly WatchedPack[],
  observations: readonly DepthObservation[],
): FleetFindings {
  const suspect = new Set(lotsWorthTelling(packs).flatMap((lot) => lot.packKeys));
  const shifts = shiftsWorthTelling(observations.filter((o) => !suspect.has(o.packKey)));
  const shiftedAt = new Map(shifts.map((shift) => [shift.model, shift.at]));
  const worn = (pack: WatchedPack) =>
    pack.until > (shiftedAt.get(pack.model) ?? Infinity) - SHIFT_SEEN_LATE_DAYS;
  return { lots: lotsWorthTelling(packs.filter((pack) => !worn(pack))), shifts };
}

/** Lots against the other packs of their cell type, each life relative to its cohort's. */
function lotsWorthTelling(packs: readonly WatchedPack[]): BadLot[] {
  const cohorts = new Map(learnCohorts(packs).map((life) => [life.cohort, life.mean]));
  const byCell = new Map<string, WatchedPack[]>();
  for (const pack of packs) {
    const lifeRatio = pack.lifeRatio / Math.exp(cohorts.get(pack.cohort) ?? 0);
    const own = byCell.get(pack.cellType);
    if (own) own.push({ ...pack, lifeRatio });
    else byCell.set(pack.cellType, [{ ...pack, lifeRatio }]);
  }
  return [...byCell.values()]
    .flatMap((own) => badLots(own))
    .filter((lot) => lot.lifeFactor <= WORTH.lifeFactor && lot.chance <= LEAST_CHANCE)
    .filter((lot) => lot.packKeys.length >= LEAST_PACKS)
    .sort((a, b) => a.chance - b.chance);
}

function shiftsWorthTelling(observations: readonly DepthObservation[]): DrawShift[] {
  return drawShifts(thinned(levelByDepth(observations))).filter(
    (shift) =>
      Math.max(shift.factor, 1 / shift.factor) >= WORTH.drawFactor &&
      shift.chance <= LEAST_CHANCE &&
      shift.packKeys.length >= LEAST_PACKS,
  );
}

/** Every k-th observation in time of a model that has more than can be looked at. */
function thinned(observations: readonly DrawObservation[]): DrawObservation[] {
  const models = new Map<string, DrawObservation[]>();
  for (const o of observations) {
    const own = models.get(o.model);
    if (own) own.push(o);
    else models.set(o.model, [o]);
  }
  return [...models.values()].flatMap((own) => {
    const step = own.length / Math.min(own.length, MOST_OBSERVATIONS);
    const sorted = own.sort((a, b) => a.at - b.at);
    return sorted.filter((_, i) => Math.floor(i / step) !== Math.floor((i - 1) / step));
  });
}

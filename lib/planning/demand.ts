/**
 * How many cells the fleet will ask for, and when to order them. Each pack asks for its cells
 * when it stops its device, its successor once more a life later; the sum over packs is a
 * Poisson-binomial law of cells, so the range comes out with the mean.
 *
 * The reorder point is the classic one (Silver, Pyke & Thomas, Inventory and Production
 * Management, periodic review, from memory): stock must cover, at a stated level of service,
 * what is asked for until an order placed at the next look would arrive.
 */
import { countQuantile } from "@/lib/stats/poisson-binomial";
import { sumOfCounts, type CountLaw } from "@/lib/stats/sum-of-counts";
import type { EpochDays } from "@/lib/units";
import { countUpTo, type LifeQuantiles } from "./life";

/** Chance that stock lasts until the delivery. Common practice, no source. */
export const SERVICE_LEVEL = 0.95;
/** Days between two looks at the stock: plans are made weekly. */
export const REVIEW_DAYS = 7;
/** An order covers this long beyond its delivery. Common practice, no source. */
export const COVER_DAYS = 91;
/** Cells are used up within this share of their shelf life. Common practice, no source. */
const SHELF_SHARE = 0.5;

/** One installed pack as demand sees it. */
export interface PackDemand {
  readonly life: LifeQuantiles;
  readonly installedAt: EpochDays;
  /** Cells of the pack that would replace it. */
  readonly cells: number;
}

/** Cells asked for over a span of time. */
export interface CellDemand {
  readonly mean: number;
  readonly p10: number;
  readonly p50: number;
  readonly p90: number;
}

/** Shortest life of a successor that is reckoned with, so that a wreck does not repeat daily. */
const LEAST_LIFE = 30;

/**
 * Chances that a pack has been replaced 0, 1 or 2 times by a day. The successor lives as long as
 * this pack is thought to in all, independently of how long this one still lasts.
 */
export function replacedBy(pack: PackDemand, day: EpochDays): [number, number, number] {
  const { life, installedAt } = pack;
  const n = life.length;
  const once = countUpTo(life, day);
  let twice = 0;
  for (let i = 0; i < once; i++) {
    // T + L ≤ day with L = a quantile − installation, at least LEAST_LIFE.
    const rest = day - life[i]!;
    if (rest >= LEAST_LIFE) twice += countUpTo(life, installedAt + rest);
  }
  const second = twice / (n * n);
  const first = once / n;
  return [1 - first, first - second, second];
}

/** What one pack asks for between two days. */
function lawBetween(pack: PackDemand, from: EpochDays | null, to: EpochDays): CountLaw {
  const at = replacedBy(pack, to);
  if (from === null) return { step: pack.cells, chances: at };
  const before = replacedBy(pack, from);
  const firstIn = before[0] - at[0];
  const secondIn = at[2] - before[2];
  const none = Math.max(0, 1 - firstIn - secondIn);
  return { step: pack.cells, chances: [none, 1 - none] };
}

/**
 * Cells asked for after `from` (null: from ever, so packs that are out already count) and up to
 * `to`.
 */
export function demandBetween(
  packs: readonly PackDemand[],
  from: EpochDays | null,
  to: EpochDays,
): CellDemand {
  const { unit, mass } = sumOfCounts(packs.map((pack) => lawBetween(pack, from, to)));
  const quantile = (level: number) => countQuantile(mass, level) * unit;
  const mean = mass.reduce((sum, chance, k) => sum + chance * k * unit, 0);
  return { mean, p10: quantile(0.1), p50: quantile(0.5), p90: quantile(0.9) };
}

/** Cells that suffice up to a day, at the level of service. */
export function enoughUntil(packs: readonly PackDemand[], day: EpochDays): number {
  const { unit, mass } = sumOfCounts(packs.map((pack) => lawBetween(pack, null, day)));
  return countQuantile(mass, SERVICE_LEVEL) * unit;
}

/** What stands in stores and how new cells come. */
export interface Supply {
  readonly inStock: number;
  readonly leadTimeDays: number;
  readonly shelfLifeMonths: number | null;
}

export interface OrderProposal {
  /** Stock at which to order: enough until a delivery ordered at the next look. */
  readonly reorderPoint: number;
  /** First day on which the stock may run short; null: not within the horizon. */
  readonly shortFrom: EpochDays | null;
  /** Last day on which an order still arrives in time; null where nothing runs short. */
  readonly orderBy: EpochDays | null;
  /** Cells to order now; 0 while an order can wait. */
  readonly orderNow: number;
  /** What one order, now or on `orderBy`, should hold. */
  readonly orderSize: number;
}

/** The first day at whose end stock does not suffice, by bisection; null: none within the horizon. */
function firstShortDay(
  packs: readonly PackDemand[],
  inStock: number,
  now: EpochDays,
  horizonDays: number,
): EpochDays | null {
  const start = Math.floor(now);
  const lasts = (day: number) => enoughUntil(packs, start + day + 1) <= inStock;
  if (lasts(horizonDays)) return null;
  let [enough, short] = [-1, horizonDays];
  while (short - enough > 1) {
    const middle = (enough + short) >> 1;
    if (lasts(middle)) enough = middle;
    else short = middle;
  }
  return start + short;
}

/**
 * When and how much to order. An order lasts until COVER_DAYS after its delivery, but never
 * longer than half the shelf life of the cells.
 * @param horizonDays how far ahead a shortage is looked for
 */
export function proposeOrder(
  packs: readonly PackDemand[],
  supply: Supply,
  now: EpochDays,
  horizonDays: number,
): OrderProposal {
  const { inStock, leadTimeDays, shelfLifeMonths } = supply;
  const shelfDays = shelfLifeMonths === null ? Infinity : shelfLifeMonths * 30.4 * SHELF_SHARE;
  const coverDays = Math.min(COVER_DAYS, shelfDays);
  const shortFrom = firstShortDay(packs, inStock, now, horizonDays);
  const orderBy = shortFrom === null ? null : shortFrom - leadTimeDays;
  const dueNow = orderBy !== null && orderBy <= now + REVIEW_DAYS;
  const placedOn = dueNow ? now : (orderBy ?? now);
  const upTo = enoughUntil(packs, placedOn + leadTimeDays + REVIEW_DAYS + coverDays);
  const orderSize = shortFrom === null ? 0 : Math.max(0, upTo - inStock);
  return {
    reorderPoint: enoughUntil(packs, now + leadTimeDays + REVIEW_DAYS),
    shortFrom,
    orderBy,
    orderNow: dueNow ? orderSize : 0,
    orderSize,
  };
}

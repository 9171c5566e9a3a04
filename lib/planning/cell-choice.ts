/**
 * Cell types side by side for one device: how long a fresh pack would last, what a year of it
 * costs with the visits it takes, how it bears the cold, what it weighs.
 *
 *   cost a year = (cells + work + share of a drive) / life in years
 *
 * over the likely life, and over the long and the short end of it for the range.
 */
import { type FleetPrior, forecastPack, packEndDepth, packPeakUa } from "@/lib/battery";
import type { EpochDays, Minor, Millivolts } from "@/lib/units";
import {
  type CandidateCell,
  type CellFit,
  coldestNightDc,
  type DeviceAndPlace,
  fitCell,
  loadedPackMv,
  packOf,
} from "./cell-fit";

const DAYS_PER_YEAR = 365.2425;
/** A visit is never further off than this, whatever the cells could give. */
const LONGEST_LIFE_DAYS = 20 * DAYS_PER_YEAR;

export interface LifeRange {
  readonly p05: number;
  readonly p50: number;
  readonly p95: number;
}

export interface ColdBehaviour {
  /** Under the peak current in the coldest night, fresh and half used, mV. */
  readonly freshMv: Millivolts;
  readonly halfUsedMv: Millivolts;
  /** Share of the charge that it gives then, of what it gives at 20 °C. */
  readonly share: number;
  /** The half-used pack would stop the device in such a night. */
  readonly stopsHalfUsed: boolean;
}

export interface CellOption {
  readonly cell: CandidateCell;
  readonly fit: CellFit;
  /** Days from new until the device stops; at most 20 years, which `beyond` tells. */
  readonly lifeDays: LifeRange;
  readonly beyond: boolean;
  readonly costPerYear: { readonly low: Minor; readonly likely: Minor; readonly high: Minor };
  readonly cellsMinor: Minor;
  readonly cold: ColdBehaviour;
  readonly massMg: number | null;
  /** The likely life is longer than the maker's shelf life vouches for. */
  readonly outlivesShelf: boolean;
}

export interface CellChoice {
  /** Those that fit, cheapest year first. */
  readonly fitting: readonly CellOption[];
  readonly unfit: readonly { readonly cell: CandidateCell; readonly fit: CellFit }[];
}

export interface ChoiceTerms {
  readonly device: DeviceAndPlace;
  readonly now: EpochDays;
  /** Work at a swap and a share of the drive there. */
  readonly visitMinor: Minor;
  /** What the fleet learned about this device on a cell type; null: nothing. */
  readonly priorOf: (cellId: string) => FleetPrior | null;
}

/** Compares every cell type for a device. */
export function chooseCells(cells: readonly CandidateCell[], terms: ChoiceTerms): CellChoice {
  const judged = cells.map((cell) => ({ cell, fit: fitCell(terms.device, cell, cells) }));
  return {
    fitting: judged
      .filter(({ fit }) => fit.misfits.length === 0)
      .map(({ cell, fit }) => optionOf(cell, fit, terms))
      .sort((a, b) => a.costPerYear.likely - b.costPerYear.likely),
    unfit: judged.filter(({ fit }) => fit.misfits.length > 0),
  };
}

function optionOf(cell: CandidateCell, fit: CellFit, terms: ChoiceTerms): CellOption {
  const { device, now } = terms;
  const { series, parallel } = device;
  const life = lifeOf(cell, terms);
  const lifeDays = {
    p05: Math.min(LONGEST_LIFE_DAYS, life.p05 - now),
    p50: Math.min(LONGEST_LIFE_DAYS, life.p50 - now),
    p95: Math.min(LONGEST_LIFE_DAYS, life.p95 - now),
  };
  const cellsMinor = series * parallel * cell.unitCostMinor;
  const yearly = (days: number) =>
    ((cellsMinor + terms.visitMinor) * DAYS_PER_YEAR) / Math.max(1, days);
  const shelfDays =
    cell.shelfLifeMonths === null ? null : (cell.shelfLifeMonths * DAYS_PER_YEAR) / 12;
  return {
    ...{ cell, fit, lifeDays, cellsMinor },
    beyond: life.p50 - now > LONGEST_LIFE_DAYS,
    costPerYear: {
      low: yearly(lifeDays.p95),
      likely: yearly(lifeDays.p50),
      high: yearly(lifeDays.p05),
    },
    cold: coldOf(cell, device),
    massMg: cell.massMg === null ? null : series * parallel * cell.massMg,
    outlivesShelf: shelfDays !== null && lifeDays.p50 > shelfDays,
  };
}

/** A fresh pack put in now, with nothing read yet. */
function lifeOf(cell: CandidateCell, { device, now, priorOf }: ChoiceTerms): LifeRange {
  const pack = packOf(device, cell, now);
  return forecastPack({ pack, readings: [], events: [], prior: priorOf(cell.id), now }).quantiles;
}

function coldOf(cell: CandidateCell, device: DeviceAndPlace): ColdBehaviour {
  const pack = packOf(device, cell, 0);
  const dc = coldestNightDc(device.monthlyMeanDc);
  const peak = packPeakUa(pack);
  const halfUsedMv = Math.round(loadedPackMv(pack, 0.5, peak, dc));
  return {
    freshMv: Math.round(loadedPackMv(pack, 0, peak, dc)),
    halfUsedMv,
    share: Math.min(
      1,
      packEndDepth(pack, peak, dc) / Math.max(1e-9, packEndDepth(pack, peak, 200)),
    ),
    stopsHalfUsed: halfUsedMv <= device.cutoffMv,
  };
}

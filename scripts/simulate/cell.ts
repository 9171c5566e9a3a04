import { CHEMISTRY_LAWS, type SimulatedChemistry } from "./chemistries";
import {
  arrhenius,
  type ChemistryLaw,
  openCircuitVolts,
  relativeResistance,
} from "./chemistry-law";
import { drain, fullWells, leak, nearLevel, type Wells } from "./wells";

/** What a maker turns out: the truth behind a cell type, which no one in the scenario sees. */
export interface CellMake {
  readonly key: string;
  readonly chemistry: SimulatedChemistry;
  /** Electrochemical cells in one unit (6 in a 12 V block). */
  readonly units: number;
  /** Charge of a fresh unit at vanishing current, mAh. */
  readonly fullMah: number;
  /** Resistance of a fresh unit at 20 °C, milliohms. */
  readonly resistanceMohm: number;
  /** How much faster than its law the wells exchange charge: small cells are thin. */
  readonly wellRateFactor?: number;
}

/** How one delivery departs from its make; factors multiply. */
export interface LotTruth {
  readonly key: string;
  readonly makeKey: string;
  /** Epoch day on which the cells were made. */
  readonly madeDay: number;
  readonly capacityFactor: number;
  readonly leakFactor: number;
  readonly resistanceFactor: number;
  readonly offsetV: number;
}

/** One unit (or several in parallel, taken as one of their mean) at a moment. */
export interface Cell {
  readonly law: ChemistryLaw;
  readonly units: number;
  readonly fullMah: number;
  readonly ohm: number;
  readonly leakPerYear: number;
  /** Departure of this cell's voltage from its law, volts for each electrochemical cell. */
  readonly offsetV: number;
  readonly madeDay: number;
  readonly wellRateFactor: number;
  wells: Wells;
}

const HOURS_PER_YEAR = 8766;
const STORE_C = 14;

export interface CellDeparture {
  readonly capacityFactor: number;
  readonly resistanceFactor: number;
  readonly leakFactor: number;
  readonly offsetV: number;
}

/** A cell as it goes into service on `day`, less what it lost in the stores since it was made. */
export function freshCell(make: CellMake, lot: LotTruth, own: CellDeparture, day: number): Cell {
  const law: ChemistryLaw = CHEMISTRY_LAWS[make.chemistry];
  const fullMah = make.fullMah * lot.capacityFactor * own.capacityFactor;
  const leakPerYear = law.leakPerYear * lot.leakFactor * own.leakFactor;
  // Rechargeable blocks come to the shelf freshly charged, so they lose nothing in the stores.
  const shelfYears = isRecharged(make) ? 0 : Math.max(0, day - lot.madeDay) / 365.25;
  const kept = Math.exp(-leakPerYear * arrhenius(law.leakActivationKj, STORE_C) * shelfYears);
  return {
    law,
    units: make.units,
    fullMah,
    ohm: (make.resistanceMohm / 1000) * lot.resistanceFactor * own.resistanceFactor,
    leakPerYear,
    offsetV: lot.offsetV + own.offsetV,
    madeDay: lot.madeDay,
    wellRateFactor: make.wellRateFactor ?? 1,
    wells: fullWells(fullMah * kept, law.wellShare),
  };
}

function isRecharged(make: CellMake): boolean {
  return make.chemistry === "vrla" || make.chemistry === "lifepo4";
}

/** Lets `hours` pass at a constant current and temperature. */
export function spend(cell: Cell, currentMa: number, hours: number, celsius: number): void {
  const { law } = cell;
  const ratePerHour =
    law.wellRatePerHour * cell.wellRateFactor * arrhenius(law.wellActivationKj, celsius);
  const drained = drain(cell.wells, { share: law.wellShare, ratePerHour }, currentMa, hours);
  const lost =
    cell.leakPerYear * arrhenius(law.leakActivationKj, celsius) * (hours / HOURS_PER_YEAR);
  cell.wells = leak(drained, lost);
}

/** Volts at the terminals under `loadMa`, `day` giving its age. */
export function terminalVolts(cell: Cell, loadMa: number, celsius: number, day: number): number {
  const level = nearLevel(cell.wells, cell.fullMah, cell.law.wellShare);
  const open = openCircuitVolts(cell.law, level, celsius) + cell.offsetV;
  const years = Math.max(0, day - cell.madeDay) / 365.25;
  const ohm = cell.ohm * relativeResistance(cell.law, level, celsius, years);
  return open * cell.units - (loadMa / 1000) * ohm;
}

/** Height of the near well, 1 when full; at or below 0 the cell gives nothing more. */
export function levelOf(cell: Cell): number {
  return nearLevel(cell.wells, cell.fullMah, cell.law.wellShare);
}

/** Share of a fresh cell's charge that is still inside, in both wells. */
export function chargeLeft(cell: Cell): number {
  return Math.max(0, cell.wells.near + cell.wells.far) / cell.fullMah;
}

export function cloneCell(cell: Cell): Cell {
  return { ...cell };
}

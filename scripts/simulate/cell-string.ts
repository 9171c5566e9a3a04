import {
  type Cell,
  type CellDeparture,
  type CellMake,
  chargeLeft,
  cloneCell,
  freshCell,
  levelOf,
  type LotTruth,
  spend,
  terminalVolts,
} from "./cell";
import type { Rng } from "./prng";

/**
 * Cells in series: the weakest by itself and one that stands for all the others, because it
 * is the weakest that ends the string. Cells in parallel are taken as one of their mean.
 */
export interface CellString {
  readonly lotKey: string;
  readonly installedAt: number;
  readonly series: number;
  readonly parallel: number;
  readonly weak: Cell;
  readonly others: Cell | null;
}

/** Spread of cells within one lot, one standard deviation. Source: from memory. */
const CELL_SPREAD = { capacity: 0.035, resistance: 0.12, leak: 0.25, offsetV: 0.004 };

function departure(rng: Rng, parallel: number): CellDeparture {
  const mean = Math.sqrt(parallel);
  return {
    capacityFactor: rng.logNormal(CELL_SPREAD.capacity / mean),
    resistanceFactor: rng.logNormal(CELL_SPREAD.resistance / mean),
    leakFactor: rng.logNormal(CELL_SPREAD.leak / mean),
    offsetV: rng.normal(0, CELL_SPREAD.offsetV / mean),
  };
}

/** Puts together a string of cells of one lot on a (fractional) day. */
export function buildString(
  make: CellMake,
  lot: LotTruth,
  shape: { readonly series: number; readonly parallel: number },
  at: number,
  rng: Rng,
): CellString {
  const drawn = Array.from({ length: shape.series }, () => departure(rng, shape.parallel));
  drawn.sort((a, b) => a.capacityFactor - b.capacityFactor);
  const [weakest, ...rest] = drawn as [CellDeparture, ...CellDeparture[]];
  const middle = rest[Math.floor(rest.length / 2)];
  return {
    lotKey: lot.key,
    installedAt: at,
    ...shape,
    weak: freshCell(make, lot, weakest, at),
    others: middle ? freshCell(make, lot, middle, at) : null,
  };
}

/** Lets `hours` pass at a constant current of the whole pack. */
export function spendString(
  s: CellString,
  currentMa: number,
  hours: number,
  celsius: number,
): void {
  const perCell = currentMa / s.parallel;
  spend(s.weak, perCell, hours, celsius);
  if (s.others) spend(s.others, perCell, hours, celsius);
}

/** Volts of the whole pack under a load of the whole pack. */
export function stringVolts(s: CellString, loadMa: number, celsius: number, day: number): number {
  const perCell = loadMa / s.parallel;
  // A load is shared by the cells in parallel, and so is the resistance of the one that stands for them.
  const weak = terminalVolts(s.weak, perCell, celsius, day);
  const others = s.others ? terminalVolts(s.others, perCell, celsius, day) : 0;
  return weak + others * (s.series - 1);
}

/** True when the weakest cell has nothing left to give. */
export function isSpent(s: CellString): boolean {
  return levelOf(s.weak) <= 0.001;
}

/** Share of its first charge left in the weakest cell: hidden truth, for tests and scores. */
export function stringChargeLeft(s: CellString): number {
  return chargeLeft(s.weak);
}

export function cloneString(s: CellString): CellString {
  return { ...s, weak: cloneCell(s.weak), others: s.others ? cloneCell(s.others) : null };
}

import type { CellMake } from "../cell";
import type { SimulatedChemistry } from "../chemistries";

/** One measured capacity, as a maker's sheet would give it. */
export interface CataloguePoint {
  readonly currentUa: number;
  readonly cutoffMv: number;
  readonly temperatureDc: number;
  readonly capacityMah: number;
  readonly source: string;
}

/** A cell type as the register holds it: what everybody may know. */
export interface CatalogueCell {
  readonly designation: string;
  readonly name: string;
  readonly chemistry: SimulatedChemistry;
  readonly size: string;
  readonly nominalMv: number;
  readonly rated: CataloguePoint;
  readonly capacityTable: readonly CataloguePoint[];
  readonly selfDischargePpmPerYear: number;
  readonly resistanceMohm: number;
  readonly maxPulseUa: number;
  readonly massMg: number;
  readonly shelfLifeMonths: number;
  readonly unitCostMinor: number;
  readonly reorderPoint: number;
  readonly leadTimeDays: number;
  /** The truth behind it, for the simulator only. */
  readonly make: Omit<CellMake, "key" | "chemistry">;
}

/** [current mA, capacity mAh] at one cut-off and 20 °C. */
export function capacityAt20C(
  cutoffMv: number,
  source: string,
  pairs: readonly (readonly [number, number])[],
): CataloguePoint[] {
  return pairs.map(([mA, capacityMah]) => ({
    currentUa: Math.round(mA * 1000),
    cutoffMv,
    temperatureDc: 200,
    capacityMah,
    source,
  }));
}

export const MEMORY = "from memory";

/** A type before its first capacity point is taken as the rated one. */
export type CellDraft = Omit<CatalogueCell, "rated" | "capacityTable"> & {
  readonly points: readonly CataloguePoint[];
};

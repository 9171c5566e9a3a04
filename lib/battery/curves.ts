/**
 * Resting voltage and internal resistance against depth of discharge and temperature.
 * Looked up in tables sampled once per chemistry on an even grid, so that a look-up in the
 * filter's inner loop is two reads and a multiplication.
 */
import type { Decicelsius, Milliohms, Millivolts } from "../units";
import { interpolate } from "../stats/interpolate";
import { COLD_CELSIUS, CURVES } from "./curve-tables";
import { CHEMISTRIES, type CellSpec, type Chemistry } from "./pack";

/** Depths 0..1 in this many equal steps. */
export const CURVE_STEPS = 500;

export interface SampledCurves {
  /** Element's resting voltage at 20 °C, mV, at depths 0, 1/500 ... 1. */
  readonly restMv: Float64Array;
  /** Resistance relative to fresh at 20 °C, same depths. */
  readonly resistance: Float64Array;
}

function sample(chemistry: Chemistry): SampledCurves {
  const curves = CURVES[chemistry];
  const at = (ys: readonly number[]): Float64Array =>
    Float64Array.from({ length: CURVE_STEPS + 1 }, (_, i) =>
      interpolate(curves.depth, ys, i / CURVE_STEPS),
    );
  return { restMv: at(curves.restMv), resistance: at(curves.resistance) };
}

const SAMPLED = Object.fromEntries(CHEMISTRIES.map((c) => [c, sample(c)])) as Record<
  Chemistry,
  SampledCurves
>;

export function sampledCurves(chemistry: Chemistry): SampledCurves {
  return SAMPLED[chemistry];
}

/** Value of an even table at a depth, clamped to 0..1. */
export function atDepth(table: Float64Array, depth: number): number {
  const place = depth * CURVE_STEPS;
  if (!(place > 0)) return table[0]!;
  if (place >= CURVE_STEPS) return table[CURVE_STEPS]!;
  const low = Math.floor(place);
  const a = table[low]!;
  return a + (place - low) * (table[low + 1]! - a);
}

/** Elements in one cell as bought: 1 for most, 6 for a 9 V or a 12 V lead block. */
export function elementsOf(cell: CellSpec): number {
  return Math.max(1, Math.round(cell.nominalMv / CURVES[cell.chemistry].elementMv));
}

/** Resting voltage of one cell, mV; `depth` is the share of its capacity drawn, 0..1. */
export function restingMv(cell: CellSpec, depth: number, temperatureDc: Decicelsius): Millivolts {
  const warm = atDepth(sampledCurves(cell.chemistry).restMv, depth);
  const drift = CURVES[cell.chemistry].restMvPerKelvin * (temperatureDc / 10 - 20);
  return elementsOf(cell) * (warm + drift);
}

/** Internal resistance relative to 20 °C; clamped to -40..60 °C. */
export function resistanceFactor(chemistry: Chemistry, temperatureDc: Decicelsius): number {
  return interpolate(COLD_CELSIUS, CURVES[chemistry].coldResistance, temperatureDc / 10);
}

/** Internal resistance of one cell, milliohms. */
export function resistanceMohm(
  cell: CellSpec,
  depth: number,
  temperatureDc: Decicelsius,
): Milliohms {
  const grown = atDepth(sampledCurves(cell.chemistry).resistance, depth);
  return cell.resistanceMohm * grown * resistanceFactor(cell.chemistry, temperatureDc);
}

/** Capacity relative to 20 °C at the rated current; clamped to -40..60 °C. */
export function capacityFactor(chemistry: Chemistry, temperatureDc: Decicelsius): number {
  return interpolate(COLD_CELSIUS, CURVES[chemistry].coldCapacity, temperatureDc / 10);
}

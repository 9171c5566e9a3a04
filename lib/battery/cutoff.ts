/**
 * End of life: the depth of discharge at which the voltage under the device's peak current
 * meets the cut-off. The pulse decides it, not the average; cold raises the resistance and
 * so brings the end forward.
 */
import type { Decicelsius, Microamps, Millivolts } from "../units";
import { CURVE_STEPS, atDepth, elementsOf, resistanceFactor, sampledCurves } from "./curves";
import { isSteady } from "./duty";
import { taughtCurves } from "./taught-curves";
import { CURVES } from "./curve-tables";
import type { CurveLesson, PackSpec } from "./pack";

/** A steady load's resistance grows by no more than this factor over a life (from memory). */
const STEADY_GROWTH = 3;

/** Voltage of a whole pack: k rest(x) + drift(T) - I R(x) factor(T). */
export interface PackCurve {
  readonly restMv: Float64Array;
  readonly resistance: Float64Array;
  /** Elements in series: millivolts of the pack per millivolt of the element. */
  readonly restScale: number;
  readonly driftMvPerKelvin: number;
  /** Resistance of the fresh pack at 20 °C, milliohms. */
  readonly freshMohm: number;
}

export function packCurve(pack: PackSpec, lesson: CurveLesson | null = null): PackCurve {
  const restScale = pack.series * elementsOf(pack.cell);
  const { chemistry } = pack.cell;
  const { restMv, resistance } = lesson
    ? taughtCurves(chemistry, lesson)
    : sampledCurves(chemistry);
  return {
    restMv,
    resistance: isSteady(pack) ? heldDown(resistance) : resistance,
    restScale,
    driftMvPerKelvin: restScale * CURVES[pack.cell.chemistry].restMvPerKelvin,
    freshMohm: (pack.cell.resistanceMohm * pack.series) / pack.parallel,
  };
}

/** Many packs share few curves: each is held down once. */
const HELD_DOWN = new WeakMap<Float64Array, Float64Array>();

/**
 * Growth of the resistance as a load meets it that hardly ever pauses. A pulse near the end meets
 * many times the fresh resistance because charge runs out; a steady load has had that counted in
 * its capacity at that current (an LR6 on 250 mA still gives 0.95 V at nine tenths of its charge).
 */
function heldDown(resistance: Float64Array): Float64Array {
  const known = HELD_DOWN.get(resistance) ?? resistance.map((r) => Math.min(r, STEADY_GROWTH));
  HELD_DOWN.set(resistance, known);
  return known;
}

/** Fall of the fresh pack's voltage under a current at a temperature, mV. */
export function freshDropMv(
  pack: PackSpec,
  curve: PackCurve,
  currentUa: Microamps,
  temperatureDc: Decicelsius,
): Millivolts {
  // microamps times milliohms are nanovolts
  return (currentUa * curve.freshMohm * resistanceFactor(pack.cell.chemistry, temperatureDc)) / 1e6;
}

/** Voltage of the pack at a depth under a current, mV; current 0 is at rest. */
export function packMv(
  pack: PackSpec,
  curve: PackCurve,
  depth: number,
  currentUa: Microamps,
  temperatureDc: Decicelsius,
): Millivolts {
  const rest = curve.restScale * atDepth(curve.restMv, depth);
  const drift = curve.driftMvPerKelvin * (temperatureDc / 10 - 20);
  const drop = freshDropMv(pack, curve, currentUa, temperatureDc);
  return rest + drift - drop * atDepth(curve.resistance, depth);
}

/**
 * First depth, 0..1, at which `k rest + drift - drop R` is at or below the cut-off; 1 when
 * it holds to the end of the table; 0 when even the fresh pack is below.
 */
export function endDepth(
  curve: PackCurve,
  cutoffMv: Millivolts,
  driftMv: Millivolts,
  dropMv: Millivolts,
): number {
  if (!(aboveAt(curve, 0, driftMv - cutoffMv, dropMv) > 0)) return 0;
  if (aboveAt(curve, CURVE_STEPS, driftMv - cutoffMv, dropMv) > 0) return 1;
  // the voltage falls throughout: halve the span that holds the crossing
  let low = 0;
  let high = CURVE_STEPS;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (aboveAt(curve, middle, driftMv - cutoffMv, dropMv) > 0) low = middle;
    else high = middle;
  }
  const before = aboveAt(curve, low, driftMv - cutoffMv, dropMv);
  return (low + before / (before - aboveAt(curve, high, driftMv - cutoffMv, dropMv))) / CURVE_STEPS;
}

/** Voltage at a node of the table, `addMv` added, mV. */
function aboveAt(curve: PackCurve, i: number, addMv: number, dropMv: number): number {
  return curve.restScale * curve.restMv[i]! + addMv - dropMv * curve.resistance[i]!;
}

/** End depth of a pack under a current at a temperature. */
export function packEndDepth(
  pack: PackSpec,
  currentUa: Microamps,
  temperatureDc: Decicelsius,
): number {
  const curve = packCurve(pack);
  const drift = curve.driftMvPerKelvin * (temperatureDc / 10 - 20);
  return endDepth(curve, pack.cutoffMv, drift, freshDropMv(pack, curve, currentUa, temperatureDc));
}

/**
 * End of life: the depth of discharge at which the voltage under the device's peak current
 * meets the cut-off. The pulse decides it, not the average; cold raises the resistance and
 * so brings the end forward.
 */
import type { Decicelsius, Microamps, Millivolts } from "../units";
import { CURVE_STEPS, atDepth, elementsOf, resistanceFactor, sampledCurves } from "./curves";
import { taughtCurves } from "./taught-curves";
import { CURVES } from "./curve-tables";
import type { CurveLesson, PackSpec } from "./pack";

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
  return {
    ...(lesson ? taughtCurves(pack.cell.chemistry, lesson) : sampledCurves(pack.cell.chemistry)),
    restScale,
    driftMvPerKelvin: restScale * CURVES[pack.cell.chemistry].restMvPerKelvin,
    freshMohm: (pack.cell.resistanceMohm * pack.series) / pack.parallel,
  };
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

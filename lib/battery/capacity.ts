/**
 * Capacity by table. Between measured currents it is interpolated over log(current), at
 * each current over cut-off, then over temperature; outside the table the nearest measured
 * value holds. Nothing is extrapolated, Peukert's law least of all: its exponent is not a
 * constant of the cell (Linden 4e Fig. 14.17 gives 2.17 to 0.95 over one table).
 */
import type { Decicelsius, Microamps, MilliampHours, Millivolts } from "../units";
import { interpolate } from "../stats/interpolate";
import { capacityFactor } from "./curves";
import type { CapacityPoint, CellSpec, Chemistry } from "./pack";
import { selfDischargeUa } from "./self-discharge";

/** Every point of the table, the rated one included once. */
export function capacityPoints(cell: CellSpec): readonly CapacityPoint[] {
  return [...cell.capacityTable, cell.rated];
}

type Axis = (point: CapacityPoint) => number;

/** Group points by an axis, ascending; the first point of equals wins its place. */
function groups(points: readonly CapacityPoint[], axis: Axis): [number, CapacityPoint[]][] {
  const byValue = new Map<number, CapacityPoint[]>();
  for (const point of points) {
    const group = byValue.get(axis(point));
    if (group) group.push(point);
    else byValue.set(axis(point), [point]);
  }
  return [...byValue].sort(([a], [b]) => a - b);
}

const mean = (points: readonly CapacityPoint[]): number =>
  points.reduce((sum, p) => sum + p.capacityMah, 0) / points.length;

/** One axis of a table: places in order, and what stands at each. */
interface Steps<Value> {
  readonly at: readonly number[];
  readonly values: readonly Value[];
}

function stepsOf<Value>(
  points: readonly CapacityPoint[],
  axis: Axis,
  inner: (same: readonly CapacityPoint[]) => Value,
): Steps<Value> {
  const steps = groups(points, axis);
  return { at: steps.map(([at]) => at), values: steps.map(([, same]) => inner(same)) };
}

/** A cell's points by temperature, then log(current), then cut-off. */
type Arranged = Steps<Steps<Steps<number>>>;

const arrange = (points: readonly CapacityPoint[]): Arranged =>
  stepsOf(
    points,
    (p) => p.temperatureDc,
    (warm) =>
      stepsOf(
        warm,
        (p) => Math.log(Math.max(p.currentUa, 1e-3)),
        (same) => stepsOf(same, (p) => p.cutoffMv, mean),
      ),
  );

/** Capacity as measured, and with what leaked away during each measurement put back. */
interface Tables {
  readonly measured: Arranged;
  readonly gross: Arranged;
}

/** A fleet shares few cells: each is arranged once. */
const ARRANGED = new WeakMap<CellSpec, Tables>();

function tablesOf(cell: CellSpec): Tables {
  const known = ARRANGED.get(cell);
  if (known) return known;
  const points = capacityPoints(cell);
  const leakUa = selfDischargeUa(cell.rated.capacityMah, cell.selfDischargePpmPerYear);
  const restored = points.map((p) => ({
    ...p,
    capacityMah: p.capacityMah * (1 + leakUa / Math.max(p.currentUa, leakUa, 1e-9)),
  }));
  const tables = { measured: arrange(points), gross: arrange(restored) };
  ARRANGED.set(cell, tables);
  return tables;
}

function lookUp(cell: CellSpec, table: Arranged, ua: Microamps, cutoffMv: Millivolts, dc: number) {
  const logUa = Math.log(Math.max(ua, 1e-3));
  const given = table.values.map((overCurrent) =>
    interpolate(
      overCurrent.at,
      overCurrent.values.map((step) => interpolate(step.at, step.values, cutoffMv)),
      logUa,
    ),
  );
  if (given.length > 1) return interpolate(table.at, given, dc);
  const at = capacityFactor(cell.chemistry, table.at[0]!);
  return (given[0]! * capacityFactor(cell.chemistry, dc)) / Math.max(at, 0.01);
}

/**
 * Charge one cell gives at a constant current down to a cut-off at a temperature, mAh.
 * Where the table holds one temperature only, the chemistry's cold table scales it.
 */
export function usableCapacity(
  cell: CellSpec,
  currentUa: Microamps,
  cutoffMv: Millivolts,
  temperatureDc: Decicelsius,
): MilliampHours {
  return lookUp(cell, tablesOf(cell).measured, currentUa, cutoffMv, temperatureDc);
}

/**
 * The same, with the charge that leaked away during each measurement put back, so that
 * self-discharge can run beside the load as a current s of its own: C (1 + s/I) at each
 * point. Without this a table that falls at low current would count the leak twice.
 */
export function grossCapacity(
  cell: CellSpec,
  currentUa: Microamps,
  cutoffMv: Millivolts,
  temperatureDc: Decicelsius,
): MilliampHours {
  return lookUp(cell, tablesOf(cell).gross, currentUa, cutoffMv, temperatureDc);
}

/**
 * How far a cell may fall short of its table above the table's highest current: ln(capacity)
 * lost for each unit of ln(current), and its standard deviation. A prior for readings to move,
 * not a law. Alkaline: LR6 2.8 Ah at 25 mA, below 1.0 Ah at 1 A (a part of that is the end's
 * resistance, reckoned apart). Li-FeS2: 0.018 from logs of an FR6. Li-SOCl2: 0.2 to 1.2 above a
 * D cell's best current (Linden 4e Fig. 14.17). Lead: common practice. The rest from memory.
 */
const OVERLOAD: Readonly<Record<Chemistry, readonly [number, number]>> = {
  alkaline: [0.15, 0.1],
  "zinc-carbon": [0.25, 0.12],
  "li-fes2": [0.018, 0.03],
  "li-socl2": [0.25, 0.15],
  "li-mno2": [0.05, 0.05],
  "silver-oxide": [0.08, 0.08],
  vrla: [0.12, 0.06],
  lifepo4: [0.02, 0.03],
};

/** Mean and standard deviation of ln(capacity) beside the table's at a current of one cell. */
export function overload(cell: CellSpec, currentUa: Microamps): { mean: number; sd: number } {
  const top = cell.capacityTable.reduce((a, p) => Math.max(a, p.currentUa), cell.rated.currentUa);
  const beyond = Math.max(0, Math.log(currentUa / top));
  const [lost, sd] = OVERLOAD[cell.chemistry];
  return { mean: -lost * beyond, sd: sd * beyond };
}

/** Lowest cut-off of the table: the one on which depth of discharge is measured, mV. */
export function baseCutoffMv(cell: CellSpec): Millivolts {
  return cell.capacityTable.reduce((low, p) => Math.min(low, p.cutoffMv), cell.rated.cutoffMv);
}

/** Hours one cell lasts at a constant current, self-discharge beside the load. */
export function dischargeHours(
  cell: CellSpec,
  currentUa: Microamps,
  cutoffMv: Millivolts,
  temperatureDc: Decicelsius,
): number {
  const leakUa = selfDischargeUa(cell.rated.capacityMah, cell.selfDischargePpmPerYear);
  const gross = grossCapacity(cell, currentUa, cutoffMv, temperatureDc);
  return (gross * 1000) / (currentUa + leakUa);
}

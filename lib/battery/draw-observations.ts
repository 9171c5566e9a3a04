/**
 * What the voltages of a pack say of its device's draw over stretches of its life, for the search
 * for shifts (`fleet-findings.ts`). A resting voltage stands for a share consumed, the curve read
 * backwards; the share consumed between two of them is charge over time:
 *
 *   draw = (depth₂ − depth₁) · capacity / (t₂ − t₁) − leak
 *
 * with the error that the readings and the slope of the curve give. Where the curve is flat the
 * error is so large that nothing is said.
 */
import type { EpochDays } from "../units";
import { ASSUMED } from "./assumptions";
import { baseCutoffMv, grossCapacity } from "./capacity";
import { CURVE_STEPS, elementsOf, restingMv } from "./curves";
import { CURVES } from "./curve-tables";
import { packAverageUa } from "./duty";
import type { DrawObservation } from "./fleet-findings";
import type { Chemistry, PackReading, PackSpec } from "./pack";
import { selfDischargeUa } from "./self-discharge";

/** Shorter stretches say more about the meter than about the draw. */
const LEAST_DAYS = 45;
/** An error above this, in ln(draw), says nothing worth keeping. */
const MOST_SD = 0.5;

interface Point {
  readonly at: EpochDays;
  readonly depth: number;
  /** One standard deviation of the depth by the meter and by the curve's own error. */
  readonly sd: number;
}

/** An observation with the middle of its stretch on the depth axis. */
export interface DepthObservation extends DrawObservation {
  readonly chemistry: Chemistry;
  readonly depth: number;
}

export interface ObservedPack {
  readonly packKey: string;
  readonly model: string;
  readonly pack: PackSpec;
  readonly readings: readonly PackReading[];
}

/** Observations of one pack, one a stretch between resting voltages, oldest first. */
export function drawObservations({
  packKey,
  model,
  pack,
  readings,
}: ObservedPack): DepthObservation[] {
  const sheetUa = packAverageUa({ ...pack, measuredDraw: null });
  if (!(sheetUa > 0)) return [];
  const points = readings
    .filter((r) => r.kind === "resting" && r.at >= pack.installedAt)
    .sort((a, b) => a.at - b.at)
    .flatMap((reading) => pointOf(pack, reading) ?? []);
  const found: DepthObservation[] = [];
  let from: Point | undefined;
  for (const point of points) {
    if (!from) {
      from = point;
      continue;
    }
    const seen = between(pack, sheetUa, from, point);
    if (!seen) continue;
    const depth = (from.depth + point.depth) / 2;
    const { chemistry } = pack.cell;
    found.push({ packKey, model, at: (from.at + point.at) / 2, chemistry, depth, ...seen });
    from = point;
  }
  return found;
}

/** The depth at which a pack rests at this voltage, by bisection; null off the curve's ends. */
function pointOf(pack: PackSpec, reading: PackReading): Point | null {
  const { cell, series } = pack;
  const dc = reading.temperatureDc ?? 200;
  const cellMv = reading.millivolts / series;
  const at = (depth: number) => restingMv(cell, depth, dc);
  if (cellMv >= at(0) || cellMv <= at(1)) return null;
  let [low, high] = [0, 1];
  for (let i = 0; i < 24; i++) {
    const middle = (low + high) / 2;
    if (at(middle) > cellMv) low = middle;
    else high = middle;
  }
  const step = 2 / CURVE_STEPS;
  const slope = (at(low - step) - at(low + step)) / (2 * step);
  if (!(slope > 0)) return null;
  const meter = (reading.accuracyMv ?? ASSUMED.accuracyMv) / series;
  const warmth = reading.temperatureDc === null ? ASSUMED.temperatureSdK : 0;
  const elements = elementsOf(cell);
  const curve = CURVES[cell.chemistry];
  const own = Math.hypot(curve.ownSpreadMv, curve.restMvPerKelvin * warmth) * elements;
  return { at: reading.at, depth: low, sd: Math.hypot(meter, own) / slope };
}

function between(
  pack: PackSpec,
  sheetUa: number,
  from: Point,
  to: Point,
): Pick<DrawObservation, "lnFactor" | "sd"> | null {
  const days = to.at - from.at;
  const gone = to.depth - from.depth;
  if (days < LEAST_DAYS || !(gone > 0)) return null;
  const { cell, parallel } = pack;
  const fullMah = grossCapacity(cell, sheetUa / parallel, baseCutoffMv(cell), 200);
  const leakUa = selfDischargeUa(cell.rated.capacityMah, cell.selfDischargePpmPerYear);
  const drawUa = ((gone * fullMah * 1000) / (days * 24) - leakUa) * parallel;
  const sd = Math.hypot(Math.hypot(from.sd, to.sd) / gone, ASSUMED.capacitySd);
  return drawUa > 0 && sd <= MOST_SD ? { lnFactor: Math.log(drawUa / sheetUa), sd } : null;
}

const DEPTH_BINS = 10;
/** A bin with fewer observations than this is left as it is. */
const LEAST_IN_BIN = 12;

/**
 * Takes out what the curve itself gets wrong: at each tenth of the depth axis of a chemistry,
 * the mean by which observations there stray from their own model's mean. A table that is too
 * steep near full would else look like a draw that shifts when many packs are young at once.
 */
export function levelByDepth(observations: readonly DepthObservation[]): DrawObservation[] {
  const ofModel = meanBy(
    observations,
    (o) => o.model,
    (o) => o.lnFactor,
  );
  const place = (o: DepthObservation) =>
    `${o.chemistry} ${Math.min(DEPTH_BINS - 1, Math.floor(o.depth * DEPTH_BINS))}`;
  const stray = meanBy(observations, place, (o) => o.lnFactor - ofModel.get(o.model)!.mean);
  return observations.map((o) => {
    const bin = stray.get(place(o))!;
    return { ...o, lnFactor: o.lnFactor - (bin.count < LEAST_IN_BIN ? 0 : bin.mean) };
  });
}

/** Means weighted by precision. */
function meanBy(
  observations: readonly DepthObservation[],
  key: (o: DepthObservation) => string,
  value: (o: DepthObservation) => number,
): Map<string, { mean: number; count: number }> {
  const sums = new Map<string, { sum: number; weight: number; count: number }>();
  for (const o of observations) {
    const weight = 1 / o.sd ** 2;
    const { sum, weight: total, count } = sums.get(key(o)) ?? { sum: 0, weight: 0, count: 0 };
    sums.set(key(o), { sum: sum + weight * value(o), weight: total + weight, count: count + 1 });
  }
  return new Map([...sums].map(([k, s]) => [k, { mean: s.sum / s.weight, count: s.count }]));
}

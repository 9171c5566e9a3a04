/**
 * Probability on a grid: depth of discharge x ln(rate) x voltage offset. Depth moves with
 * the mass (its window follows mean +/- WINDOW spreads, so a sharp posterior is drawn as
 * finely as a wide one); the other two axes stand still. Deterministic throughout.
 */
import { ASSUMED } from "./assumptions";
import type { PackModel } from "./pack-model";

const DEPTH_NODES = 64;
const RATE_NODES = 21;
const OFFSET_NODES = 5;
const WINDOW = 4.5;
const MIN_SPREAD = 0.004;
const NEGLIGIBLE = 1e-9;

export interface Grid {
  readonly nx: number;
  readonly nr: number;
  readonly no: number;
  /** Probability of offset o, rate r, depth i at [(o nr + r) nx + i]; sums to 1. */
  p: Float64Array;
  spare: Float64Array;
  depthFrom: number;
  depthStep: number;
  readonly lnRate: Float64Array;
  readonly rate: Float64Array;
  readonly rateStep: number;
  /** Offsets in mV and their spacing. */
  readonly offsetMv: Float64Array;
  readonly offsetStepMv: number;
}

/** Grid of a new pack. `years`: how long the draw will have wandered; `sd`: widest prior. */
export function newGrid(model: PackModel, years: number, sd: number): Grid {
  const half = 3 * Math.hypot(sd, ASSUMED.drawWalkPerYear * Math.sqrt(Math.min(years, 15)));
  const rateStep = (2 * half) / (RATE_NODES - 1);
  const lnRate = Float64Array.from(
    { length: RATE_NODES },
    (_, r) => model.prior.mean - half + r * rateStep,
  );
  const size = OFFSET_NODES * RATE_NODES * DEPTH_NODES;
  const middle = (OFFSET_NODES - 1) / 2;
  const grid: Grid = {
    nx: DEPTH_NODES,
    nr: RATE_NODES,
    no: OFFSET_NODES,
    p: new Float64Array(size),
    spare: new Float64Array(size),
    depthFrom: model.startDepth - WINDOW * model.startSd,
    depthStep: (2 * WINDOW * model.startSd) / (DEPTH_NODES - 1),
    lnRate,
    rate: lnRate.map(Math.exp),
    rateStep,
    offsetMv: Float64Array.from(
      { length: OFFSET_NODES },
      (_, o) => (o - middle) * model.offsetSdMv,
    ),
    offsetStepMv: model.offsetSdMv,
  };
  fillPrior(grid, model);
  return grid;
}

function fillPrior(grid: Grid, model: PackModel): void {
  const { nx, nr, no } = grid;
  const bell = (x: number, mean: number, sd: number): number =>
    Math.exp(-0.5 * ((x - mean) / sd) ** 2);
  for (let o = 0; o < no; o++) {
    const wo = bell(grid.offsetMv[o]!, 0, model.offsetSdMv);
    for (let r = 0; r < nr; r++) {
      const wr = wo * bell(grid.lnRate[r]!, model.prior.mean, model.prior.sd);
      for (let i = 0; i < nx; i++) {
        const depth = grid.depthFrom + i * grid.depthStep;
        grid.p[(o * nr + r) * nx + i] = wr * bell(depth, model.startDepth, model.startSd);
      }
    }
  }
  normalise(grid);
}

/** Scale to a sum of 1; returns the sum before. A sum of 0 leaves the grid untouched. */
export function normalise(grid: Grid): number {
  const { p } = grid;
  let sum = 0;
  for (let k = 0; k < p.length; k++) sum += p[k]!;
  if (sum > 0 && Number.isFinite(sum)) {
    const scale = 1 / sum;
    for (let k = 0; k < p.length; k++) p[k]! *= scale;
  }
  return sum;
}

/**
 * Move every depth by draw x rate + leak. Each rate row shifts as one; its mass is split
 * between the two nearest nodes of the new window, which keeps total and mean exactly.
 */
export function consume(grid: Grid, draw: number, leak: number): void {
  const shift = grid.rate.map((rate) => draw * rate + leak);
  const window = movedWindow(grid, shift);
  const refine = grid.depthStep / window.step > 1.05;
  grid.spare.fill(0);
  for (let row = 0; row < grid.no * grid.nr; row++) {
    const by = shift[row % grid.nr]!;
    if (!(refine && gatherRow(grid, row * grid.nx, by, window))) {
      scatterRow(grid, row * grid.nx, by, window);
    }
  }
  const old = grid.p;
  grid.p = grid.spare;
  grid.spare = old;
  grid.depthFrom = window.from;
  grid.depthStep = window.step;
}

interface Window {
  readonly from: number;
  readonly step: number;
}

function movedWindow(grid: Grid, shift: Float64Array): Window {
  const { p, nx, nr, no } = grid;
  let first = 0;
  let second = 0;
  for (let row = 0; row < no * nr; row++) {
    let mass = 0;
    let sum = 0;
    let squares = 0;
    for (let i = 0, k = row * nx; i < nx; i++, k++) {
      const m = p[k]!;
      mass += m;
      sum += m * i;
      squares += m * i * i;
    }
    const from = grid.depthFrom + shift[row % nr]!;
    first += mass * from + sum * grid.depthStep;
    second +=
      mass * from * from +
      2 * from * sum * grid.depthStep +
      squares * grid.depthStep * grid.depthStep;
  }
  const sd = Math.max(MIN_SPREAD, Math.sqrt(Math.max(0, second - first * first)));
  return { from: first - WINDOW * sd, step: (2 * WINDOW * sd) / (nx - 1) };
}

function scatterRow(grid: Grid, base: number, by: number, window: Window): void {
  const { p, spare, nx } = grid;
  const ratio = grid.depthStep / window.step;
  let place = (grid.depthFrom + by - window.from) / window.step;
  for (let i = 0; i < nx; i++, place += ratio) {
    const m = p[base + i]!;
    if (m === 0) continue;
    if (place <= 0) spare[base]! += m;
    else if (place >= nx - 1) spare[base + nx - 1]! += m;
    else {
      const low = place | 0;
      const part = m * (place - low);
      spare[base + low]! += m - part;
      spare[base + low + 1]! += part;
    }
  }
}

/**
 * Into a finer window: read the density between the old nodes, or the mass would stand in
 * a comb. False (nothing written) when the row hardly overlaps the new window.
 */
function gatherRow(grid: Grid, base: number, by: number, window: Window): boolean {
  const { p, spare, nx } = grid;
  let mass = 0;
  for (let i = 0; i < nx; i++) mass += p[base + i]!;
  if (mass < NEGLIGIBLE) return false;
  const ratio = window.step / grid.depthStep;
  let place = (window.from - by - grid.depthFrom) / grid.depthStep;
  let sum = 0;
  for (let j = 0; j < nx; j++, place += ratio) {
    if (place < 0 || place >= nx - 1) continue;
    const low = place | 0;
    const a = p[base + low]!;
    const density = a + (place - low) * (p[base + low + 1]! - a);
    spare[base + j] = density;
    sum += density;
  }
  if (sum * ratio < 0.9 * mass) {
    spare.fill(0, base, base + nx);
    return false;
  }
  const scale = mass / sum;
  for (let j = 0; j < nx; j++) spare[base + j]! *= scale;
  return true;
}

/** Random walk of ln(rate): spread its variance between neighbouring rates, ends reflecting. */
export function wander(grid: Grid, variance: number): void {
  let left = variance / (2 * grid.rateStep * grid.rateStep);
  while (left > 1e-9) {
    const part = Math.min(left, 0.25);
    mixRates(grid, part);
    left -= part;
  }
}

function mixRates(grid: Grid, part: number): void {
  const { p, nx, nr, no } = grid;
  const before = new Float64Array(nx);
  for (let o = 0; o < no; o++) {
    const start = o * nr * nx;
    before.set(p.subarray(start, start + nx));
    for (let r = 0; r < nr; r++) {
      const base = start + r * nx;
      const next = r < nr - 1 ? base + nx : base;
      for (let i = 0; i < nx; i++) {
        const own = p[base + i]!;
        p[base + i] = own + part * (before[i]! + p[next + i]! - 2 * own);
        before[i] = own;
      }
    }
  }
}

/** Forget the rate: at every depth and offset it becomes normal(mean, sd) again. */
export function openRate(grid: Grid, mean: number, sd: number): void {
  const { p, nx, nr, no } = grid;
  const bell = grid.lnRate.map((ln) => Math.exp(-0.5 * ((ln - mean) / sd) ** 2));
  const total = bell.reduce((a, b) => a + b, 0);
  for (let o = 0; o < no; o++) {
    for (let i = 0; i < nx; i++) {
      let mass = 0;
      for (let r = 0; r < nr; r++) mass += p[(o * nr + r) * nx + i]!;
      for (let r = 0; r < nr; r++) p[(o * nr + r) * nx + i] = (mass * bell[r]!) / total;
    }
  }
}

/** Multiply by a weight that depends on depth alone, and normalise. Nothing becomes certain. */
export function weighDepth(grid: Grid, weight: (depth: number) => number): number {
  const { p, nx } = grid;
  for (let i = 0; i < nx; i++) {
    const w = weight(grid.depthFrom + i * grid.depthStep) + NEGLIGIBLE;
    for (let k = i; k < p.length; k += nx) p[k]! *= w;
  }
  return normalise(grid);
}

/** Marginal probability of each depth node. */
export function depthMarginal(grid: Grid): Float64Array {
  const { p, nx } = grid;
  const marginal = new Float64Array(nx);
  for (let k = 0; k < p.length; k += nx) {
    for (let i = 0; i < nx; i++) marginal[i]! += p[k + i]!;
  }
  return marginal;
}

/** Marginal probability of each rate node. */
export function rateMarginal(grid: Grid): Float64Array {
  const { p, nx, nr } = grid;
  const marginal = new Float64Array(nr);
  for (let row = 0; row * nx < p.length; row++) {
    let mass = 0;
    for (let k = row * nx; k < (row + 1) * nx; k++) mass += p[k]!;
    marginal[row % nr]! += mass;
  }
  return marginal;
}

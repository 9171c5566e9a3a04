/**
 * Probability on a grid: depth of discharge x ln(rate) x voltage offset. Depth moves with
 * the mass (its window follows mean +/- WINDOW spreads, so a sharp posterior is drawn as
 * finely as a wide one); the other two axes stand still. Deterministic throughout.
 */
import { ASSUMED } from "./assumptions";
import type { PackModel } from "./pack-model";

const DEPTH_NODES = 36;
const RATE_NODES = 15;
/**
 * Three offsets, 1.5 spreads apart: with the variance inside a cell (spacing²/12, added to each
 * reading) the prior's variance is that of a normal.
 */
export const OFFSET_NODES = 3;
const OFFSET_SPACING = 1.5;
const OFFSET_PRIOR = Float64Array.of(0.18, 0.64, 0.18);
/** The depth window reaches this many spreads to either side of the mean. */
export const WINDOW = 4.5;
/** Added to every weight of evidence: nothing becomes certain. */
const DOUBT = 1e-9;

export interface Grid {
  readonly nx: number;
  readonly nr: number;
  readonly no: number;
  /**
   * Mass of offset o, rate r, depth i at [(o nr + r) nx + i]. Evidence only multiplies it;
   * `consume` and the filter's end bring it back to a sum of 1.
   */
  p: Float64Array;
  /** Working space: the next `p`, and three values a depth node. */
  spare: Float64Array;
  /** Mass of each row when it last moved; a row of 0 holds nothing and is passed over. */
  readonly rowMass: Float64Array;
  /** First and second moment of each row over its node numbers, when it last moved. */
  readonly rowFirst: Float64Array;
  readonly rowSecond: Float64Array;
  readonly nodeA: Float64Array;
  readonly nodeB: Float64Array;
  readonly nodeC: Float64Array;
  depthFrom: number;
  depthStep: number;
  /** Walk of ln(rate), as a variance, and redrawing of the offset still to be laid on. */
  owedVariance: number;
  owedRedraw: number;
  readonly lnRate: Float64Array;
  readonly rate: Float64Array;
  readonly rateStep: number;
  /** Offsets in mV and their spacing. */
  readonly offsetMv: Float64Array;
  readonly offsetStepMv: number;
  /** Prior probability of each offset. */
  readonly offsetPrior: Float64Array;
}

/** Working space of finished grids, written over before it is read: spares the collector. */
const IDLE: Float64Array[] = [];

/** Give back a grid's working space; nothing can be consumed afterwards. */
export function retire(grid: Grid): void {
  IDLE.push(grid.spare);
  grid.spare = new Float64Array(0);
}

/** Grid of a new pack. `years`: how long the draw will have wandered; `sd`: widest prior. */
export function newGrid(model: PackModel, years: number, sd: number): Grid {
  const half = 3 * Math.hypot(sd, ASSUMED.drawWalkPerYear * Math.sqrt(Math.min(years, 15)));
  const rateStep = (2 * half) / (RATE_NODES - 1);
  const lnRate = Float64Array.from(
    { length: RATE_NODES },
    (_, r) => model.prior.mean - half + r * rateStep,
  );
  const rows = OFFSET_NODES * RATE_NODES;
  const size = rows * DEPTH_NODES;
  const offsetStepMv = OFFSET_SPACING * model.offsetSdMv;
  const grid: Grid = {
    nx: DEPTH_NODES,
    nr: RATE_NODES,
    no: OFFSET_NODES,
    p: new Float64Array(size),
    spare: IDLE.pop() ?? new Float64Array(size),
    rowMass: new Float64Array(rows).fill(1),
    rowFirst: new Float64Array(rows),
    rowSecond: new Float64Array(rows),
    nodeA: new Float64Array(DEPTH_NODES),
    nodeB: new Float64Array(DEPTH_NODES),
    nodeC: new Float64Array(DEPTH_NODES),
    depthFrom: model.startDepth - WINDOW * model.startSd,
    depthStep: (2 * WINDOW * model.startSd) / (DEPTH_NODES - 1),
    owedVariance: 0,
    owedRedraw: 0,
    lnRate,
    rate: lnRate.map(Math.exp),
    rateStep,
    offsetMv: Float64Array.of(-offsetStepMv, 0, offsetStepMv),
    offsetStepMv,
    offsetPrior: OFFSET_PRIOR,
  };
  fillPrior(grid, model);
  return grid;
}

function fillPrior(grid: Grid, model: PackModel): void {
  const { nx, nr, no } = grid;
  const bell = (x: number, mean: number, sd: number): number =>
    Math.exp(-0.5 * ((x - mean) / sd) ** 2);
  const { nodeA: depths } = grid;
  for (let i = 0; i < nx; i++) {
    depths[i] = bell(grid.depthFrom + i * grid.depthStep, model.startDepth, model.startSd);
  }
  for (let r = 0; r < nr; r++) {
    const wr = bell(grid.lnRate[r]!, model.prior.mean, model.prior.sd);
    for (let o = 0; o < no; o++) {
      const base = (o * nr + r) * nx;
      for (let i = 0; i < nx; i++) grid.p[base + i] = wr * grid.offsetPrior[o]! * depths[i]!;
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

/** Multiply by a weight that depends on depth alone. */
export function weighDepth(grid: Grid, weight: (depth: number) => number): void {
  const { p, nx } = grid;
  for (let i = 0; i < nx; i++) {
    const w = weight(grid.depthFrom + i * grid.depthStep) + DOUBT;
    for (let k = i; k < p.length; k += nx) p[k]! *= w;
  }
}

/** Marginal mass of each depth node. */
export function depthMarginal(
  grid: Grid,
  into: Float64Array = new Float64Array(grid.nx),
): Float64Array {
  const { p, nx, rowMass } = grid;
  into.fill(0);
  for (let row = 0, k = 0; row < rowMass.length; row++, k += nx) {
    if (rowMass[row] === 0) continue;
    for (let i = 0; i < nx; i++) into[i]! += p[k + i]!;
  }
  return into;
}

/** Marginal mass of each rate node. */
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

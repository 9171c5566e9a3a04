/**
 * Probability on a grid: depth of discharge x ln(rate) x voltage offset. Depth moves with
 * the mass (its window follows mean +/- WINDOW spreads, so a sharp posterior is drawn as
 * finely as a wide one); the other two axes stand still. Deterministic throughout.
 */
import { ASSUMED } from "./assumptions";
import type { PackModel } from "./pack-model";

const DEPTH_NODES = 48;
const RATE_NODES = 17;
const OFFSET_NODES = 5;
/** The depth window reaches this many spreads to either side of the mean. */
export const WINDOW = 4.5;
/** Added to every weight of evidence: nothing becomes certain. */
const DOUBT = 1e-9;

const OFFSET_PRIOR = bells(OFFSET_NODES);

/** Normal weights at whole spreads around 0, summing to 1. */
function bells(count: number): Float64Array {
  const weights = Float64Array.from({ length: count }, (_, o) =>
    Math.exp(-0.5 * (o - (count - 1) / 2) ** 2),
  );
  const total = weights.reduce((a, b) => a + b, 0);
  return weights.map((w) => w / total);
}

export interface Grid {
  readonly nx: number;
  readonly nr: number;
  readonly no: number;
  /**
   * Mass of offset o, rate r, depth i at [(o nr + r) nx + i]. Evidence only multiplies it;
   * `consume` and the filter's end bring it back to a sum of 1.
   */
  p: Float64Array;
  /** Working space: the next `p`, one value a row, three a depth node. */
  spare: Float64Array;
  readonly rowMass: Float64Array;
  readonly nodeA: Float64Array;
  readonly nodeB: Float64Array;
  readonly nodeC: Float64Array;
  depthFrom: number;
  depthStep: number;
  readonly lnRate: Float64Array;
  readonly rate: Float64Array;
  readonly rateStep: number;
  /** Offsets in mV and their spacing. */
  readonly offsetMv: Float64Array;
  readonly offsetStepMv: number;
  /** Prior probability of each offset. */
  readonly offsetPrior: Float64Array;
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
    rowMass: new Float64Array(OFFSET_NODES * RATE_NODES).fill(1),
    nodeA: new Float64Array(DEPTH_NODES),
    nodeB: new Float64Array(DEPTH_NODES),
    nodeC: new Float64Array(DEPTH_NODES),
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
    offsetPrior: OFFSET_PRIOR,
  };
  fillPrior(grid, model);
  return grid;
}

function fillPrior(grid: Grid, model: PackModel): void {
  const { nx, nr, no } = grid;
  const bell = (x: number, mean: number, sd: number): number =>
    Math.exp(-0.5 * ((x - mean) / sd) ** 2);
  for (let o = 0; o < no; o++) {
    const wo = grid.offsetPrior[o]!;
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

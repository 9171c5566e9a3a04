/**
 * What happens by itself as time and charge pass, before either is consumed: the draw's
 * logarithm walks at random, a curve's error changes, and a changed device starts afresh.
 */
import type { Grid } from "./grid";

/** Share of a row that may go to each neighbour in one pass; more would not stay positive. */
const MOST_PART = 0.3;
const SURELY_ANEW = 0.999;

/** Less than this is owed until more has come together: both are small against the prior. */
const WORTH_A_PASS = { part: 0.05, anew: 0.04 };

/**
 * Random walk of ln(rate) by a variance: mass spreads between neighbouring rates, ends
 * reflecting. And a curve errs here in one way and there in another: with chance `anew` the
 * offset is drawn again from its prior, so that readings far apart on the curve never average
 * its error away. Leaves each row's moments in the grid.
 */
export function drift(grid: Grid, variance: number, anew: number): void {
  grid.owedVariance += variance;
  grid.owedRedraw = 1 - (1 - grid.owedRedraw) * (1 - anew);
  const whole = grid.owedVariance / (2 * grid.rateStep * grid.rateStep);
  if (whole >= WORTH_A_PASS.part || grid.owedRedraw >= WORTH_A_PASS.anew) {
    const passes = Math.max(1, Math.ceil(whole / MOST_PART));
    for (let pass = 1; pass < passes; pass++) mix(grid, whole / passes, 0);
    mix(grid, whole / passes, Math.min(grid.owedRedraw, SURELY_ANEW));
    grid.owedVariance = 0;
    grid.owedRedraw = 0;
  } else measureRows(grid);
}

function measureRows(grid: Grid): void {
  for (let row = 0; row < grid.rowMass.length; row++) measureRow(grid, row);
}

/** One pass for all three offsets; leaves each row's moments in the grid. */
function mix(grid: Grid, part: number, anew: number): void {
  const { nr, nx, rowMass, spare } = grid;
  const plane = nr * nx;
  for (let r = 0; r < nr; r++) {
    const below = r > 0 ? r - 1 : 0;
    const above = r < nr - 1 ? r + 1 : r;
    let lives = 0;
    for (let row = 0; row < rowMass.length; row += nr) {
      lives += rowMass[row + below]! + rowMass[row + r]! + rowMass[row + above]!;
    }
    const at = r * nx;
    if (lives > 0) mixRow(grid, at, { below: below * nx - at, above: above * nx - at }, part, anew);
    else for (let base = at; base < spare.length; base += plane) spare.fill(0, base, base + nx);
  }
  grid.spare = grid.p;
  grid.p = spare;
  measureRows(grid);
}

interface Neighbours {
  readonly below: number;
  readonly above: number;
}

function mixRow(grid: Grid, at: number, by: Neighbours, part: number, anew: number): void {
  const { p, spare, nr, nx, offsetPrior } = grid;
  const plane = nr * nx;
  const { below, above } = by;
  const own = (1 - anew) * (1 - 2 * part);
  const next = (1 - anew) * part;
  // the part drawn anew, in terms of what stays
  const back = anew / (1 - anew);
  const [a, b, c] = [back * offsetPrior[0]!, back * offsetPrior[1]!, back * offsetPrior[2]!];
  for (let i = at, end = at + nx; i < end; i++) {
    const j = i + plane;
    const k = j + plane;
    const x = own * p[i]! + next * (p[i + below]! + p[i + above]!);
    const y = own * p[j]! + next * (p[j + below]! + p[j + above]!);
    const z = own * p[k]! + next * (p[k + below]! + p[k + above]!);
    const all = x + y + z;
    spare[i] = x + a * all;
    spare[j] = y + b * all;
    spare[k] = z + c * all;
  }
}

/** Moments of a row. */
function measureRow({ p, nx, rowMass, rowFirst, rowSecond }: Grid, row: number): void {
  let mass = 0;
  let first = 0;
  let second = 0;
  for (let i = 0, k = row * nx; i < nx; i++, k++) {
    const m = p[k]!;
    const moment = m * i;
    mass += m;
    first += moment;
    second += moment * i;
  }
  rowMass[row] = mass;
  rowFirst[row] = first;
  rowSecond[row] = second;
}

/** Forget the rate: at every depth and offset it becomes normal(mean, sd) again. */
export function openRate(grid: Grid, mean: number, sd: number): void {
  const { p, nx, nr, no } = grid;
  const bell = grid.lnRate.map((ln) => Math.exp(-0.5 * ((ln - mean) / sd) ** 2));
  grid.rowMass.fill(1);
  const total = bell.reduce((a, b) => a + b, 0);
  for (let o = 0; o < no; o++) {
    for (let i = 0; i < nx; i++) {
      let mass = 0;
      for (let r = 0; r < nr; r++) mass += p[(o * nr + r) * nx + i]!;
      for (let r = 0; r < nr; r++) p[(o * nr + r) * nx + i] = (mass * bell[r]!) / total;
    }
  }
}

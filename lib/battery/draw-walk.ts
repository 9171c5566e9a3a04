/**
 * What the draw does by itself: a random walk of its logarithm, and a fresh start when the
 * device or its firmware changed.
 */
import type { Grid } from "./grid";

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
  grid.rowMass.fill(1);
  const before = grid.nodeA;
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

/**
 * A curve errs here in one way and there in another: as depth passes, the offset is drawn
 * anew with this chance from its prior. Readings far apart on the curve thus never average
 * its error away.
 */
export function redrawOffset(grid: Grid, chance: number): void {
  const { p, nx, nr, no, offsetPrior } = grid;
  const plane = nr * nx;
  grid.rowMass.fill(1);
  for (let k = 0; k < plane; k++) {
    let mass = 0;
    for (let j = k; j < p.length; j += plane) mass += p[j]!;
    if (mass === 0) continue;
    mass *= chance;
    for (let o = 0, j = k; o < no; o++, j += plane)
      p[j] = (1 - chance) * p[j]! + mass * offsetPrior[o]!;
  }
}

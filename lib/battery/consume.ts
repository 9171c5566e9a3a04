/**
 * Time passes: on the grid's depth axis every rate row moves by its own consumption into a
 * window that follows the mass.
 */
import { type Grid, WINDOW } from "./grid";

const MIN_SPREAD = 0.004;
/** Rows that hold less than this share of the mass are left out. */
const NEGLIGIBLE = 1e-6;
/** A new window this much finer than the old one is filled by reading between the nodes. */
const REFINED = 1.05;

interface Window {
  readonly from: number;
  readonly step: number;
  /** Factor that makes the whole mass 1. */
  readonly scale: number;
}

/**
 * Let a stretch of time consume: `draw` is the share drawn at rate 1, `leak` the exponent of
 * self-discharge, which takes its share of what is left: x -> 1 - (1 - x) e^-leak + draw x
 * rate (1 - e^-leak)/leak. Needs the rows' moments as `drift` leaves them; brings the mass to
 * a sum of 1. Each rate row shifts as one; its mass is split between the two nearest nodes of
 * the new window, which keeps total and mean.
 */
export function consume(grid: Grid, draw: number, leak: number): void {
  const kept = Math.exp(-leak);
  grid.depthFrom = 1 - (1 - grid.depthFrom) * kept;
  grid.depthStep *= kept;
  shiftRows(grid, leak > 1e-9 ? (draw * (1 - kept)) / leak : draw);
}

function shiftRows(grid: Grid, draw: number): void {
  const { nr, nx, rowMass } = grid;
  const window = movedWindow(grid, draw);
  const refine = grid.depthStep / window.step > REFINED;
  const least = NEGLIGIBLE / window.scale;
  grid.spare.fill(0);
  for (let row = 0; row < rowMass.length; row++) {
    if (rowMass[row]! < least) {
      rowMass[row] = 0;
      continue;
    }
    const by = draw * grid.rate[row % nr]!;
    if (!(refine && gatherRow(grid, row, by, window))) scatterRow(grid, row * nx, by, window);
  }
  const old = grid.p;
  grid.p = grid.spare;
  grid.spare = old;
  grid.depthFrom = window.from;
  grid.depthStep = window.step;
}

/** Mean +/- WINDOW spreads of the moved mass. */
function movedWindow(grid: Grid, draw: number): Window {
  const { nx, nr, rowMass, rowFirst, rowSecond, depthStep } = grid;
  let total = 0;
  let first = 0;
  let second = 0;
  for (let row = 0; row < rowMass.length; row++) {
    const mass = rowMass[row]!;
    const from = draw * grid.rate[row % nr]!;
    const moved = rowFirst[row]! * depthStep;
    total += mass;
    first += mass * from + moved;
    second += mass * from * from + 2 * from * moved + rowSecond[row]! * depthStep * depthStep;
  }
  const mean = first / total;
  const sd = Math.max(MIN_SPREAD, Math.sqrt(Math.max(0, second / total - mean * mean)));
  return {
    from: grid.depthFrom + mean - WINDOW * sd,
    step: (2 * WINDOW * sd) / (nx - 1),
    scale: 1 / total,
  };
}

function scatterRow(grid: Grid, base: number, by: number, window: Window): void {
  const { p, spare, nx } = grid;
  const { scale } = window;
  const ratio = grid.depthStep / window.step;
  let place = (grid.depthFrom + by - window.from) / window.step;
  for (let i = 0; i < nx; i++, place += ratio) {
    const m = p[base + i]! * scale;
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
function gatherRow(grid: Grid, row: number, by: number, window: Window): boolean {
  const { p, spare, nx } = grid;
  const base = row * nx;
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
  const mass = grid.rowMass[row]!;
  if (sum * ratio < 0.9 * mass) {
    spare.fill(0, base, base + nx);
    return false;
  }
  const scale = (mass * window.scale) / sum;
  for (let j = 0; j < nx; j++) spare[base + j]! *= scale;
  return true;
}

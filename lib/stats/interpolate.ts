/**
 * Piecewise linear interpolation over an ascending table, clamped to its ends: nothing is
 * ever extrapolated.
 */
export function interpolate(xs: ArrayLike<number>, ys: ArrayLike<number>, x: number): number {
  const last = xs.length - 1;
  if (last < 0) return Number.NaN;
  if (!(x > xs[0]!)) return ys[0]!;
  if (x >= xs[last]!) return ys[last]!;
  let low = 0;
  let high = last;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (xs[middle]! <= x) low = middle;
    else high = middle;
  }
  const part = (x - xs[low]!) / (xs[high]! - xs[low]!);
  return ys[low]! + part * (ys[high]! - ys[low]!);
}

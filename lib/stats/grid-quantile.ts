/**
 * Quantile of a probability mass on even nodes: each node's mass is spread evenly over the
 * cell around it. Returns a value between half a step before the first and after the last
 * node; the mass need not sum to 1. NaN when it is empty.
 */
export function gridQuantile(
  mass: ArrayLike<number>,
  from: number,
  step: number,
  probability: number,
): number {
  let total = 0;
  for (let i = 0; i < mass.length; i++) total += mass[i]!;
  if (!(total > 0)) return Number.NaN;
  const target = probability * total;
  let below = 0;
  for (let i = 0; i < mass.length; i++) {
    const m = mass[i]!;
    if (m > 0 && below + m >= target) return from + (i - 0.5 + (target - below) / m) * step;
    below += m;
  }
  return from + (mass.length - 0.5) * step;
}

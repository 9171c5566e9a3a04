/**
 * Poisson-binomial distribution: how many of several independent events happen, each with
 * its own chance. P_k is built by convolving one Bernoulli law after another (exact, O(n·k)).
 * Source: the definition; the recursion is given by Barlow & Heidtmann, IEEE Trans.
 * Reliability R-33 (1984) 322-323 (from memory).
 */

/**
 * @param chances probability of each event, 0..1
 * @returns P(K = k) for k = 0..n
 * @throws RangeError when a chance lies outside 0..1
 */
export function poissonBinomial(chances: ArrayLike<number>): Float64Array {
  const mass = new Float64Array(chances.length + 1);
  mass[0] = 1;
  for (let i = 0; i < chances.length; i++) {
    const p = chances[i] ?? Number.NaN;
    if (!(p >= 0 && p <= 1)) throw new RangeError(`chance ${i} is ${p}; give 0 to 1`);
    for (let k = i + 1; k > 0; k--) mass[k] = (mass[k] ?? 0) * (1 - p) + (mass[k - 1] ?? 0) * p;
    mass[0] = (mass[0] ?? 0) * (1 - p);
  }
  return mass;
}

/**
 * Smallest k with P(K ≤ k) ≥ level.
 * @param mass probabilities by count, as `poissonBinomial` gives them
 * @param level 0..1
 */
export function countQuantile(mass: ArrayLike<number>, level: number): number {
  let below = 0;
  for (let k = 0; k < mass.length; k++) {
    below += mass[k] ?? 0;
    if (below >= level - 1e-12) return k;
  }
  return mass.length - 1;
}

/** How far an observed share of hits may lie from the stated one by chance. */
import { normalQuantile } from "./normal";

/** Wilson's 95 % interval of k hits in n (E. B. Wilson, JASA 22, 1927). */
export function wilson(k: number, n: number, confidence = 0.95): [number, number] {
  const z = normalQuantile(0.5 + confidence / 2);
  const share = k / n;
  const scale = 1 + (z * z) / n;
  const centre = (share + (z * z) / (2 * n)) / scale;
  const half = (z / scale) * Math.sqrt((share * (1 - share)) / n + (z * z) / (4 * n * n));
  return [centre - half, centre + half];
}

/** Smallest k with P(hits <= k) >= p for n trials of chance `share`. */
export function binomialQuantile(n: number, share: number, p: number): number {
  if (share <= 0) return 0;
  if (share >= 1) return n;
  let ln = n * Math.log1p(-share);
  let below = 0;
  for (let k = 0; k < n; k++) {
    below += Math.exp(ln);
    if (below >= p) return k;
    ln += Math.log((n - k) / (k + 1)) + Math.log(share / (1 - share));
  }
  return n;
}

/** Central 95 % band of hits in n when the stated share is right. */
export function coverageBand(n: number, share: number): [number, number] {
  return [binomialQuantile(n, share, 0.025), binomialQuantile(n, share, 0.975)];
}

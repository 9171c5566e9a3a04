/**
 * The diffusion model (Rakhmatov, Vrudhula & Wallach, ISLPED 2002): the cell is empty when
 * the apparent charge
 *   sigma(t) = sum_k I_k [D_k + 2 sum_{m=1..N} (e^{-b²m²(t-t_{k+1})} - e^{-b²m²(t-t_k)})/(b²m²)]
 * reaches alpha. Currents in mA, times in minutes, alpha in mA min. The published alpha and
 * beta were fitted with N = 10 terms and hold only with that N.
 */
export interface Diffusion {
  readonly alphaMaMin: number;
  readonly beta: number;
  readonly terms: number;
}

/** A load profile: current from each start until the next; the last one stays. */
export interface LoadProfile {
  readonly loadsMa: readonly number[];
  readonly startsMin: readonly number[];
}

/** Apparent charge lost by `t` minutes, mA min. */
export function apparentCharge(model: Diffusion, profile: LoadProfile, t: number): number {
  let sigma = 0;
  profile.loadsMa.forEach((current, k) => {
    const start = profile.startsMin[k] ?? 0;
    if (start >= t) return;
    const end = Math.min(t, profile.startsMin[k + 1] ?? t);
    let sum = end - start;
    for (let m = 1; m <= model.terms; m++) {
      const rate = model.beta * model.beta * m * m;
      sum += (2 * (Math.exp(-rate * (t - end)) - Math.exp(-rate * (t - start)))) / rate;
    }
    sigma += current * sum;
  });
  return sigma;
}

/** First minute at which the apparent charge reaches alpha; Infinity past `limitMin`. */
export function diffusionLifetime(model: Diffusion, profile: LoadProfile, limitMin = 1e6): number {
  const edges = [...profile.startsMin.slice(1), limitMin];
  let low = 0;
  for (const edge of edges) {
    const crossing = crossingBetween(model, profile, low, edge);
    if (crossing !== null) return crossing;
    low = edge;
  }
  return Infinity;
}

/** Under constant current sigma rises, so within one piece its crossing is bracketed. */
function crossingBetween(
  model: Diffusion,
  profile: LoadProfile,
  from: number,
  to: number,
): number | null {
  if (apparentCharge(model, profile, to) < model.alphaMaMin) return null;
  let low = from;
  let high = to;
  for (let i = 0; i < 80; i++) {
    const middle = (low + high) / 2;
    if (apparentCharge(model, profile, middle) < model.alphaMaMin) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

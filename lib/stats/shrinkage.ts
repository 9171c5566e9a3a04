/**
 * Empirical Bayes for a set of group means with known errors: the spread between groups by
 * DerSimonian & Laird (Controlled Clinical Trials 7, 1986), each mean drawn towards the whole
 * by B = se²/(se² + tau²).
 */
export interface GroupMean {
  readonly mean: number;
  readonly se: number;
}

export interface Pooled {
  /** Precision-weighted mean of the groups and its error. */
  readonly mean: number;
  readonly se: number;
  /** Variance between groups; 0 when the scatter is no more than the errors explain. */
  readonly tau2: number;
  /** Cochran's Q. */
  readonly q: number;
}

/** Pool groups; null when there is none. Errors must be above 0. */
export function poolGroups(groups: readonly GroupMean[]): Pooled | null {
  if (groups.length === 0) return null;
  const fixed = weighted(groups, 0);
  const weights = groups.map((g) => 1 / g.se ** 2);
  const sum = weights.reduce((a, b) => a + b, 0);
  const squares = weights.reduce((a, b) => a + b * b, 0);
  const q = groups.reduce((s, g, i) => s + weights[i]! * (g.mean - fixed.mean) ** 2, 0);
  const scale = sum - squares / sum;
  const tau2 = scale > 0 ? Math.max(0, (q - (groups.length - 1)) / scale) : 0;
  return { ...weighted(groups, tau2), tau2, q };
}

function weighted(groups: readonly GroupMean[], tau2: number): { mean: number; se: number } {
  let sum = 0;
  let total = 0;
  for (const { mean, se } of groups) {
    const weight = 1 / (se * se + tau2);
    sum += weight;
    total += weight * mean;
  }
  return { mean: total / sum, se: 1 / Math.sqrt(sum) };
}

/** A group's mean drawn towards the pool, with the error of what results. */
export function shrink(group: GroupMean, pool: Pooled): GroupMean {
  const own = group.se * group.se;
  const towards = own / (own + pool.tau2);
  const mean = towards * pool.mean + (1 - towards) * group.mean;
  const se = Math.sqrt((1 - towards) * own + (towards * pool.se) ** 2);
  return { mean, se };
}

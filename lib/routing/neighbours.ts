/** Nearest sites of each site: what ruin walks and what local search looks at. */
export interface Neighbours {
  readonly near: number;
  /** Row s holds the `near` sites nearest to s, itself first. */
  readonly neighbours: Int32Array;
}

/** Lists by leg price, both ways added; ties by index, so that lists repeat. */
export function neighbourLists(
  sites: number,
  nodes: number,
  priceOut: Int32Array,
  most: number,
): Neighbours {
  const near = Math.min(sites, most);
  const neighbours = new Int32Array(sites * near);
  const distance = new Float64Array(sites);
  const order = Array.from({ length: sites }, (_, s) => s);
  for (let s = 0; s < sites; s++) {
    for (let t = 0; t < sites; t++) {
      distance[t] = priceOut[s * nodes + t]! + priceOut[t * nodes + s]!;
    }
    distance[s] = -1;
    const sorted = order.slice().sort((a, b) => distance[a]! - distance[b]! || a - b);
    for (let i = 0; i < near; i++) neighbours[s * near + i] = sorted[i]!;
  }
  return { near, neighbours };
}

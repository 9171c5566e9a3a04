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
  // Price and index in one exact number: a plain numeric sort is several times quicker.
  const keys = new Float64Array(sites);
  for (let s = 0; s < sites; s++) {
    for (let t = 0; t < sites; t++) {
      const price = priceOut[s * nodes + t]! + priceOut[t * nodes + s]!;
      keys[t] = (t === s ? -1 : price) * sites + t;
    }
    keys.sort();
    for (let i = 0; i < near; i++) neighbours[s * near + i] = (keys[i]! + sites) % sites;
  }
  return { near, neighbours };
}

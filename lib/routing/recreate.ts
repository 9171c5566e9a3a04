/**
 * Recreate: puts sites back one by one, each at its cheapest place, in one of several orders
 * drawn by lot; a site whose cheapest place costs more than its absence stays out.
 */
import { FORBIDDEN, type Model } from "./model";
import type { Inserter } from "./insertion";
import type { Rng } from "./rng";
import type { RouteState } from "./state";

/** Chances of the orders, in hundredths. */
const ORDERS = ["random", "demand", "far", "near", "narrow", "opens", "closes", "worth"] as const;
const WEIGHTS = [4, 4, 2, 1, 2, 2, 2, 2];
const WEIGHT_SUM = WEIGHTS.reduce((sum, weight) => sum + weight, 0);

export class Recreate {
  readonly sites: Int32Array;
  count = 0;
  private readonly keys: Float64Array;
  private readonly listed: Int32Array;
  private turn = 0;
  private readonly fixedKeys: readonly Float64Array[];

  constructor(
    private readonly model: Model,
    private readonly state: RouteState,
    private readonly inserter: Inserter,
    private readonly rng: Rng,
  ) {
    this.sites = new Int32Array(model.sites);
    this.keys = new Float64Array(model.sites);
    this.listed = new Int32Array(model.sites);
    this.fixedKeys = ORDERS.map((order) => orderKeys(model, order));
  }

  /** Empties the list of sites to put back. */
  clear(): void {
    this.count = 0;
    this.turn += 1;
  }

  /** Lists a site, once. */
  list(site: number): void {
    if (this.listed[site] === this.turn) return;
    this.listed[site] = this.turn;
    this.sites[this.count++] = site;
  }

  /** Lists some of the sites left out: half the nearest to the seed, half at random. */
  listAbsent(seed: number, most: number): void {
    const { model, state, rng } = this;
    if (state.absentCount <= most) {
      for (let i = 0; i < state.absentCount; i++) this.list(state.absent[i]!);
      return;
    }
    let left = most >> 1;
    const row = seed * model.near;
    for (let i = 0; i < model.near && left > 0; i++) {
      const site = model.neighbours[row + i]!;
      if (state.routeOf[site]! >= 0) continue;
      this.list(site);
      left -= 1;
    }
    for (let i = most >> 1; i < most; i++) this.list(state.absent[rng.below(state.absentCount)]!);
  }

  /** Orders the list and inserts what pays if absence counts `worth` times its price. */
  run(worth = 1): void {
    this.sort();
    for (let i = 0; i < this.count; i++) {
      const site = this.sites[i]!;
      if (this.state.routeOf[site]! < 0 && this.inserter.search(site, worth)) {
        this.state.insert(site, this.inserter.route, this.inserter.position);
      }
    }
  }

  private drawOrder(): number {
    let left = this.rng.below(WEIGHT_SUM);
    let order = 0;
    while (left >= WEIGHTS[order]!) left -= WEIGHTS[order++]!;
    return order;
  }

  private sort(): void {
    const { sites, keys, rng } = this;
    const order = this.drawOrder();
    const fixed = this.fixedKeys[order]!;
    for (let i = 0; i < this.count; i++) {
      const site = sites[i]!;
      const noise = order === 0 ? rng.unit() : order === 7 ? 0.5 + rng.unit() : 1;
      const key = fixed[site]! * noise;
      let k = i;
      for (; k > 0 && keys[k - 1]! > key; k--) {
        keys[k] = keys[k - 1]!;
        sites[k] = sites[k - 1]!;
      }
      keys[k] = key;
      sites[k] = site;
    }
  }
}

/** Ascending sort keys of one order, by site. */
function orderKeys(model: Model, order: (typeof ORDERS)[number]): Float64Array {
  return Float64Array.from({ length: model.sites }, (_, site) => {
    switch (order) {
      case "random":
        return 1;
      case "demand":
        return -model.problem.sites[site]!.demand.reduce((sum, cells) => sum + cells, 0);
      case "far":
        return -depotPrice(model, site);
      case "near":
        return depotPrice(model, site);
      case "narrow":
        return bestWindow(model, site, (openS, closeS) => closeS - openS);
      case "opens":
        return -bestWindow(model, site, (openS) => openS);
      case "closes":
        return bestWindow(model, site, (_openS, closeS) => closeS);
      case "worth":
        return -model.skip[site]!;
    }
  });
}

function depotPrice(model: Model, site: number): number {
  let nearest = FORBIDDEN;
  for (let r = 0; r < model.slots; r++) {
    nearest = Math.min(nearest, model.priceOut[model.startNode[r]! * model.nodes + site]!);
  }
  return nearest;
}

/** Mean over the days on which the site is open. */
function bestWindow(model: Model, site: number, of: (openS: number, closeS: number) => number) {
  let sum = 0;
  let count = 0;
  for (let at = site; at < model.open.length; at += model.sites) {
    if (model.close[at]! < 0) continue;
    sum += of(model.open[at]!, model.close[at]!);
    count += 1;
  }
  return count > 0 ? sum / count : 0;
}

/** One annealing search: ruin, recreate, accept or take back. */
import { exportRoutes, fits, importRoutes } from "./elite";
import { Inserter } from "./insertion";
import { FORBIDDEN, type Model } from "./model";
import type { Params } from "./params";
import type { Routes } from "./problem";
import { Recreate } from "./recreate";
import type { Rng } from "./rng";
import { Ruin } from "./ruin";
import { RouteState } from "./state";

/** Neighbours that a newly opened slot is offered. */
const OPEN_OFFER = 40;

export class Search {
  private readonly state: RouteState;
  private readonly inserter: Inserter;
  private readonly ruin: Ruin;
  private readonly recreate: Recreate;
  private readonly typicalLeg: number;
  private bestRoutes: Routes;
  bestTotal: number;

  constructor(
    private readonly model: Model,
    private readonly rng: Rng,
    private readonly params: Params,
    start?: Routes,
  ) {
    this.state = new RouteState(model);
    this.inserter = new Inserter(model, this.state, rng, params.blinkShare);
    this.ruin = new Ruin(model, this.state, rng, params);
    this.recreate = new Recreate(model, this.state, this.inserter, rng);
    if (start) importRoutes(this.state, start);
    this.construct();
    this.bestRoutes = exportRoutes(this.state);
    this.bestTotal = this.state.total;
    this.typicalLeg = this.meanLeg();
  }

  /** Cheapest insertion of everything that is out. */
  private construct(): void {
    this.state.mark();
    this.recreate.clear();
    for (let i = this.state.absentCount - 1; i >= 0; i--) this.recreate.list(this.state.absent[i]!);
    this.recreate.run();
    this.state.mark();
  }

  private meanLeg(): number {
    let price = 0;
    let legs = 0;
    for (let r = 0; r < this.model.slots; r++) {
      const length = this.state.length[r]!;
      if (length === 0) continue;
      price += this.state.price[r]!;
      legs += length + 1;
    }
    return legs > 0 ? Math.max(1, price / legs) : 1;
  }

  total(): number {
    return this.state.total;
  }

  canImprove(): boolean {
    return this.model.sites > 0 && this.model.slots > 0;
  }

  best(): Routes {
    return this.bestRoutes;
  }

  /** Runs some iterations at the temperature of this share of the run. */
  run(iterations: number, share: number): void {
    const { startHeat, endHeat } = this.params;
    const heat = this.typicalLeg * startHeat * Math.pow(endHeat / startHeat, share);
    for (let i = 0; i < iterations; i++) this.step(heat);
  }

  private step(heat: number): void {
    const { state, rng } = this;
    const before = state.total;
    state.mark();
    this.change();
    if (state.total > before - heat * Math.log(rng.unit())) {
      state.rollBack();
      return;
    }
    if (state.total < this.bestTotal) {
      this.bestTotal = state.total;
      this.bestRoutes = exportRoutes(state);
    }
  }

  /** One ruin and recreate of the state. */
  private change(): void {
    const { state, rng, params, ruin, recreate } = this;
    const seed = rng.below(this.model.sites);
    recreate.clear();
    const draw = rng.unit();
    if (draw < params.closeShare && state.routeOf[seed]! >= 0) ruin.close(state.routeOf[seed]!);
    else ruin.strings(seed);
    if (draw > 1 - params.openShare) this.openSlot();
    for (let i = 0; i < ruin.removedCount; i++) recreate.list(ruin.removed[i]!);
    if (state.absentCount > ruin.removedCount) recreate.listAbsent(seed, params.absentTried);
    recreate.run();
  }

  /** Forces a site that is out into an empty slot and offers that slot its neighbours. */
  private openSlot(): void {
    const { model, state, rng, recreate } = this;
    if (state.absentCount === 0) return;
    const site = state.absent[rng.below(state.absentCount)]!;
    const r = this.drawEmptySlot(site);
    if (r < 0 || !fits(state, site, r, 0)) return;
    state.insert(site, r, 0);
    const row = site * model.near;
    let offered = 0;
    for (let i = 1; i < model.near && offered < OPEN_OFFER; i++) {
      const other = model.neighbours[row + i]!;
      if (state.routeOf[other]! >= 0) continue;
      recreate.list(other);
      offered += 1;
    }
  }

  /** An empty slot that may hold the site, each with the same chance; -1: there is none. */
  private drawEmptySlot(site: number): number {
    const { model, state, rng } = this;
    let found = -1;
    let count = 0;
    for (let r = 0; r < model.slots; r++) {
      if (state.length[r] !== 0 || model.visit[site * model.slots + r] === FORBIDDEN) continue;
      count += 1;
      if (rng.below(count) === 0) found = r;
    }
    return found;
  }

  /** Takes a better plan over as the current and best one. */
  take(routes: Routes): void {
    importRoutes(this.state, routes);
    this.construct();
    if (this.state.total < this.bestTotal) {
      this.bestTotal = this.state.total;
      this.bestRoutes = exportRoutes(this.state);
    } else {
      importRoutes(this.state, this.bestRoutes);
    }
  }
}

/** One annealing search: ruin, recreate, accept or take back. */
import { exportRoutes, importRoutes } from "./elite";
import { fits } from "./fit";
import { Inserter } from "./insertion";
import { LastTouch } from "./last-touch";
import { FORBIDDEN, type Model } from "./model";
import type { Params } from "./params";
import type { Routes } from "./problem";
import { Recreate } from "./recreate";
import type { Rng } from "./rng";
import { Ruin } from "./ruin";
import { RouteState } from "./state";

/** Long routes need more heat to be reshaped: so far the start temperature grows with length. */
const LEAST_TENS = 0.7;
const MOST_TENS = 4;

export class Search {
  private readonly state: RouteState;
  private readonly inserter: Inserter;
  private readonly ruin: Ruin;
  private readonly recreate: Recreate;
  private readonly lastTouch: LastTouch;
  private typicalLeg = 1;
  private startHeat = 1;
  private absentTried = 0;
  private openOffer = 0;
  private bestRoutes: Routes;
  bestTotal: number;

  constructor(
    private readonly model: Model,
    private readonly rng: Rng,
    private readonly params: Params,
    start?: Routes,
  ) {
    this.state = new RouteState(model);
    this.inserter = new Inserter(model, this.state, rng, params.blinkShare, params.nearby);
    this.ruin = new Ruin(model, this.state, rng, params);
    this.recreate = new Recreate(model, this.state, this.inserter, rng);
    this.lastTouch = new LastTouch(model, this.state, this.inserter, this.recreate);
    if (start) importRoutes(this.state, start);
    this.lastTouch.fill(params.startWorth);
    this.bestRoutes = exportRoutes(this.state);
    this.bestTotal = this.state.total;
    this.setScale();
  }

  /** Leaves no stop in, out or elsewhere that would pay to change alone. */
  finish(): void {
    importRoutes(this.state, this.bestRoutes);
    this.inserter.blinks = false;
    this.lastTouch.run();
    this.inserter.blinks = true;
    this.keepIfBest();
  }

  private keepIfBest(): void {
    if (this.state.total >= this.bestTotal) return;
    this.bestTotal = this.state.total;
    this.bestRoutes = exportRoutes(this.state);
  }

  /** Sets temperature and reach by the start plan: mean price of a leg, mean length of a route. */
  private setScale(): void {
    let price = 0;
    let stops = 0;
    let open = 0;
    for (let r = 0; r < this.model.slots; r++) {
      if (this.state.length[r] === 0) continue;
      price += this.state.price[r]!;
      stops += this.state.length[r]!;
      open += 1;
    }
    this.typicalLeg = Math.max(1, price / Math.max(1, stops + open));
    const length = stops / Math.max(1, open);
    this.absentTried = Math.max(this.params.absentTried, Math.round(length));
    this.openOffer = Math.max(this.params.openOffer, Math.round(4 * length));
    const tens = Math.min(MOST_TENS, Math.max(LEAST_TENS, length / 10));
    this.startHeat = Math.max(this.params.endHeat, this.params.startHeat * tens);
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
    const { endHeat } = this.params;
    const heat = this.typicalLeg * this.startHeat * Math.pow(endHeat / this.startHeat, share);
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
    this.keepIfBest();
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
    if (state.absentCount > ruin.removedCount) recreate.listAbsent(seed, this.absentTried);
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
    for (let i = 1; i < model.near && offered < this.openOffer; i++) {
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
    this.lastTouch.fill(this.params.startWorth);
    this.keepIfBest();
    if (this.state.total > this.bestTotal) importRoutes(this.state, this.bestRoutes);
  }
}

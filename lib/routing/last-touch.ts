/**
 * Single changes that pay, until none is left: what annealing leaves undone at its end. A stop
 * that left its place in the plan people know goes back where that costs no more.
 */
import type { Inserter } from "./insertion";
import type { Model } from "./model";
import type { Recreate } from "./recreate";
import type { RouteState } from "./state";

export class LastTouch {
  constructor(
    private readonly model: Model,
    private readonly state: RouteState,
    private readonly inserter: Inserter,
    private readonly recreate: Recreate,
  ) {}

  /** Cheapest insertion of everything that is out and would pay if absence cost `worth` times. */
  fill(worth: number): void {
    const { state, recreate } = this;
    state.mark();
    recreate.clear();
    for (let i = state.absentCount - 1; i >= 0; i--) recreate.list(state.absent[i]!);
    recreate.run(worth);
    state.mark();
    this.trim();
  }

  /** Takes out every stop that costs more than its absence. */
  private trim(): void {
    const { state, model } = this;
    for (let r = 0; r < model.slots; r++) {
      for (let k = state.length[r]!; k > model.frozen[r]!; k--) {
        const before = state.total;
        state.mark();
        state.remove(r, k, 1);
        if (state.total >= before) state.rollBack();
      }
    }
    state.mark();
  }

  /** Repeats all of it until nothing is gained. The inserter must not blink meanwhile. */
  run(): void {
    let before = Infinity;
    while (this.state.total < before) {
      before = this.state.total;
      this.fill(1);
      for (let site = 0; site < this.model.sites; site++) this.settle(site);
    }
  }

  /** Moves one stop back to where people know it if that costs no more, else where it costs less. */
  private settle(site: number): void {
    const { state, model, inserter } = this;
    const r = state.routeOf[site]!;
    if (r < 0 || state.positionOf[site]! <= model.frozen[r]!) return;
    const known = model.problem.sites[site]!.previous?.slot ?? r;
    const back = known !== r && this.tryPlace(site, () => inserter.searchIn(site, known), 0);
    if (!back) this.tryPlace(site, () => inserter.search(site), 1);
  }

  /** Takes a stop out and puts it where `find` says; takes that back where it gains too little. */
  private tryPlace(site: number, find: () => boolean, leastGain: number): boolean {
    const { state, inserter } = this;
    const before = state.total;
    state.mark();
    state.remove(state.routeOf[site]!, state.positionOf[site]!, 1);
    if (find()) state.insert(site, inserter.route, inserter.position);
    if (state.routeOf[site]! >= 0 && state.total <= before - leastGain) {
      state.mark();
      return true;
    }
    state.rollBack();
    return false;
  }
}

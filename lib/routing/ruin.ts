/**
 * Ruin: takes strings of neighbouring stops out of neighbouring routes (slack induction by string
 * removals, Christiaens & Vanden Berghe 2020, doi 10.1287/trsc.2019.0914), or a whole route.
 */
import type { Model } from "./model";
import type { Params } from "./params";
import type { Rng } from "./rng";
import type { RouteState } from "./state";

export class Ruin {
  /** The sites taken out by the last ruin. */
  readonly removed: Int32Array;
  removedCount = 0;
  private readonly ruined: Int32Array;
  private turn = 0;

  constructor(
    private readonly model: Model,
    private readonly state: RouteState,
    private readonly rng: Rng,
    private readonly params: Params,
  ) {
    this.removed = new Int32Array(model.sites);
    this.ruined = new Int32Array(model.slots);
  }

  /** Strings around a seed site. */
  strings(seed: number): void {
    const { model, state, rng, params } = this;
    this.removedCount = 0;
    this.turn += 1;
    const longest = Math.max(1, Math.min(params.longestString, this.meanLength()));
    const mostStrings = (4 * params.meanRemoved) / (1 + longest) - 1;
    let strings = Math.floor(1 + rng.unit() * mostStrings);
    const row = seed * model.near;
    for (let i = 0; i < model.near && strings > 0; i++) {
      const site = model.neighbours[row + i]!;
      const r = state.routeOf[site]!;
      if (r < 0 || this.ruined[r] === this.turn) continue;
      const free = state.length[r]! - model.frozen[r]!;
      if (state.positionOf[site]! <= model.frozen[r]!) continue;
      this.ruined[r] = this.turn;
      strings -= 1;
      this.string(r, site, Math.floor(1 + rng.unit() * Math.min(free, longest)), free);
    }
  }

  private meanLength(): number {
    const { state, model } = this;
    let open = 0;
    for (let r = 0; r < model.slots; r++) if (state.length[r]! > 0) open += 1;
    return (model.sites - state.absentCount) / Math.max(1, open);
  }

  /** One string of `count` stops around a site; half of them keep a part in the middle. */
  private string(r: number, site: number, count: number, free: number): void {
    const { rng, params } = this;
    if (count < 2 || count >= free || rng.unit() >= params.splitShare) {
      this.take(r, this.stringStart(r, site, count), count);
      return;
    }
    let kept = 1;
    while (count + kept < free && rng.unit() < params.splitGrowth) kept += 1;
    const start = this.stringStart(r, site, count + kept);
    const ahead = 1 + rng.below(count - 1);
    this.take(r, start + ahead + kept, count - ahead);
    this.take(r, start, ahead);
  }

  /** A random start of a string of `count` stops that holds the site and no frozen stop. */
  private stringStart(r: number, site: number, count: number): number {
    const at = this.state.positionOf[site]!;
    const low = Math.max(this.model.frozen[r]! + 1, at - count + 1);
    const high = Math.min(at, this.state.length[r]! - count + 1);
    return low + this.rng.below(high - low + 1);
  }

  private take(r: number, k: number, count: number): void {
    for (let i = 0; i < count; i++) this.removed[this.removedCount++] = this.state.siteAt(r, k + i);
    this.state.remove(r, k, count);
  }

  /** Closes a route: every stop of it but the frozen ones. */
  close(r: number): void {
    this.removedCount = 0;
    const free = this.state.length[r]! - this.model.frozen[r]!;
    if (free > 0) this.take(r, this.model.frozen[r]! + 1, free);
  }
}

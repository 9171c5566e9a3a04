/**
 * Cheapest feasible insertion of a site, over all routes, with blinks: a small share of the
 * positions is passed over at random (Christiaens & Vanden Berghe 2020, doi 10.1287/trsc.2019.0914).
 */
import { FORBIDDEN, type Model } from "./model";
import type { Rng } from "./rng";
import { FIELDS, LATEST, LEAVE, NODE, PRICE, TAIL, type RouteState } from "./state";

export class Inserter {
  /** The best place found by the last search. */
  route = -1;
  position = 0;
  price = 0;
  private toBlink = 0;
  private readonly logStay: number;
  private readonly kindSeen: Int32Array;
  private turn = 0;

  constructor(
    private readonly model: Model,
    private readonly state: RouteState,
    private readonly rng: Rng,
    blinkShare: number,
  ) {
    this.logStay = Math.log1p(-blinkShare);
    this.kindSeen = new Int32Array(model.kinds);
    this.rearm();
  }

  /** Positions to go until the next blink: geometric, so that each blinks independently. */
  private rearm(): void {
    const gap = Math.log(this.rng.unit()) / this.logStay;
    this.toBlink = gap < 1e9 ? Math.floor(gap) : 1e9;
  }

  /** Finds the cheapest place that costs less than leaving the site out. */
  search(site: number): boolean {
    const { model, state } = this;
    const { length } = state;
    this.route = -1;
    this.price = model.skip[site]!;
    this.turn += 1;
    const visitRow = site * model.slots;
    for (let r = 0; r < model.slots; r++) {
      if (model.visit[visitRow + r]! >= this.price || model.visit[visitRow + r] === FORBIDDEN)
        continue;
      if (length[r] === 0) {
        // Empty slots of one kind are the same: try the first.
        const kind = model.kind[r]!;
        if (this.kindSeen[kind] === this.turn) continue;
        this.kindSeen[kind] = this.turn;
      }
      if (state.fitsVan(site, r)) this.scan(site, r);
    }
    return this.route >= 0;
  }

  /** Tries every position of one route; keeps the best in `route`, `position`, `price`. */
  scan(site: number, r: number): void {
    const { model } = this;
    const { data } = this.state;
    const { timeInto, timeOut, priceInto, priceOut, endPriced } = model;
    const matrixRow = site * model.nodes;
    const open = model.open[model.windowRow[r]! + site]!;
    const close = model.close[model.windowRow[r]! + site]!;
    const service = model.service[site]!;
    const length = this.state.length[r]!;
    const base = this.basePrice(site, r);
    let at = r * this.state.row + model.frozen[r]! * FIELDS;
    let from = data[at + NODE]!;
    for (let k = model.frozen[r]!; k <= length; k++, at += FIELDS) {
      const arrive = data[at + LEAVE]! + timeInto[matrixRow + from]!;
      if (arrive > close) return;
      const to = data[at + FIELDS + NODE]!;
      const leave = (arrive > open ? arrive : open) + service;
      const next = leave + timeOut[matrixRow + to]!;
      const legs = priceInto[matrixRow + from]! + priceOut[matrixRow + to]!;
      from = to;
      if (next > data[at + FIELDS + LATEST]!) continue;
      let price = base + legs - data[at + PRICE]!;
      if (price >= this.price) continue;
      if (endPriced) price += this.endChange(r, next + data[at + FIELDS + TAIL]!);
      if (price >= this.price) continue;
      if (this.toBlink-- === 0) {
        this.rearm();
        continue;
      }
      this.price = price;
      this.route = r;
      this.position = k;
    }
  }

  /** What the visit costs before its legs; for an empty slot also the opening and its own leg. */
  private basePrice(site: number, r: number): number {
    const { model, state } = this;
    const visit = model.visit[site * model.slots + r]!;
    if (state.length[r]! > 0) return visit;
    return visit + model.opening[r]! + state.price[r]!;
  }

  /** Change of the end's price when a start pushed back would end at `end` without waiting. */
  private endChange(r: number, end: number): number {
    const { state } = this;
    const old = state.end[r]!;
    if (state.length[r] === 0) return state.endPrice(r, end > old ? end : old);
    return end > old ? state.endPrice(r, end) - state.endPrice(r, old) : 0;
  }
}

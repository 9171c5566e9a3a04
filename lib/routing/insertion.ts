/**
 * Cheapest feasible insertion of a site, over all routes, with blinks: now and then the best place
 * is passed over at random (Christiaens & Vanden Berghe 2020, doi 10.1287/trsc.2019.0914; there by
 * position, here by route, so that results can be kept).
 *
 * The best place of a site in a route stays true until the route changes. It is kept with the
 * route's version; a rejected change brings the old version back, and with it all that is kept.
 */
import { FORBIDDEN, type Model } from "./model";
import type { Rng } from "./rng";
import { FIELDS, LATEST, LEAVE, NODE, PRICE, TAIL, type RouteState } from "./state";

/** Routes longer than this are searched for the first position in time by halving. */
const LONG_ROUTE = 12;

export class Inserter {
  /** The best place found by the last search. */
  route = -1;
  position = 0;
  price = 0;
  private toBlink = 0;
  private readonly logStay: number;
  private readonly kindSeen: Int32Array;
  private turn = 0;
  /** Kept results by [site * slots + slot]; price Infinity: no place. */
  private readonly keptVersion: Int32Array;
  private readonly keptPrice: Float64Array;
  private readonly keptPosition: Int32Array;

  constructor(
    private readonly model: Model,
    private readonly state: RouteState,
    private readonly rng: Rng,
    blinkShare: number,
  ) {
    this.logStay = Math.log1p(-blinkShare);
    this.kindSeen = new Int32Array(model.kinds);
    this.keptVersion = new Int32Array(model.sites * model.slots).fill(-1);
    this.keptPrice = new Float64Array(model.sites * model.slots);
    this.keptPosition = new Int32Array(model.sites * model.slots);
    this.rearm();
  }

  /** Places to go until the next blink: geometric, so that each blinks independently. */
  private rearm(): void {
    const gap = Math.log(this.rng.unit()) / this.logStay;
    this.toBlink = gap < 1e9 ? Math.floor(gap) : 1e9;
  }

  /** Finds the cheapest place that costs less than leaving the site out. */
  search(site: number): boolean {
    const { model, keptPrice } = this;
    const { length, version } = this.state;
    const row = site * model.slots;
    let best = model.skip[site]!;
    let route = -1;
    this.turn += 1;
    for (let r = 0; r < model.slots; r++) {
      if (length[r] === 0 && !this.isFirstOfKind(r)) continue;
      if (this.keptVersion[row + r] !== version[r]) this.keep(site, r);
      if (keptPrice[row + r]! >= best) continue;
      if (this.toBlink-- === 0) {
        this.rearm();
        continue;
      }
      best = keptPrice[row + r]!;
      route = r;
    }
    this.price = best;
    this.route = route;
    if (route >= 0) this.position = this.keptPosition[row + route]!;
    return route >= 0;
  }

  /** Empty slots of one kind are the same: only the first is tried. */
  private isFirstOfKind(r: number): boolean {
    const kind = this.model.kind[r]!;
    if (this.kindSeen[kind] === this.turn) return false;
    this.kindSeen[kind] = this.turn;
    return true;
  }

  /** Finds and keeps the site's best place in one route. */
  private keep(site: number, r: number): void {
    const at = site * this.model.slots + r;
    this.keptVersion[at] = this.state.version[r]!;
    this.keptPrice[at] = Infinity;
    if (this.model.visit[at] === FORBIDDEN || !this.state.fitsVan(site, r)) return;
    this.price = Infinity;
    this.scan(site, r, this.firstInTime(site, r));
    this.keptPrice[at] = this.price;
    this.keptPosition[at] = this.position;
  }

  /** First position of a long route whose next stop is not over before the site opens. */
  private firstInTime(site: number, r: number): number {
    const { model, state } = this;
    let low = model.frozen[r]!;
    let high = state.length[r]!;
    if (high - low < LONG_ROUTE) return low;
    const done = model.open[model.windowRow[r]! + site]! + model.service[site]!;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (state.data[r * state.row + (middle + 1) * FIELDS + LATEST]! < done) low = middle + 1;
      else high = middle;
    }
    return low;
  }

  /** Tries the positions of one route from `first` on; the best goes to `position` and `price`. */
  private scan(site: number, r: number, first: number): void {
    const { model } = this;
    const { data } = this.state;
    const { timeInto, timeOut, priceInto, priceOut, endPriced } = model;
    const matrixRow = site * model.nodes;
    const open = model.open[model.windowRow[r]! + site]!;
    const close = model.close[model.windowRow[r]! + site]!;
    const service = model.service[site]!;
    const length = this.state.length[r]!;
    const base = this.basePrice(site, r);
    let at = r * this.state.row + first * FIELDS;
    let from = data[at + NODE]!;
    for (let k = first; k <= length; k++, at += FIELDS) {
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
      this.price = price;
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

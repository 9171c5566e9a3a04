/**
 * Cheapest feasible insertion of a site, over all routes, with blinks: now and then the best place
 * is passed over at random (Christiaens & Vanden Berghe 2020, doi 10.1287/trsc.2019.0914; there by
 * position, here by route, so that results can be kept).
 *
 * The best place of a site in a route stays true until the route changes. It is kept with the
 * route's version; a rejected change brings the old version back, and with it all that is kept.
 */
import { fitsStock, fitsVan } from "./fit";
import { FORBIDDEN, MUST_PENALTY, type Model } from "./model";
import type { Rng } from "./rng";
import { FIELDS, LATEST, LEAVE, NODE, PRICE, TAIL, type RouteState } from "./state";

/** Routes longer than this are searched for the first position in time by halving. */
const LONG_ROUTE = 12;
/** In large plans an insertion looks at the routes of so many nearest sites. */
const NEARBY_SITES = 40;

export class Inserter {
  /** The best place found by the last search. */
  route = -1;
  position = 0;
  private best = 0;
  /** Off: every place is looked at. */
  blinks = true;
  private toBlink = 0;
  private readonly logStay: number;
  private readonly kindSeen: Int32Array;
  private readonly routeSeen: Int32Array;
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
    /** Stops in the plan above which an insertion looks nearby alone. */
    private readonly nearby: number,
  ) {
    this.logStay = Math.log1p(-blinkShare);
    this.kindSeen = new Int32Array(model.kinds);
    this.routeSeen = new Int32Array(model.slots);
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

  /** Finds the cheapest place that costs less than `worth` times leaving the site out. */
  search(site: number, worth = 1): boolean {
    const { model, state } = this;
    this.best = model.skip[site]! * worth;
    this.route = -1;
    this.turn += 1;
    const present = model.sites - state.absentCount;
    if (present > this.nearby) this.searchNearby(site);
    // The long look: where it is cheap, and for a must site that found no place nearby.
    if (present <= this.nearby || (this.route < 0 && this.best >= MUST_PENALTY)) {
      for (let r = 0; r < model.slots; r++) {
        if (state.length[r]! > 0 || this.isFirstOfKind(r)) this.consider(site, r);
      }
    }
    return this.route >= 0;
  }

  /** Finds the cheapest place in one route, whatever leaving the site out costs. */
  searchIn(site: number, r: number): boolean {
    this.best = Infinity;
    this.route = -1;
    this.consider(site, r);
    return this.route >= 0;
  }

  /** Looks at the routes of the nearest sites, and at empty slots. */
  private searchNearby(site: number): void {
    const { model, state, turn } = this;
    const row = site * model.near;
    const most = Math.min(model.near, NEARBY_SITES);
    for (let i = 1; i < most; i++) {
      const r = state.routeOf[model.neighbours[row + i]!]!;
      if (r < 0 || this.routeSeen[r] === turn) continue;
      this.routeSeen[r] = turn;
      this.consider(site, r);
    }
    for (let r = 0; r < model.slots; r++) {
      if (state.length[r] === 0 && this.isFirstOfKind(r)) this.consider(site, r);
    }
  }

  /** Takes the site's best place in a route if it beats those before it. */
  private consider(site: number, r: number): void {
    const at = site * this.model.slots + r;
    if (this.keptVersion[at] !== this.state.version[r]) this.keep(site, r);
    if (this.keptPrice[at]! >= this.best) return;
    // Not kept: what stores hold changes with every other route.
    if (this.model.stocks > 0 && !fitsStock(this.state, site, r)) return;
    if (this.blinks && this.toBlink-- === 0) return this.rearm();
    this.best = this.keptPrice[at]!;
    this.route = r;
    this.position = this.keptPosition[at]!;
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
    if (this.model.visit[at] === FORBIDDEN || !fitsVan(this.state, site, r)) return;
    this.scan(site, r, this.firstInTime(site, r));
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

  /** Tries the positions of one route from `first` on and keeps the best. */
  private scan(site: number, r: number, first: number): void {
    const { model } = this;
    const { data } = this.state;
    const { timeInto, timeOut, priceInto, priceOut, endPriced } = model;
    const kept = site * model.slots + r;
    let cheapest = Infinity;
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
      if (arrive > close) break;
      const to = data[at + FIELDS + NODE]!;
      const leave = (arrive > open ? arrive : open) + service;
      const next = leave + timeOut[matrixRow + to]!;
      const legs = priceInto[matrixRow + from]! + priceOut[matrixRow + to]!;
      from = to;
      if (next > data[at + FIELDS + LATEST]!) continue;
      let price = base + legs - data[at + PRICE]!;
      if (price >= cheapest) continue;
      if (endPriced) price += this.endChange(r, next + data[at + FIELDS + TAIL]!);
      if (price >= cheapest) continue;
      cheapest = price;
      this.keptPosition[kept] = k;
    }
    this.keptPrice[kept] = cheapest;
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

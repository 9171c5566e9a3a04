/**
 * The plan under search: routes as rows of one integer array, with the times that make an
 * insertion test O(1), and copy-on-write so that a rejected change costs only what it touched.
 *
 * Record of a position (FIELDS integers): node; earliest leaving time; latest start of work that
 * keeps everything behind it feasible; price and seconds of the leg to the next position; and
 * seconds from start of work here to the return if nothing waits. Position 0 is the start depot,
 * `length + 1` the end depot.
 */
import { Cells } from "./cells";
import type { Model } from "./model";

export const NODE = 0;
export const LEAVE = 1;
export const LATEST = 2;
export const PRICE = 3;
export const LEG = 4;
export const TAIL = 5;
export const FIELDS = 6;

/** Larger than any time of day and leg together, small enough to add up in 31 bits. */
const NEVER = 0x3fffffff;

export class RouteState {
  /** Rows of the routes, then the same again as they were before the current change. */
  data: Int32Array;
  /** Integers in a row. */
  row: number;
  readonly length: Int32Array;
  /** Leg and visit prices of each route, without opening and end. */
  readonly price: Float64Array;
  /** Working time of the return. */
  readonly end: Int32Array;
  readonly cells: Cells;
  /** A number of its own for each content a route has had; a roll-back brings the old one back. */
  readonly version: Int32Array;
  private versions = 0;
  readonly routeOf: Int32Array;
  readonly positionOf: Int32Array;
  /** Sites in no route, and where each stands in that list (-1: in a route). */
  readonly absent: Int32Array;
  readonly absentAt: Int32Array;
  absentCount: number;
  total = 0;

  readonly touched: Int32Array;
  touchedCount = 0;
  private readonly isTouched: Uint8Array;
  private readonly oldLength: Int32Array;
  private readonly oldPrice: Float64Array;
  private readonly oldEnd: Int32Array;
  private readonly oldVersion: Int32Array;
  private oldTotal = 0;

  constructor(readonly model: Model) {
    const { sites, slots } = model;
    this.row = 32 * FIELDS;
    this.data = new Int32Array(2 * slots * this.row);
    this.length = new Int32Array(slots);
    this.price = new Float64Array(slots);
    this.end = new Int32Array(slots);
    this.cells = new Cells(model);
    this.version = new Int32Array(slots);
    this.routeOf = new Int32Array(sites).fill(-1);
    this.positionOf = new Int32Array(sites);
    this.absent = Int32Array.from({ length: sites }, (_, s) => s);
    this.absentAt = this.absent.slice();
    this.absentCount = sites;
    this.touched = new Int32Array(slots);
    this.isTouched = new Uint8Array(slots);
    this.oldLength = new Int32Array(slots);
    this.oldPrice = new Float64Array(slots);
    this.oldEnd = new Int32Array(slots);
    this.oldVersion = new Int32Array(slots);
    for (let s = 0; s < sites; s++) this.total += model.skip[s]!;
    for (let r = 0; r < slots; r++) this.begin(r);
    this.mark();
  }

  /** Empties a route down to its frozen stops. */
  private begin(r: number): void {
    const { model } = this;
    const at = r * this.row;
    this.data[at + NODE] = model.startNode[r]!;
    this.data[at + LEAVE] = model.startS[r]!;
    this.data[at + FIELDS + NODE] = model.endNode[r]!;
    this.data[at + FIELDS + LATEST] = model.lastEndS[r]!;
    this.link(r, 0);
    this.price[r] = this.data[at + PRICE]!;
    this.forward(r, 1);
    model.problem.slots[r]!.frozen.forEach((site, k) => this.insert(site, r, k));
  }

  /** Sets price and seconds of the leg behind position k. */
  private link(r: number, k: number): void {
    const at = r * this.row + k * FIELDS;
    const cell = this.data[at + NODE]! * this.model.nodes + this.data[at + FIELDS + NODE]!;
    this.data[at + PRICE] = this.model.priceOut[cell]!;
    this.data[at + LEG] = this.model.timeOut[cell]!;
  }

  /** Price of opening the slot and of coming back at `end`; nothing while it has no stop. */
  endPrice(r: number, end: number): number {
    const { model } = this;
    const over = end > model.shiftEndS[r]! ? end - model.shiftEndS[r]! : 0;
    return (end - model.startS[r]!) * model.dutyPerS + over * model.overtimePerS[r]!;
  }

  routePrice(r: number): number {
    if (this.length[r] === 0) return 0;
    return this.price[r]! + this.model.opening[r]! + this.endPrice(r, this.end[r]!);
  }

  /** Recomputes leaving times and positions on from position k. */
  private forward(r: number, from: number): void {
    const { data, model } = this;
    const last = this.length[r]! + 1;
    const windowRow = model.windowRow[r]!;
    let at = r * this.row + from * FIELDS;
    let now = data[at - FIELDS + LEAVE]! + data[at - FIELDS + LEG]!;
    for (let k = from; k < last; k++, at += FIELDS) {
      const site = data[at + NODE]!;
      const open = model.open[windowRow + site]!;
      now = (now > open ? now : open) + model.service[site]!;
      this.positionOf[site] = k;
      data[at + LEAVE] = now;
      now += data[at + LEG]!;
    }
    data[at + LEAVE] = now;
    this.end[r] = now;
  }

  /** Recomputes latest starts back from position k; those behind it are as they were. */
  private backward(r: number, from: number): void {
    const { data, model } = this;
    const windowRow = model.windowRow[r]!;
    const frozen = model.frozen[r]!;
    let at = r * this.row + from * FIELDS;
    let changed = true;
    for (let k = from; k > 0 && (changed || k >= from - 1); k--, at -= FIELDS) {
      const site = data[at + NODE]!;
      const spent = data[at + LEG]! + model.service[site]!;
      const latest = data[at + FIELDS + LATEST]! - spent;
      const close = k > frozen ? model.close[windowRow + site]! : NEVER;
      const next = latest < close ? latest : close;
      const tail = data[at + FIELDS + TAIL]! + spent;
      changed = data[at + LATEST] !== next || data[at + TAIL] !== tail;
      data[at + LATEST] = next;
      data[at + TAIL] = tail;
    }
  }

  /** Copies a route aside before its first change since `mark`. */
  private touch(r: number): void {
    if (this.isTouched[r] === 1) return;
    this.isTouched[r] = 1;
    this.touched[this.touchedCount++] = r;
    const from = r * this.row;
    const used = (this.length[r]! + 2) * FIELDS;
    this.data.copyWithin((this.model.slots + r) * this.row, from, from + used);
    this.oldLength[r] = this.length[r]!;
    this.oldPrice[r] = this.price[r]!;
    this.oldEnd[r] = this.end[r]!;
    this.oldVersion[r] = this.version[r]!;
    this.cells.save(r);
  }

  /** Puts a site behind position k of a route. The caller has tested that it fits. */
  insert(site: number, r: number, k: number): void {
    this.touch(r);
    this.version[r] = ++this.versions;
    if ((this.length[r]! + 3) * FIELDS > this.row) this.grow();
    const before = this.routePrice(r);
    const { model } = this;
    const at = r * this.row + k * FIELDS;
    const end = r * this.row + (this.length[r]! + 2) * FIELDS;
    const oldLeg = this.data[at + PRICE]!;
    this.data.copyWithin(at + 2 * FIELDS, at + FIELDS, end);
    this.data[at + FIELDS + NODE] = site;
    this.length[r] = this.length[r]! + 1;
    this.link(r, k);
    this.link(r, k + 1);
    this.price[r]! +=
      this.data[at + PRICE]! +
      this.data[at + FIELDS + PRICE]! -
      oldLeg +
      model.visit[site * model.slots + r]!;
    this.cells.add(site, r, 1);
    this.routeOf[site] = r;
    this.dropAbsent(site);
    this.forward(r, k + 1);
    this.backward(r, k + 1);
    this.total += this.routePrice(r) - before - model.skip[site]!;
  }

  /** Takes `count` stops out of a route, from position k on. */
  remove(r: number, k: number, count: number): void {
    this.touch(r);
    this.version[r] = ++this.versions;
    const before = this.routePrice(r);
    const { model, data } = this;
    const at = r * this.row + k * FIELDS;
    const end = r * this.row + (this.length[r]! + 2) * FIELDS;
    let gone = data[at - FIELDS + PRICE]!;
    let skipped = 0;
    for (let i = 0, p = at; i < count; i++, p += FIELDS) {
      const site = data[p + NODE]!;
      gone += data[p + PRICE]! + model.visit[site * model.slots + r]!;
      this.cells.add(site, r, -1);
      this.addAbsent(site);
      skipped += model.skip[site]!;
    }
    data.copyWithin(at, at + count * FIELDS, end);
    this.length[r] = this.length[r]! - count;
    this.link(r, k - 1);
    this.price[r]! += data[at - FIELDS + PRICE]! - gone;
    this.forward(r, k);
    this.backward(r, k - 1);
    this.total += this.routePrice(r) - before + skipped;
  }

  private addAbsent(site: number): void {
    this.routeOf[site] = -1;
    this.absentAt[site] = this.absentCount;
    this.absent[this.absentCount++] = site;
  }

  private dropAbsent(site: number): void {
    const at = this.absentAt[site]!;
    if (at < 0) return;
    const moved = this.absent[--this.absentCount]!;
    this.absent[at] = moved;
    this.absentAt[moved] = at;
    this.absentAt[site] = -1;
  }

  /** Starts a change: what follows can be taken back with `rollBack`. */
  mark(): void {
    for (let i = 0; i < this.touchedCount; i++) this.isTouched[this.touched[i]!] = 0;
    this.touchedCount = 0;
    this.oldTotal = this.total;
  }

  /** Takes back everything since `mark`. */
  rollBack(): void {
    for (let i = 0; i < this.touchedCount; i++) this.clearSites(this.touched[i]!);
    for (let i = 0; i < this.touchedCount; i++) this.restore(this.touched[i]!);
    this.total = this.oldTotal;
    this.mark();
  }

  private clearSites(r: number): void {
    for (let k = 1; k <= this.length[r]!; k++) this.addAbsent(this.siteAt(r, k));
  }

  private restore(r: number): void {
    const from = (this.model.slots + r) * this.row;
    const length = this.oldLength[r]!;
    this.data.copyWithin(r * this.row, from, from + (length + 2) * FIELDS);
    this.length[r] = length;
    this.price[r] = this.oldPrice[r]!;
    this.end[r] = this.oldEnd[r]!;
    this.version[r] = this.oldVersion[r]!;
    this.cells.restore(r);
    for (let k = 1; k <= length; k++) {
      const site = this.siteAt(r, k);
      this.routeOf[site] = r;
      this.positionOf[site] = k;
      this.dropAbsent(site);
    }
  }

  siteAt(r: number, k: number): number {
    return this.data[r * this.row + k * FIELDS + NODE]!;
  }

  /** Doubles the rows. */
  private grow(): void {
    const wide = new Int32Array(this.data.length * 2);
    for (let i = 0; i < 2 * this.model.slots; i++) {
      wide.set(this.data.subarray(i * this.row, (i + 1) * this.row), i * this.row * 2);
    }
    this.data = wide;
    this.row *= 2;
  }
}

/** Cells in the vans and left in stores while a plan is under search. */
import type { Model } from "./model";

export class Cells {
  /** By [slot * loads + dimension]: what each van carries. */
  readonly load: Int32Array;
  /** Left of each type whose stock can bind, by [type * days + day]; see model.stock. */
  readonly left: Int32Array;
  private readonly oldLoad: Int32Array;

  constructor(private readonly model: Model) {
    this.load = new Int32Array(model.slots * model.loads);
    this.oldLoad = new Int32Array(model.slots * model.loads);
    this.left = model.stock.slice();
  }

  /** Puts a site's cells into a van (1), or out of it (-1). */
  add(site: number, r: number, sign: number): void {
    const { loads, stocks, demand } = this.model;
    for (let i = 0; i < loads; i++) {
      const cells = sign * demand[site * loads + i]!;
      this.load[r * loads + i]! += cells;
      if (i < stocks && cells !== 0) this.take(i, r, cells);
    }
  }

  /** Takes cells of a type out of stores, from the route's day on. */
  private take(type: number, r: number, cells: number): void {
    const { days, dayOf } = this.model;
    for (let d = type * days + dayOf[r]!; d < (type + 1) * days; d++) this.left[d]! -= cells;
  }

  /** Remembers what a van carries, for `restore`. */
  save(r: number): void {
    const { loads } = this.model;
    for (let i = r * loads; i < (r + 1) * loads; i++) this.oldLoad[i] = this.load[i]!;
  }

  restore(r: number): void {
    const { loads, stocks } = this.model;
    for (let i = 0, at = r * loads; i < loads; i++, at++) {
      const cells = this.oldLoad[at]! - this.load[at]!;
      if (i < stocks && cells !== 0) this.take(i, r, cells);
      this.load[at] = this.oldLoad[at]!;
    }
  }
}

import type { Rng } from "../prng";
import type { World } from "../world";
import { catalogueCell } from "./cell-catalogue";
import { localInstant } from "./local-time";
import type { Bank } from "./water";

export interface ScenarioLot {
  readonly code: string;
  readonly designation: string;
  readonly madeDay: number;
  readonly receivedDay: number;
  readonly supplierReference: string;
  readonly cellsReceived: number;
  readonly unitCostMinor: number;
}

/** `stores/north`, `stores/south`, or a van's key; null: from the supplier, or into a device. */
export type PlaceKey = string;

export interface ScenarioStockMove {
  readonly lotCode: string;
  readonly from: PlaceKey | null;
  readonly to: PlaceKey | null;
  readonly cells: number;
  readonly at: Date;
  readonly reason: "received" | "moved" | "installed";
  readonly technicianKey: string | null;
}

export interface StoreRoom {
  readonly lots: readonly ScenarioLot[];
  readonly moves: readonly ScenarioStockMove[];
  /** Cells of one lot at each place now, for every lot and place that holds any. */
  counts(): readonly {
    readonly lotCode: string;
    readonly place: PlaceKey;
    readonly cells: number;
  }[];
  /** Takes the cells of one pack, of one lot, out of a van; fetches or orders as needed. */
  take(order: Order): ScenarioLot;
}

export interface Order {
  readonly designation: string;
  readonly cells: number;
  readonly bank: Bank;
  readonly vanKey: PlaceKey;
  readonly technicianKey: string;
  readonly day: number;
  readonly at: Date;
}

/** The bad delivery of the scenario: weak cells of one type, from one day on. */
export interface BadLot {
  readonly designation: string;
  readonly fromDay: number;
  readonly capacityFactor: number;
  readonly leakFactor: number;
}

const OPENING_MINUTES = 7 * 60;
const DOZEN = 12;

class Stores implements StoreRoom {
  readonly lots: ScenarioLot[] = [];
  readonly moves: ScenarioStockMove[] = [];
  private readonly held = new Map<PlaceKey, Map<string, number>>();
  private readonly byCode = new Map<string, ScenarioLot>();
  private badLotCame = false;

  constructor(
    private readonly world: World,
    private readonly bad: BadLot,
    private readonly rng: Rng,
  ) {}

  take(order: Order): ScenarioLot {
    let lot = this.oldest(order.vanKey, order.designation, order.cells);
    if (!lot) {
      lot = this.fetch(order);
    }
    this.move(lot, order.vanKey, null, order.cells, order.at, "installed", order.technicianKey);
    return lot;
  }

  counts(): { lotCode: string; place: PlaceKey; cells: number }[] {
    return [...this.held].flatMap(([place, lots]) =>
      [...lots]
        .filter(([, cells]) => cells > 0)
        .map(([lotCode, cells]) => ({ lotCode, place, cells })),
    );
  }

  /** Brings some cells of the oldest fitting lot from the bank's stores to the van. */
  private fetch(order: Order): ScenarioLot {
    const stores = `stores/${order.bank}`;
    const cell = catalogueCell(order.designation);
    const there = this.total(stores, order.designation);
    if (there < cell.reorderPoint / 2 || !this.oldest(stores, order.designation, order.cells)) {
      this.receive(order, stores);
    }
    const lot = this.oldest(stores, order.designation, order.cells);
    if (!lot) throw new Error(`stores: ${order.designation} did not come`);
    const packs = Math.floor(this.heldOf(stores, lot.code) / order.cells);
    const cells = order.cells * Math.min(packs, cell.massMg > 500_000 ? 2 : 5);
    const morning = localInstant(order.day, OPENING_MINUTES + 15);
    this.move(lot, stores, order.vanKey, cells, morning, "moved", order.technicianKey);
    return lot;
  }

  private receive(order: Order, stores: PlaceKey): void {
    const cell = catalogueCell(order.designation);
    const isBad =
      !this.badLotCame &&
      order.designation === this.bad.designation &&
      order.day >= this.bad.fromDay;
    const dozens = Math.ceil((cell.reorderPoint * this.rng.uniform(1, 1.6)) / DOZEN);
    const heavy = cell.massMg > 500_000;
    const count = heavy ? 2 * order.cells * this.rng.int(2, 4) : DOZEN * dozens * (isBad ? 2 : 1);
    const age = this.rng.chance(0.12) ? this.rng.int(250, 500) : this.rng.int(30, 150);
    const number = this.lots.filter((l) => l.designation === order.designation).length + 1;
    const lot: ScenarioLot = {
      code: `${order.designation.replace(/[^A-Z0-9]+/g, "")}-${String(number).padStart(3, "0")}`,
      designation: order.designation,
      madeDay: order.day - (heavy ? Math.min(age, 120) : age),
      receivedDay: order.day,
      supplierReference: `D-${this.rng.int(10_000, 99_999)}`,
      cellsReceived: count,
      unitCostMinor: Math.max(1, Math.round(cell.unitCostMinor * this.rng.uniform(0.94, 1.08))),
    };
    this.badLotCame ||= isBad;
    this.lots.push(lot);
    this.byCode.set(lot.code, lot);
    this.world.addLot({
      key: lot.code,
      makeKey: lot.designation,
      madeDay: lot.madeDay,
      ...(isBad
        ? { capacityFactor: this.bad.capacityFactor, leakFactor: this.bad.leakFactor }
        : {}),
    });
    this.move(lot, null, stores, count, localInstant(order.day, OPENING_MINUTES), "received", null);
  }

  private heldOf(place: PlaceKey, lotCode: string): number {
    return this.held.get(place)?.get(lotCode) ?? 0;
  }

  private total(place: PlaceKey, designation: string): number {
    return [...(this.held.get(place) ?? [])]
      .filter(([code]) => this.byCode.get(code)?.designation === designation)
      .reduce((sum, [, cells]) => sum + cells, 0);
  }

  /** The lot with the oldest date code that holds a whole pack at a place. */
  private oldest(place: PlaceKey, designation: string, cells: number): ScenarioLot | undefined {
    return [...(this.held.get(place) ?? [])]
      .filter(([, held]) => held >= cells)
      .flatMap(([code]) => this.byCode.get(code) ?? [])
      .filter((lot) => lot.designation === designation)
      .sort((a, b) => a.madeDay - b.madeDay)[0];
  }

  private move(
    lot: ScenarioLot,
    from: PlaceKey | null,
    to: PlaceKey | null,
    cells: number,
    at: Date,
    reason: ScenarioStockMove["reason"],
    technicianKey: string | null,
  ): void {
    if (from) this.change(from, lot.code, -cells);
    if (to) this.change(to, lot.code, cells);
    this.moves.push({ lotCode: lot.code, from, to, cells, at, reason, technicianKey });
  }

  private change(place: PlaceKey, lotCode: string, by: number): void {
    const lots = this.held.get(place) ?? new Map<string, number>();
    const cells = (lots.get(lotCode) ?? 0) + by;
    if (cells < 0) throw new Error(`stores: ${place} holds too few cells of ${lotCode}`);
    lots.set(lotCode, cells);
    if (cells === 0) lots.delete(lotCode);
    this.held.set(place, lots);
  }
}

/** Empty stores and vans; deliveries come when a van asks for what is not there. */
export function openStores(world: World, bad: BadLot, rng: Rng): StoreRoom {
  return new Stores(world, bad, rng);
}

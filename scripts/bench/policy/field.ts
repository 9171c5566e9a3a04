/** One fleet lived through under one policy: what is done to the hidden world, and what is known. */
import type { PackReading } from "@/lib/battery";
import { createRng, type Rng } from "../../simulate/prng";
import { catalogueCell } from "../../simulate/scenario/cell-catalogue";
import type { World } from "../../simulate/world";
import { assetOf, PRICES, type BenchAsset, type Fleet } from "./fleet";
import { type Ledger, openLedger } from "./ledger";

/** A pack as the office knows it. */
export interface BenchPack {
  readonly key: string;
  readonly tag: string;
  readonly designation: string;
  readonly installedAt: number;
  readonly madeAt: number;
  readonly readings: PackReading[];
  /** The silence, once there is one; the office knows of it from `knownAt` on. */
  silence: { readonly at: number; readonly lastAliveAt: number; readonly knownAt: number } | null;
  removedAt: number | null;
}

/** When the office plans, as a share of the day. */
export const BEFORE_WORK = 0.2;
/** Days for which one delivery of each cell type lasts, and how old it is when it comes. */
const DELIVERY_DAYS = 56;
const DELIVERED_AGE_DAYS = 70;
const TEST_LOAD_UA = { usual: 100_000, button: 5_000, thionyl: 20_000 } as const;

export class BenchField {
  readonly ledger: Ledger = openLedger();
  /** Packs that came out, the years before the run included. */
  readonly finished: BenchPack[];
  private readonly rng: Rng;
  private packs = 0;

  constructor(
    readonly fleet: Fleet,
    readonly world: World,
    readonly installed: Map<string, BenchPack>,
    finished: readonly BenchPack[],
    /** When each asset's draw is known to have changed. */
    readonly drawChanges: ReadonlyMap<string, readonly number[]>,
    readonly firstDay: number,
  ) {
    this.finished = [...finished];
    this.rng = createRng(`${fleet.seed}/hands`);
    this.ledger.minor.wornStock += this.stockValue();
  }

  packOf(tag: string): BenchPack {
    const pack = this.installed.get(tag);
    if (!pack) throw new Error(`bench: ${tag} has no pack`);
    return pack;
  }

  /** Midnight: a day has gone by. Whole days only, so that looking changes nobody's fate. */
  beginDay(day: number): void {
    this.world.step(day);
    for (const [tag, pack] of this.installed) {
      const stop = pack.silence ? null : this.world.stoppedAt(tag);
      if (stop !== null) this.noteStop(pack, stop);
    }
  }

  private noteStop(pack: BenchPack, stop: number): void {
    const rng = createRng(`${this.fleet.seed}/silence/${pack.key}`);
    pack.silence = {
      at: stop + rng.uniform(0.002, 0.04),
      lastAliveAt: Math.max(pack.installedAt, stop - rng.uniform(0.002, 0.04)),
      knownAt: stop + rng.uniform(0.1, 1.4),
    };
    this.ledger.stops += 1;
  }

  chance(probability: number): boolean {
    return this.rng.chance(probability);
  }

  isKnownSilent(tag: string, at: number): boolean {
    const { silence } = this.packOf(tag);
    return silence !== null && silence.knownAt <= at;
  }

  /** What a hand writes down; three in ten under load, half of those with a known one. */
  read(tag: string, at: number, kind = this.rng.chance(0.7) ? "resting" : "loaded"): PackReading {
    const pack = this.packOf(tag);
    const load = kind === "loaded" && this.rng.chance(0.5) ? this.loadFor(pack) : {};
    const seen = this.world.measure(tag, at, kind as PackReading["kind"], load);
    const reading: PackReading = {
      id: `${pack.key}/${pack.readings.length}`,
      at,
      millivolts: seen.millivolts,
      kind: seen.kind,
      loadUa: seen.loadUa,
      temperatureDc: this.rng.chance(0.75) ? seen.temperatureDc : null,
      accuracyMv: null,
    };
    pack.readings.push(reading);
    return reading;
  }

  private loadFor({ designation }: BenchPack): { loadUa: number } {
    if (designation.startsWith("SR")) return { loadUa: TEST_LOAD_UA.button };
    return { loadUa: designation.startsWith("ER") ? TEST_LOAD_UA.thionyl : TEST_LOAD_UA.usual };
  }

  /** Fresh cells in, the old ones out and booked. */
  swap(tag: string, at: number): void {
    const asset = assetOf(this.fleet, tag);
    const pack = this.packOf(tag);
    const { ledger, world } = this;
    this.bookSilence(asset, at);
    ledger.outMah += asset.packMah;
    ledger.leftMah += asset.packMah * (world.truth(tag)?.chargeLeft ?? 0);
    ledger.swaps += 1;
    ledger.minor.cells += asset.cellsMinor;
    ledger.minor.work += (asset.model.swapMinutes / 60) * PRICES.crewMinorPerHour;
    pack.removedAt = at;
    this.finished.push(pack);
    const delivery = Math.floor(at / DELIVERY_DAYS);
    const lotKey = `${asset.designation}/${delivery}`;
    const madeAt = delivery * DELIVERY_DAYS - DELIVERED_AGE_DAYS;
    // A lot's truth hangs on its key alone: adding it again changes nothing.
    world.addLot({
      key: lotKey,
      makeKey: catalogueCell(asset.designation).designation,
      madeDay: madeAt,
    });
    world.swap(tag, lotKey, at);
    this.installed.set(tag, {
      key: `${tag}/${this.packs++}`,
      tag,
      designation: asset.designation,
      installedAt: at,
      madeAt,
      readings: [],
      silence: null,
      removedAt: null,
    });
  }

  private bookSilence(asset: BenchAsset, until: number): void {
    const stop = this.world.stoppedAt(asset.tag);
    if (stop === null) return;
    const hours = Math.max(0, until - Math.max(stop, this.firstDay)) * 24;
    this.ledger.deadHours += hours;
    this.ledger.minor.silence += hours * asset.silenceMinorPerHour;
  }

  /** The last day is over: silences that last are booked, and what the packs are still worth. */
  close(at: number): void {
    for (const asset of this.fleet.assets.values()) this.bookSilence(asset, at);
    this.ledger.minor.wornStock -= this.stockValue();
  }

  /**
   * What the charge in the field cost to bring there: cells and work. So that a policy is not
   * thanked for leaving old packs behind. Generous to policies that throw charge away.
   */
  private stockValue(): number {
    let value = 0;
    for (const asset of this.fleet.assets.values()) {
      const workMinor = (asset.model.swapMinutes / 60) * PRICES.crewMinorPerHour;
      value += (this.world.truth(asset.tag)?.chargeLeft ?? 0) * (asset.cellsMinor + workMinor);
    }
    return value;
  }
}

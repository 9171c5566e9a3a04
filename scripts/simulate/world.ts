import type { CellMake, LotTruth } from "./cell";
import { buildString, stringChargeLeft } from "./cell-string";
import { peakMa } from "./device";
import {
  advance,
  type AssetState,
  createAsset,
  restedDays,
  twin,
  type WorldAsset,
} from "./fleet-asset";
import { HAND_METER, type Measurement, type Meter, readPack } from "./meter";
import { createRng, type Rng } from "./prng";
import { type Climate, createWeather, type Weather } from "./weather";

/** How a delivery is to depart from its make; what is not said is drawn. */
export interface LotConfig {
  readonly key: string;
  readonly makeKey: string;
  readonly madeDay: number;
  readonly capacityFactor?: number;
  readonly leakFactor?: number;
}

export interface WorldConfig {
  /** Epoch day on which the world begins. */
  readonly firstDay: number;
  readonly climate: Climate;
  readonly makes: readonly CellMake[];
  readonly lots: readonly LotConfig[];
  readonly assets: readonly WorldAsset[];
}

export interface MeasureOptions {
  /** Load of a loaded reading, microamps; left out: the device's own peak, size unknown. */
  readonly loadUa?: number;
  readonly meter?: Meter;
}

/**
 * A fleet whose truth is hidden. It is stepped, visited and read: `step` lets time pass,
 * `swap` and `measure` are what a technician does, `lookAhead` and `truth` are for judging.
 * Times are epoch days, fractional. Same seed, same acts: same world.
 */
export interface World {
  readonly day: number;
  readonly weather: Weather;
  addLot(lot: LotConfig): void;
  /** Lets time pass up to an epoch day. */
  step(toDay: number): void;
  /** Puts fresh cells in; whatever was in comes out. */
  swap(assetKey: string, lotKey: string, at: number): void;
  remove(assetKey: string): void;
  /** Firmware that makes a device draw `factor` times its first draw from now on. */
  firmware(assetKey: string, factor: number): void;
  measure(
    assetKey: string,
    at: number,
    kind: "resting" | "loaded",
    options?: MeasureOptions,
  ): Measurement;
  /** When the device stopped on its present pack; null while it runs or has no pack. */
  stoppedAt(assetKey: string): number | null;
  /** Another world that is in the same state and goes its own way from here on. */
  copy(): World;
  /** Hidden truth: when the present pack will stop the device if left alone, within `days`. */
  lookAhead(assetKey: string, days: number): number | null;
  /** Hidden truth about the present pack. */
  truth(assetKey: string): { readonly chargeLeft: number; readonly averageUa: number } | null;
}

/** Spread among lots of one make. Source: from memory. */
const LOT_SPREAD = { capacity: 0.03, leak: 0.2, resistance: 0.08, offsetV: 0.006 };

function drawLot(config: LotConfig, rng: Rng): LotTruth {
  return {
    key: config.key,
    makeKey: config.makeKey,
    madeDay: config.madeDay,
    capacityFactor: rng.logNormal(LOT_SPREAD.capacity) * (config.capacityFactor ?? 1),
    leakFactor: rng.logNormal(LOT_SPREAD.leak) * (config.leakFactor ?? 1),
    resistanceFactor: rng.logNormal(LOT_SPREAD.resistance),
    offsetV: rng.normal(0, LOT_SPREAD.offsetV),
  };
}

/** Makes a world. Nothing is installed yet: `swap` puts the first packs in. */
export function createWorld(seed: string | number, config: WorldConfig): World {
  return new Fleet(createRng(seed), config);
}

class Fleet implements World {
  readonly weather: Weather;
  private today: number;
  private readonly makes: ReadonlyMap<string, CellMake>;
  private readonly lots = new Map<string, LotTruth>();
  private readonly assets = new Map<string, AssetState>();

  constructor(
    private readonly rng: Rng,
    private readonly config: WorldConfig,
  ) {
    this.today = config.firstDay;
    this.weather = createWeather(rng.fork("weather"), config.climate, config.firstDay);
    this.makes = new Map(config.makes.map((make) => [make.key, make]));
    for (const lot of config.lots) this.addLot(lot);
    for (const asset of config.assets) {
      this.assets.set(asset.key, createAsset(asset, rng.fork(`asset/${asset.key}`), this.today));
    }
  }

  get day(): number {
    return this.today;
  }

  addLot(lot: LotConfig): void {
    if (!this.makes.has(lot.makeKey)) throw new Error(`world: no make called ${lot.makeKey}`);
    this.lots.set(lot.key, drawLot(lot, this.rng.fork(`lot/${lot.key}`)));
  }

  step(toDay: number): void {
    for (const state of this.assets.values()) advance(state, this.weather, toDay);
    this.today = Math.max(this.today, toDay);
  }

  swap(assetKey: string, lotKey: string, at: number): void {
    const state = this.stateOf(assetKey);
    const lot = this.lots.get(lotKey);
    const make = lot && this.makes.get(lot.makeKey);
    if (!lot || !make) throw new Error(`world: no lot called ${lotKey}`);
    advance(state, this.weather, at);
    state.pack = buildString(make, lot, state.config, at, state.cellRng);
    state.stoppedAt = null;
  }

  remove(assetKey: string): void {
    const state = this.stateOf(assetKey);
    state.pack = null;
    state.stoppedAt = null;
  }

  firmware(assetKey: string, factor: number): void {
    this.stateOf(assetKey).device.firmwareFactor = factor;
  }

  measure(
    assetKey: string,
    at: number,
    kind: "resting" | "loaded",
    options: MeasureOptions = {},
  ): Measurement {
    const state = this.stateOf(assetKey);
    if (!state.pack) throw new Error(`world: ${assetKey} has no pack to read`);
    advance(state, this.weather, at);
    const loadMa = options.loadUa === undefined ? null : options.loadUa / 1000;
    const running = state.stoppedAt === null;
    const context = {
      at,
      celsius: this.weather.meanC(at) + state.config.exposureC + 1.5,
      idleMa: running ? Math.min(state.averageMa, 5) : 0,
      peakMa: peakMa(state.config, state.device),
      restedDays: restedDays(state, at),
    };
    const meter = options.meter ?? HAND_METER;
    return readPack(state.pack, kind, loadMa, context, meter, state.meterRng);
  }

  stoppedAt(assetKey: string): number | null {
    return this.stateOf(assetKey).stoppedAt;
  }

  copy(): World {
    // The generators of weather and lots hang on keys alone, so the copy draws the same ones.
    const other = new Fleet(this.rng, { ...this.config, lots: [], assets: [] });
    other.today = this.today;
    for (const [key, lot] of this.lots) other.lots.set(key, lot);
    for (const [key, state] of this.assets) other.assets.set(key, twin(state));
    return other;
  }

  lookAhead(assetKey: string, days: number): number | null {
    const ahead = twin(this.stateOf(assetKey));
    const end = Math.max(this.today, ahead.cursor) + days;
    while (ahead.pack && ahead.stoppedAt === null && ahead.cursor < end) {
      advance(ahead, this.weather, Math.min(end, Math.floor(ahead.cursor) + 1));
    }
    return ahead.stoppedAt;
  }

  truth(assetKey: string): { readonly chargeLeft: number; readonly averageUa: number } | null {
    const { pack, averageMa } = this.stateOf(assetKey);
    return pack ? { chargeLeft: stringChargeLeft(pack), averageUa: averageMa * 1000 } : null;
  }

  private stateOf(key: string): AssetState {
    const state = this.assets.get(key);
    if (!state) throw new Error(`world: no asset called ${key}`);
    return state;
  }
}

/**
 * What the simple policies are set by: lives and voltages of training seeds, which no test seed
 * shares. First each device model by itself (the age, or the threshold and interval of looks,
 * at which a renewed pack costs least over those lives), then what it takes as a whole, by living
 * through the training years with it.
 */
import { tripOf } from "@/lib/planning/outlook";
import { groupBy } from "@/lib/usecases/forecast-input";
import { createRng } from "../../simulate/prng";
import { catalogueCell } from "../../simulate/scenario/cell-catalogue";
import { type BenchAsset, PRICES, ROAD } from "./fleet";
import type { Intervals, Inspections } from "./simple-policies";
import type { Start } from "./start";

const LONGEST_DAYS = 2200;
const LOOK_DAYS = 7;
/** Days of silence until a round comes by, and until an urgent trip arrives. */
const ROUND_WAIT_DAYS = 5;
const URGENT_WAIT_DAYS = 1.3;

/** One pack run to its end, with what a meter showed at rest every week. */
export interface TrainingLife {
  readonly asset: BenchAsset;
  readonly days: number;
  readonly restingMv: readonly number[];
  readonly plannedMinor: number;
  readonly failedMinor: number;
  /** A look by itself: the reading and its share of a trip. */
  readonly lookMinor: number;
}

function pricesOf({ fleet }: Start, asset: BenchAsset) {
  const depots = fleet.technicians.map((t) => t.depot);
  const trip = tripOf(fleet.sites.get(asset.siteId)!, { prices: PRICES, road: ROAD, depots });
  const work = (minutes: number) => (minutes / 60) * PRICES.crewMinorPerHour;
  const base = asset.cellsMinor + work(asset.model.swapMinutes);
  const daily = asset.silenceMinorPerHour * 24;
  const waits = base + trip.shareMinor + ROUND_WAIT_DAYS * daily;
  const urgent = base + trip.urgentMinor + URGENT_WAIT_DAYS * daily;
  return {
    plannedMinor: base + trip.shareMinor,
    failedMinor: Math.min(waits, urgent),
    lookMinor: work(asset.model.readMinutes) + trip.shareMinor,
  };
}

/** A fresh pack for every device, at some time of a year, run until each has stopped. */
export function trainingLives(start: Start): TrainingLife[] {
  const { world } = start.open();
  const { fleet, firstDay } = start;
  const rng = createRng(`${fleet.seed}/training`);
  const fitted = [...fleet.assets.values()].map((asset) => {
    const at = firstDay + rng.int(0, 364);
    const lot = `training ${asset.designation} ${rng.int(1, 6)}`;
    const { designation: makeKey } = catalogueCell(asset.designation);
    world.addLot({ key: lot, makeKey, madeDay: at - 70 });
    return { asset, at, lot, restingMv: [] as number[], end: null as number | null };
  });
  for (let day = firstDay; day < firstDay + LONGEST_DAYS; day += LOOK_DAYS) {
    for (const pack of fitted) {
      if (pack.end !== null || pack.at > day) continue;
      const { tag } = pack.asset;
      if (pack.restingMv.length === 0) world.swap(tag, pack.lot, day);
      else pack.end = world.stoppedAt(tag);
      pack.restingMv.push(world.measure(tag, day, "resting").millivolts);
    }
    world.step(day + LOOK_DAYS);
  }
  return fitted.flatMap(({ asset, restingMv, end, at }) => {
    const installed = firstDay + Math.ceil((at - firstDay) / LOOK_DAYS) * LOOK_DAYS;
    return end === null
      ? []
      : [{ asset, restingMv, days: end - installed, ...pricesOf(start, asset) }];
  });
}

/** Cost a day of renewing these lives at an age. */
function intervalRate(lives: readonly TrainingLife[], age: number): number {
  const cost = lives.reduce((s, l) => s + (l.days < age ? l.failedMinor : l.plannedMinor), 0);
  return cost / lives.reduce((sum, l) => sum + Math.min(l.days, age), 0);
}

/** Cost a day of looking every so many days and renewing below a voltage. */
function thresholdRate(lives: readonly TrainingLife[], everyDays: number, belowMv: number): number {
  let cost = 0;
  let days = 0;
  for (const life of lives) {
    let at = everyDays;
    while (at < life.days && (life.restingMv[Math.round(at / LOOK_DAYS)] ?? 0) >= belowMv) {
      cost += life.lookMinor;
      at += everyDays;
    }
    cost += at < life.days ? life.plannedMinor + life.lookMinor / 2 : life.failedMinor;
    days += Math.min(at, life.days);
  }
  return cost / days;
}

function cheapest<T>(choices: readonly T[], rate: (choice: T) => number): T {
  return choices.reduce((best, choice) => (rate(choice) < rate(best) ? choice : best));
}

const LOOKS_EVERY = [28, 42, 56, 84, 112, 140, 168, 210, 252, 308, 364, 448, 546];
const NEVER = { everyDays: Infinity, belowMv: 0 };

/** The cheapest age of each device model over these lives. */
export function bestIntervals(lives: readonly TrainingLife[]): Intervals["days"] {
  const byModel = groupBy(lives, (life) => life.asset.model.code);
  return new Map(
    [...byModel].map(([code, own]) => {
      const ages = own.map((life) => life.days * 0.999);
      return [code, cheapest([...ages, Infinity], (age) => intervalRate(own, age))];
    }),
  );
}

/** The cheapest routine of looks and threshold of each device model over these lives. */
export function bestInspections(lives: readonly TrainingLife[]): Inspections["byModel"] {
  const byModel = groupBy(lives, (life) => life.asset.model.code);
  return new Map(
    [...byModel].map(([code, own]) => {
      const volts = own.flatMap((life) => life.restingMv).sort((a, b) => a - b);
      const levels = Array.from(
        { length: 40 },
        (_, i) => volts[Math.floor((i / 80) * volts.length)]!,
      );
      const choices = LOOKS_EVERY.flatMap((everyDays) =>
        [...new Set(levels)].map((belowMv) => ({ everyDays, belowMv })),
      );
      const rate = (c: typeof NEVER) => thresholdRate(own, c.everyDays, c.belowMv);
      return [code, cheapest([...choices, NEVER], rate)];
    }),
  );
}

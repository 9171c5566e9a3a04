/**
 * Family A: the scenario's world (two kinetic wells, Shepherd's voltage law, wandering draw,
 * weather), stepped from visit to visit. Its equations and coefficients are not lib/battery's.
 */
import type { Chemistry, PackReading } from "../../../lib/battery/pack";
import { createRng, type Rng } from "../../simulate/prng";
import { CELL_MAKES } from "../../simulate/scenario/cell-catalogue";
import { FEN_CLIMATE } from "../../simulate/weather";
import { createWorld, type World } from "../../simulate/world";
import { type DeviceModel, drawModel, dutyOf } from "./devices";
import type { TrialDevice, TrialPack } from "./trial";

const FIRST_DAY = 15_000;
const MODELS = 6;
const LOTS = 5;
const PACKS = 2;
const LONGEST_DAYS = 15 * 365;
const LOADED_SHARE = 0.3;

interface Placed {
  readonly key: string;
  readonly model: DeviceModel;
  readonly exposureC: number;
  readonly rng: Rng;
}

/** Devices of family A, each with two packs run to their ends. */
export function familyA(chemistry: Chemistry, count: number, seed: string): TrialDevice[] {
  const rng = createRng(`${seed}/a/${chemistry}`);
  const models = Array.from({ length: MODELS }, (_, m) =>
    drawModel(chemistry, `m${m}`, rng.fork(`model/${m}`)),
  );
  const placed = Array.from({ length: count }, (_, i): Placed => {
    const own = rng.fork(`device/${i}`);
    return { key: `d${i}`, model: own.pick(models), exposureC: own.uniform(-1, 4), rng: own };
  });
  const world = makeWorld(placed, rng);
  return placed.map((device) => ({
    key: device.key,
    cohort: device.model.key,
    chemistry,
    packs: runPacks(world, device),
  }));
}

function makeWorld(placed: readonly Placed[], rng: Rng): World {
  return createWorld(`${rng.next()}`, {
    firstDay: FIRST_DAY,
    climate: FEN_CLIMATE,
    makes: CELL_MAKES,
    lots: [],
    assets: placed.map(({ key, model, exposureC }) => ({
      key,
      averageUa: model.averageUa,
      peakUa: model.peakUa,
      cutoffMv: model.cutoffMv,
      series: model.series,
      parallel: 1,
      seasonalShare: model.seasonalShare,
      seasonalPeak: model.seasonalPeak,
      exposureC,
    })),
  });
}

function runPacks(world: World, device: Placed): TrialPack[] {
  const packs: TrialPack[] = [];
  let at = FIRST_DAY + device.rng.uniform(1, 365);
  for (let k = 0; k < PACKS; k++) {
    const pack = runPack(world, device, at);
    packs.push(pack);
    at = Math.ceil(pack.end) + device.rng.uniform(1, 20);
  }
  return packs;
}

function lotFor(world: World, device: Placed, at: number): string {
  const { designation } = device.model;
  const key = `${designation}/${Math.floor(at / 365)}/${device.rng.int(1, LOTS)}`;
  // adding a lot again replaces it by the same one: its truth hangs on its key alone
  world.addLot({ key, makeKey: designation, madeDay: Math.floor(at / 365) * 365 - 200 });
  return key;
}

function runPack(world: World, device: Placed, installedAt: number): TrialPack {
  const { key, rng } = device;
  world.swap(key, lotFor(world, device, installedAt), installedAt);
  const visits: number[] = [];
  const readings: PackReading[] = [];
  let at = installedAt;
  let end = world.stoppedAt(key);
  while (end === null && at < installedAt + LONGEST_DAYS) {
    at += rng.uniform(30, 120);
    const kind = rng.chance(LOADED_SHARE) ? "loaded" : "resting";
    const seen = world.measure(key, at, kind);
    end = world.stoppedAt(key);
    if (end !== null) break;
    visits.push(at);
    readings.push({
      id: `${key}/${at}`,
      at,
      millivolts: seen.millivolts,
      kind,
      loadUa: seen.loadUa,
      temperatureDc: rng.chance(0.7) ? seen.temperatureDc : null,
      accuracyMv: null,
    });
  }
  return { spec: specOf(device, installedAt), visits, readings, end: end ?? at };
}

/** What the register would say; the climate is the district's long-term one. */
function specOf({ model, exposureC }: Placed, installedAt: number): TrialPack["spec"] {
  const { meanC, amplitudeC } = FEN_CLIMATE;
  const monthlyMeanDc = Array.from({ length: 12 }, (_, m) => {
    const phase = (2 * Math.PI * (m - 6.2)) / 12;
    return Math.round(10 * (meanC + exposureC + amplitudeC * Math.cos(phase)));
  });
  return {
    cell: model.cell,
    series: model.series,
    parallel: 1,
    cutoffMv: model.cutoffMv,
    duty: dutyOf(model),
    measuredDraw: null,
    monthlyMeanDc,
    madeAt: Math.floor(installedAt / 365) * 365 - 200,
    installedAt,
  };
}

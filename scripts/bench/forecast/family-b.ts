/**
 * Family B: diffusion in the cell, the combined voltage law, draw that changes by spells,
 * another air and another meter. Shares no equation or coefficient with lib/battery or with
 * family A (the published tables behind some curves are the same).
 */
import type { Chemistry, PackReading } from "../../../lib/battery/pack";
import {
  type DiffusingPack,
  drawFrom,
  newPack,
  packMillivolts,
} from "../../simulate/family-b/diffusing-pack";
import {
  type Air,
  type RestlessDevice,
  climateC,
  dayAir,
  dayDrawMa,
  newAir,
  newDevice,
} from "../../simulate/family-b/restless-device";
import { VOLTAGE_LAWS } from "../../simulate/family-b/voltage-laws";
import { createRng, type Rng } from "../../simulate/prng";
import { type DeviceModel, drawModel, dutyOf } from "./devices";
import type { TrialDevice, TrialPack } from "./trial";

const FIRST_DAY = 15_000;
const MODELS = 6;
const LOTS = 12;
const LONGEST_DAYS = 15 * 365;
const LOADED_SHARE = 0.3;

interface Placed {
  readonly key: string;
  readonly model: DeviceModel;
  readonly device: RestlessDevice;
  readonly air: Air;
  readonly rng: Rng;
}

/** Devices of family B, each with two packs run to their ends. */
export function familyB(chemistry: Chemistry, count: number, seed: string): TrialDevice[] {
  const rng = createRng(`${seed}/b/${chemistry}`);
  const models = Array.from({ length: MODELS }, (_, m) =>
    drawModel(chemistry, `m${m}`, rng.fork(`model/${m}`)),
  );
  return Array.from({ length: count }, (_, i) => {
    const own = rng.fork(`device/${i}`);
    const model = own.pick(models);
    const device = newDevice(model.averageUa / 1000, model.peakUa / 1000, own.fork("device"));
    const placed = { key: `d${i}`, model, device, air: newAir(own.fork("air")), rng: own };
    return { key: placed.key, cohort: model.key, chemistry, packs: twoPacks(placed, rng) };
  });
}

function twoPacks(placed: Placed, rng: Rng): TrialPack[] {
  const first = runPack(placed, rng, FIRST_DAY + Math.floor(placed.rng.uniform(1, 365)));
  return [first, runPack(placed, rng, Math.ceil(first.end) + placed.rng.int(1, 20))];
}

function runPack(placed: Placed, family: Rng, installedAt: number): TrialPack {
  const { model, device, air, rng, key } = placed;
  const lot = family.fork(`${model.designation}/lot/${rng.int(1, LOTS)}`);
  const law = VOLTAGE_LAWS[model.cell.chemistry];
  const sheet = {
    law,
    series: model.series,
    elements: Math.round(model.cell.nominalMv / law.elementMv),
    ratedMah: model.cell.rated.capacityMah,
    sheetOhm: model.cell.resistanceMohm / 1000,
  };
  const pack = newPack(sheet, lot, rng.fork(`pack/${installedAt}`), installedAt);
  const visits: number[] = [];
  const readings: PackReading[] = [];
  let next = installedAt + rng.int(30, 120);
  let below = 0;
  let day = installedAt;
  for (; day < installedAt + LONGEST_DAYS; day++) {
    const { meanC, minC } = dayAir(air, day, rng);
    drawFrom(pack, dayDrawMa(device, meanC, rng), 1, meanC);
    // the device gives up on the second night below its cut-off
    below = packMillivolts(pack, device.peakMa, minC, day) < model.cutoffMv ? below + 1 : 0;
    if (below >= 2) break;
    if (day < next) continue;
    visits.push(day + 1);
    readings.push(read(placed, pack, day, meanC, `${key}/${day}`));
    next = day + rng.int(30, 120);
  }
  return { spec: specOf(placed, installedAt), visits, readings, end: day + 1 };
}

function read(
  { device, rng }: Placed,
  pack: DiffusingPack,
  day: number,
  meanC: number,
  id: string,
): PackReading {
  const loaded = rng.chance(LOADED_SHARE);
  const celsius = meanC + rng.uniform(0, 4);
  const loadMa = loaded ? device.peakMa : 0.02;
  const true_ = packMillivolts(pack, loadMa, celsius, day);
  const bias = rng.pick([-6, -2, 0, 3, 8]) * (1 + true_ / 12_000);
  const seen = true_ + bias + rng.uniform(-8, 8);
  const wrong = rng.chance(0.03);
  const shown = wrong ? seen * rng.uniform(0.6, 1.1) : seen;
  return {
    id,
    at: day + 1,
    millivolts: Math.max(0, Math.round(shown / 10) * 10),
    kind: loaded ? "loaded" : "resting",
    loadUa: null,
    temperatureDc: rng.chance(0.5) ? Math.round(celsius * 10) : null,
    accuracyMv: null,
  };
}

function specOf({ model, air }: Placed, installedAt: number): TrialPack["spec"] {
  return {
    cell: model.cell,
    series: model.series,
    parallel: 1,
    cutoffMv: model.cutoffMv,
    duty: dutyOf(model),
    measuredDraw: null,
    monthlyMeanDc: Array.from({ length: 12 }, (_, m) =>
      Math.round(10 * climateC(air, 15 + m * 30.44)),
    ),
    madeAt: null,
    installedAt,
  };
}

import type { Rng } from "../prng";
import type { ScenarioAsset } from "./assets";
import { modelByCode } from "./device-models";
import type { Field } from "./field";
import type { ReasonOut, ScenarioDeviceEvent, ScenarioReading, ScenarioTask } from "./field-log";
import { fromWorldTime, worldTime } from "./local-time";
import { isHabitDue } from "./site-due";
import type { ScenarioTechnician } from "./staff";

const TEST_LOADS_MA = [50, 100, 100, 200];
const FAULT_CHANCE = 0.004;

/** Reads the voltage of an asset's pack and writes it down. */
export function takeReading(
  field: Field,
  asset: ScenarioAsset,
  technician: ScenarioTechnician,
  at: Date,
  note = "",
): ScenarioReading | null {
  const { rng, log, world } = field;
  const pack = log.installed.get(asset.tag);
  if (!pack) return null;
  const kind = rng.chance(0.7) ? "resting" : "loaded";
  const small = modelByCode(asset.modelCode).cellTypes[0].startsWith("SR");
  const load =
    kind === "loaded" && rng.chance(0.5)
      ? { loadUa: small ? 5_000 : rng.pick(TEST_LOADS_MA) * 1000 }
      : {};
  const socl2 = pack.designation.startsWith("ER");
  const seen = world.measure(
    asset.tag,
    worldTime(at),
    kind,
    socl2 && load.loadUa ? { loadUa: 20_000 } : load,
  );
  const reading: ScenarioReading = {
    key: `reading/${pack.key}/${log.readings.length}`,
    packKey: pack.key,
    at,
    millivolts: seen.millivolts,
    kind: seen.kind,
    loadUa: seen.loadUa,
    temperatureDc: rng.chance(0.75) ? seen.temperatureDc : null,
    accuracyMv: rng.chance(0.6) ? 10 : null,
    instrument: `Meter ${technician.key.slice(-1)}`,
    technicianKey: technician.key,
    note,
  };
  log.readings.push(reading);
  return reading;
}

/** How a stop shows at the office: the last message that came, and the first that did not. */
export function silence(
  tag: string,
  stopped: number,
  rng: Rng,
): ScenarioDeviceEvent & { lastHeardAt: Date } {
  return {
    assetTag: tag,
    at: fromWorldTime(stopped + rng.uniform(0.002, 0.04)),
    kind: "stopped",
    lastHeardAt: fromWorldTime(stopped - rng.uniform(0.002, 0.04)),
    note: "",
    technicianKey: null,
  };
}

/** Takes the pack out of the books, with why and at what voltage. */
export function removePack(
  field: Field,
  asset: ScenarioAsset,
  technician: ScenarioTechnician,
  at: Date,
  reason: ReasonOut,
  voltageOutMv: number | null,
): void {
  const { log, world, rng } = field;
  const pack = log.installed.get(asset.tag);
  if (!pack) return;
  pack.removedAt = at;
  pack.removedBy = technician.key;
  pack.reasonOut = reason;
  pack.voltageOutMv = voltageOutMv;
  const stopped = world.stoppedAt(asset.tag);
  if (stopped !== null) {
    const event = silence(asset.tag, stopped, rng);
    const first = new Date(pack.installedAt.getTime() + 60_000);
    const lastHeardAt = event.lastHeardAt < first ? first : event.lastHeardAt;
    pack.stoppedAt = event.at < at ? event.at : at;
    log.events.push({ ...event, lastHeardAt, at: pack.stoppedAt, technicianKey: technician.key });
    if (rng.chance(0.06))
      pack.lookOut = pack.designation.startsWith("VRLA") ? "swollen" : "leaking";
  }
  if (reason === "fault")
    pack.lookOut = rng.pick(["contacts corroded", "holder cracked", "leaking"]);
  log.installed.delete(asset.tag);
  field.noticedAt.delete(asset.tag);
  field.swapSoon.delete(asset.tag);
  field.letBe.delete(asset.tag);
}

/** Puts a fresh pack in, from the technician's van. */
export function installPack(
  field: Field,
  asset: ScenarioAsset,
  technician: ScenarioTechnician,
  day: number,
  at: Date,
): void {
  const model = modelByCode(asset.modelCode);
  const { series, parallel } = model;
  const { designation } = asset;
  const lot = field.stores.take({
    designation,
    cells: series * parallel,
    bank: technician.bank,
    vanKey: technician.vanKey,
    technicianKey: technician.key,
    day,
    at,
  });
  field.world.swap(asset.tag, lot.code, worldTime(at));
  const pack = {
    key: `pack/${asset.tag}/${field.log.packs.length}`,
    assetTag: asset.tag,
    designation,
    lotCode: lot.code,
    series,
    parallel,
    madeDay: lot.madeDay,
    installedAt: at,
    installedBy: technician.key,
    removedAt: null,
    removedBy: null,
    reasonOut: null,
    voltageOutMv: null,
    stoppedAt: null,
    lookOut: "",
  };
  field.log.packs.push(pack);
  field.log.installed.set(asset.tag, pack);
}

function reasonToSwap(
  field: Field,
  asset: ScenarioAsset,
  day: number,
  read: ScenarioReading | null,
): ReasonOut | null {
  const { rng, world, swapSoon, letBe } = field;
  if (world.stoppedAt(asset.tag) !== null) return "found_stopped";
  if (swapSoon.has(asset.tag) || isHabitDue(field, asset, day)) return "early";
  if (letBe.has(asset.tag)) return null;
  if (rng.chance(FAULT_CHANCE)) return "fault";
  const below = modelByCode(asset.modelCode).habitVoltageMv;
  return below !== null && read?.kind === "resting" && read.millivolts < below ? "due" : null;
}

/** What one technician does at one asset. Null when nothing was to do. */
export function workOnAsset(
  field: Field,
  asset: ScenarioAsset,
  technician: ScenarioTechnician,
  day: number,
  at: Date,
): ScenarioTask | null {
  const pack = field.log.installed.get(asset.tag);
  // A pack put in later on the same day is not there yet when the round comes by.
  if (!pack || at <= pack.installedAt) return null;
  const read = field.rng.chance(0.88) ? takeReading(field, asset, technician, at) : null;
  const later = new Date(at.getTime() + 4 * 60_000);
  if ((field.retireDay.get(asset.tag) ?? Infinity) <= day) {
    removePack(field, asset, technician, later, "device_removed", read?.millivolts ?? null);
    field.world.remove(asset.tag);
    return { assetTag: asset.tag, kind: "inspect", packKey: pack.key, designation: null, cells: 0 };
  }
  const reason = reasonToSwap(field, asset, day, read);
  if (reason === null) {
    const kind = read ? "read" : "inspect";
    return { assetTag: asset.tag, kind, packKey: pack.key, designation: null, cells: 0 };
  }
  removePack(field, asset, technician, later, reason, read?.millivolts ?? null);
  installPack(field, asset, technician, day, later);
  if (field.rng.chance(0.5)) {
    takeReading(field, asset, technician, new Date(later.getTime() + 6 * 60_000), "after the swap");
  }
  const { designation } = asset;
  return {
    assetTag: asset.tag,
    kind: "swap",
    packKey: pack.key,
    designation,
    cells: pack.series * pack.parallel,
  };
}

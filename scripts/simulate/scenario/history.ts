import type { ScenarioAsset } from "./assets";
import { runDay } from "./day-round";
import type { Field } from "./field";
import { fromWorldTime, localInstant, weekdayOf, worldTime } from "./local-time";
import type { ScenarioDraw } from "./field-log";
import { installPack, silence, takeReading } from "./site-visit";
import { callingSites, isKnownSilent } from "./site-due";
import { isAway, type ScenarioTechnician } from "./staff";
import { steer } from "./steer";

/** The firmware that made one model draw more: when it went out, and how much more. */
export interface FirmwareChange {
  readonly modelCode: string;
  readonly version: string;
  readonly firstDay: number;
  readonly days: number;
  readonly factor: number;
}

export interface HistoryPlan {
  readonly firstDay: number;
  readonly now: Date;
  readonly today: number;
  readonly firmware: FirmwareChange;
}

const STEER_DAYS = [110, 75, 50, 28, 18, 9];
const KEEP = { due: 26, out: 4 };

function onDuty(field: Field, day: number): ScenarioTechnician[] {
  return field.technicians.filter(
    (t) => t.shifts[weekdayOf(day)] && !isAway(field.absences, t.key, day),
  );
}

/** First packs of the assets whose turn has come; each leaves the list of those waiting. */
function commission(field: Field, waiting: Set<ScenarioAsset>, day: number): void {
  const crew = onDuty(field, day);
  if (crew.length === 0) return;
  for (const asset of waiting) {
    if ((field.commissionDay.get(asset.tag) ?? Infinity) > day) continue;
    waiting.delete(asset);
    const bank = field.siteByCode.get(asset.siteCode)?.bank;
    const technician = crew.find((t) => t.bank === bank) ?? field.rng.pick(crew);
    const at = localInstant(day, field.rng.int(8 * 60 + 30, 15 * 60));
    installPack(field, asset, technician, day, at);
    if (field.rng.chance(0.6)) {
      takeReading(field, asset, technician, new Date(at.getTime() + 10 * 60_000), "when installed");
    }
  }
}

function rollOut(field: Field, change: FirmwareChange, day: number): void {
  for (const assets of field.assetsAt.values()) {
    for (const asset of assets) {
      if (asset.modelCode !== change.modelCode || !field.log.installed.has(asset.tag)) continue;
      const slot = Number(asset.tag.slice(-3)) % change.days;
      if (change.firstDay + slot !== day) continue;
      field.world.firmware(asset.tag, change.factor);
      field.log.events.push({
        assetTag: asset.tag,
        at: localInstant(day, 22 * 60),
        kind: "firmware_changed",
        lastHeardAt: null,
        note: `Version ${change.version} over the air.`,
        technicianKey: null,
      });
    }
  }
}

function workDay(field: Field, day: number): void {
  const crew = onDuty(field, day);
  const silent = [...field.log.installed.keys()].filter((tag) => isKnownSilent(field, tag, day));
  const pressing = silent.length > 2 || field.swapSoon.size > 0;
  const taken = new Set<string>();
  const calling = callingSites(field, day);
  for (const technician of crew) {
    if (!field.rng.chance(pressing ? 0.92 : 0.6)) continue;
    const sheet = { technician, day, mostStops: field.rng.int(6, 11), calling, booked: false };
    const round = runDay(field, sheet, taken);
    if (!round) continue;
    field.log.rounds.push(round);
    for (const stop of round.stops) {
      const days = (field.cadence.get(stop.siteCode) ?? 90) * field.rng.uniform(0.75, 1.25);
      field.nextLook.set(stop.siteCode, day + Math.round(days));
    }
  }
}

/** Rounds already promised for the next days: the crews are partly booked. */
function bookAhead(field: Field, today: number): void {
  const taken = new Set<string>();
  for (const [offset, keys] of [
    [0, [0]],
    [1, [1, 3]],
    [2, [3]],
  ] as const) {
    const day = offset === 0 ? today : nthWorkingDay(today + 1, offset - 1);
    const calling = callingSites(field, day);
    for (const index of keys) {
      const technician = field.technicians[index];
      if (!technician || isAway(field.absences, technician.key, day)) continue;
      const round = runDay(field, { technician, day, mostStops: 5, calling, booked: true }, taken);
      if (round) field.log.rounds.push(round);
    }
  }
}

function nthWorkingDay(today: number, n: number): number {
  let day = today;
  for (let left = n; ; day++) {
    if (weekdayOf(day) > 5) continue;
    if (left === 0) return day;
    left -= 1;
  }
}

/** Lives through the years day by day, up to the moment `now`. */
export function liveThrough(field: Field, plan: HistoryPlan): void {
  const waiting = new Set([...field.assetsAt.values()].flat());
  for (let day = plan.firstDay; day < plan.today; day++) {
    field.world.step(day);
    if (STEER_DAYS.includes(plan.today - day)) steer(field, day, worldTime(plan.now), KEEP);
    rollOut(field, plan.firmware, day);
    if (weekdayOf(day) > 5) continue;
    commission(field, waiting, day);
    workDay(field, day);
  }
  field.world.step(worldTime(plan.now));
  bookAhead(field, plan.today);
}

/** Silences the office knows of at `now`, written down as events; when each asset was last heard. */
export function takeStock(field: Field, now: Date): Map<string, Date> {
  const heard = new Map<string, Date>();
  for (const tag of field.log.installed.keys()) {
    const stopped = field.world.stoppedAt(tag);
    if (stopped === null) {
      heard.set(tag, fromWorldTime(worldTime(now) - field.rng.uniform(0.001, 0.04)));
      continue;
    }
    const event = silence(tag, stopped, field.rng);
    heard.set(tag, event.lastHeardAt);
    if (event.at < now) field.log.events.push(event);
  }
  return heard;
}

/** A twelfth of the fleet had its current measured in the last month, within some per cent. */
export function measureDraws(field: Field, now: Date): ScenarioDraw[] {
  const draws: ScenarioDraw[] = [];
  for (const tag of field.log.installed.keys()) {
    const truth = field.world.truth(tag);
    if (!truth || field.world.stoppedAt(tag) !== null || !field.rng.chance(0.08)) continue;
    draws.push({
      assetTag: tag,
      at: fromWorldTime(worldTime(now) - field.rng.uniform(1, 30)),
      averageUa: Math.max(1, Math.round(truth.averageUa * field.rng.normal(1, 0.05))),
    });
  }
  return draws;
}

import type { ScenarioAsset } from "./assets";
import { modelByCode } from "./device-models";
import { type Field, packAge } from "./field";
import { isoDay } from "./local-time";
import type { ScenarioSite } from "./sites";

/** Why a site is worth a visit, and how much; higher goes first. */
const URGENCY = { silent: 1_000, soon: 400, habit: 100, look: 10 } as const;

/** True when the closed season of a site covers a day (it may span New Year). */
export function isClosed(site: ScenarioSite, day: number): boolean {
  if (!site.closure) return false;
  const monthDay = isoDay(day).slice(5);
  const { first, last } = site.closure;
  return first <= last
    ? first <= monthDay && monthDay <= last
    : first <= monthDay || monthDay <= last;
}

/** True when the office knows by the morning of `day` that the asset is silent. */
export function isKnownSilent(field: Field, tag: string, day: number): boolean {
  const stopped = field.world.stoppedAt(tag);
  if (stopped === null) return false;
  let noticed = field.noticedAt.get(tag);
  if (noticed === undefined || noticed < stopped) {
    noticed = stopped + field.rng.uniform(0.1, 1.4);
    field.noticedAt.set(tag, noticed);
  }
  return noticed <= day + 0.3;
}

/** True when the fixed interval of the model has run out for this asset's pack. */
export function isHabitDue(field: Field, asset: ScenarioAsset, day: number): boolean {
  if (field.letBe.has(asset.tag)) return false;
  const interval = modelByCode(asset.modelCode).habitIntervalDays;
  const age = packAge(field, asset.tag, day);
  return interval !== null && age !== null && age >= interval;
}

/** How urgent a site is on a day; 0 when nothing calls. */
export function siteUrgency(field: Field, site: ScenarioSite, day: number): number {
  let urgency = 0;
  for (const asset of field.assetsAt.get(site.code) ?? []) {
    if (!field.log.installed.has(asset.tag)) continue;
    if (isKnownSilent(field, asset.tag, day)) {
      if (field.keptWaiting.has(asset.tag)) return 0;
      const waited = day - (field.noticedAt.get(asset.tag) ?? day);
      urgency = Math.max(urgency, URGENCY.silent + 20 * waited);
    }
    if (field.swapSoon.has(asset.tag)) urgency = Math.max(urgency, URGENCY.soon);
    if (isHabitDue(field, asset, day)) urgency = Math.max(urgency, URGENCY.habit);
    if ((field.retireDay.get(asset.tag) ?? Infinity) <= day) {
      urgency = Math.max(urgency, URGENCY.habit);
    }
  }
  if (urgency < URGENCY.silent && isClosed(site, day)) return 0;
  const next = field.nextLook.get(site.code) ?? Infinity;
  if (next <= day) urgency = Math.max(urgency, URGENCY.look + Math.min(50, day - next) / 5);
  return urgency;
}

/** Every site that calls on a day, with how urgently. */
export function callingSites(field: Field, day: number): Map<ScenarioSite, number> {
  const calling = new Map<ScenarioSite, number>();
  for (const site of field.sites) {
    const urgency = siteUrgency(field, site, day);
    if (urgency > 0) calling.set(site, urgency);
  }
  return calling;
}

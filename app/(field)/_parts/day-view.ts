import { findAsset } from "@/lib/offline/day";
import { dayNumber, dayOfInstant } from "@/lib/present/calendar-days";
import { formatTime } from "@/lib/present/format-time";
import { packTone } from "@/lib/present/tone";
import { waneDisc, type WaneDiscModel } from "@/lib/present/wane-disc";
import type { DayAsset, DayPack, DayRound, DayStop } from "@/lib/sync/day-pack";
import { TASK_WORDS } from "./field-words";

/** The stop whose turn it is: the first that is still open. */
export function nextStop(round: DayRound): DayStop | null {
  return round.stops.find((stop) => stop.state === "planned") ?? null;
}

/** A stop's name: its asset where there is one, else its site. */
export function stopTitle(day: DayPack, stop: DayStop): string {
  const [task, more] = stop.tasks;
  const asset = task && !more ? findAsset(day, task.assetId) : null;
  const site = day.sites.find((candidate) => candidate.id === stop.siteId);
  return asset?.name ?? site?.name ?? "Stop";
}

/** Why a stop's site lets nobody in at the time it stands at: "closes 15:00"; null when it does. */
export function closedThen(day: DayPack, stop: DayStop): string | null {
  const site = day.sites.find((candidate) => candidate.id === stop.siteId);
  const clock = (at: string) => formatTime(new Date(at), day.organisation).slice(0, 5);
  if (site?.opens && clock(stop.arrivesAt) < site.opens) return `opens ${site.opens}`;
  if (site?.closes && clock(stop.departsAt) > site.closes) return `closes ${site.closes}`;
  return null;
}

/** "1 × ER34615", "2 swaps · 4 × LR20, 2 × LR6", "1 to read". */
export function stopWork(day: DayPack, stop: DayStop): string {
  const swaps = stop.tasks.filter((task) => task.kind === "swap");
  const others = stop.tasks.length - swaps.length;
  const byType = new Map<string, number>();
  for (const task of swaps) {
    const cell = day.cellTypes.find((candidate) => candidate.id === task.cellTypeId);
    const name = cell?.designation ?? "cells";
    byType.set(name, (byType.get(name) ?? 0) + task.cells);
  }
  const cells = [...byType].map(([name, count]) => `${count} × ${name}`).join(", ");
  const parts = [
    swaps.length > 1 ? `${swaps.length} swaps` : "",
    cells,
    others > 0 ? `${others} to ${others === 1 ? TASK_WORDS.read : "look at"}` : "",
  ];
  return parts.filter(Boolean).join(" · ") || "nothing planned";
}

const FRESH_DAYS = 3;

/** A pack put in so lately that no forecast of it can have come yet. */
export function isFresh(day: DayPack, pack: DayAsset["pack"]): boolean {
  const madeDay = Date.parse(day.madeAt) / 86_400_000;
  return pack !== null && !pack.forecast && madeDay - pack.installedDay < FRESH_DAYS;
}

/** The disc of the pack in an asset; null where nothing is known of it. */
export function assetDisc(day: DayPack, assetId: string | undefined): WaneDiscModel | null {
  const asset = assetId ? findAsset(day, assetId) : null;
  return asset?.pack ? discOf(day, asset) : null;
}

export function discOf(day: DayPack, asset: DayAsset): WaneDiscModel {
  const { locale, timeZone } = day.organisation;
  const forecast = asset.pack?.forecast ?? null;
  const isOut = (asset.pack?.events ?? []).some((event) => event.kind === "stopped");
  const today = dayNumber(dayOfInstant(new Date(day.madeAt), timeZone));
  const daysToLikely = forecast
    ? dayNumber(dayOfInstant(new Date(forecast.p50), timeZone)) - today
    : null;
  return waneDisc({
    share: forecast ? forecast.sharePermille / 1000 : null,
    isOut,
    tone: packTone({ isOut, daysToLikely }),
    locale,
  });
}

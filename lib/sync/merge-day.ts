/**
 * What the phone shows: the server's day with this person's own entries laid over it, so that what
 * was done stays done whether or not it has been sent. Pure, and idempotent: an entry that the
 * day holds already changes nothing.
 */
import type { DayAsset, DayPack, DayRound, DayStop, DayTask } from "./day-pack";
import type { EntryBody } from "./entries";
import type { OutboxEntry } from "./outbox";
import { reordered } from "./round-order";

const MS_PER_DAY = 86_400_000;

type Body<Kind> = Extract<EntryBody, { kind: Kind }>;

/** Lays one person's entries over their day. Refused ones count as not having happened. */
export function mergeDay(day: DayPack, entries: readonly OutboxEntry[]): DayPack {
  return entries
    .filter((entry) => entry.personId === day.person.id && entry.state !== "refused")
    .sort((a, b) => a.seq - b.seq)
    .filter(isLastOrder)
    .reduce(lay, day);
}

/** Of several orders of one round only the last counts: it names every stop. */
function isLastOrder({ body }: OutboxEntry, n: number, entries: readonly OutboxEntry[]): boolean {
  if (body.kind !== "reorder") return true;
  const { roundId } = body;
  return !entries
    .slice(n + 1)
    .some((later) => later.body.kind === "reorder" && later.body.roundId === roundId);
}

function lay(day: DayPack, entry: OutboxEntry): DayPack {
  const { body, happenedAt: at } = entry;
  switch (body.kind) {
    case "reading":
      return tick(withReading(day, entry.id, at, body), body, at, ["read", "inspect"]);
    case "swap":
      return tick(withSwap(day, entry.id, at, body), body, at, ["swap", "read", "inspect"]);
    case "cannot":
      return onStop(day, body.stopId, at, (stop) =>
        stop.state === "done" ? stop : cannot(stop, body),
      );
    case "stop-done":
      return onStop(day, body.stopId, at, (stop) => done(stop, at));
    case "reorder":
      return onRound(day, body.roundId, (round) => inOrder(day, round, body.stopIds, at));
    case "round":
      return onRound(day, body.roundId, (round) => actOn(round, body.act));
    case "note":
    case "load-check":
      return day;
  }
}

function inOrder(day: DayPack, round: DayRound, stopIds: readonly string[], at: string): DayRound {
  const stops = stopsInOrder(day, round, stopIds);
  return { ...round, stops, reorderedAt: at, orderReplacedAt: null };
}

/** A round's stops in another order, their times reckoned anew. */
export function stopsInOrder(
  day: DayPack,
  round: DayRound,
  stopIds: readonly string[],
): readonly DayStop[] {
  const sites = new Map(day.sites.map((site) => [site.id, site]));
  return reordered(round.stops, stopIds, (stop) => sites.get(stop.siteId) ?? null);
}

function actOn(round: DayRound, act: "started" | "done"): DayRound {
  return act === "done" || round.state === "published" ? { ...round, state: act } : round;
}

function onRound(day: DayPack, id: string, change: (round: DayRound) => DayRound): DayPack {
  return { ...day, rounds: day.rounds.map((round) => (round.id === id ? change(round) : round)) };
}

/** A first act at a stop starts its round. */
function onStop(day: DayPack, id: string, at: string, change: (stop: DayStop) => DayStop): DayPack {
  const round = day.rounds.find((candidate) => candidate.stops.some((stop) => stop.id === id));
  if (!round) return day;
  return onRound(day, round.id, (found) => ({
    ...actOn(found, "started"),
    stops: found.stops.map((stop) => (stop.id === id ? change(stop) : stop)),
  }));
}

function cannot(stop: DayStop, body: Body<"cannot">): DayStop {
  const { reason: cannotReason, returnOn } = body;
  return { ...stop, state: "cannot_do", cannotReason, returnOn, tasks: stop.tasks.map(closed) };
}

function done(stop: DayStop, at: string): DayStop {
  if (stop.state === "done") return stop;
  const tasks = stop.tasks.map(closed);
  return { ...stop, state: "done", doneAt: at, cannotReason: null, returnOn: null, tasks };
}

function closed(task: DayTask): DayTask {
  return task.state === "planned" ? { ...task, state: "not_done" } : task;
}

/** Ticks off the open task at the stop the work was done at; without one, nothing. */
function tick(
  day: DayPack,
  work: { readonly assetId: string; readonly stopId: string | null },
  at: string,
  kinds: readonly string[],
): DayPack {
  if (!work.stopId) return day;
  return onStop(day, work.stopId, at, (stop) => {
    const task = stop.tasks.find(
      (t) => t.assetId === work.assetId && kinds.includes(t.kind) && t.state !== "done",
    );
    if (!task) return stop;
    const tasks = stop.tasks.map((t) => (t === task ? { ...t, state: "done" as const } : t));
    const next = { ...stop, tasks };
    return tasks.some((t) => t.state === "planned") ? next : done(next, at);
  });
}

function onAsset(day: DayPack, id: string, change: (asset: DayAsset) => DayAsset): DayPack {
  return { ...day, assets: day.assets.map((asset) => (asset.id === id ? change(asset) : asset)) };
}

const dayOf = (instant: string): number => Date.parse(instant) / MS_PER_DAY;

function withReading(day: DayPack, id: string, at: string, body: Body<"reading">): DayPack {
  const { millivolts, mode: kind, loadUa, temperatureDc } = body;
  const reading = { id, atDay: dayOf(at), millivolts, kind, loadUa, temperatureDc };
  return onAsset(day, body.assetId, (asset) => {
    const { pack } = asset;
    const other = body.packId !== null && pack?.id !== body.packId;
    if (!pack || other || pack.readings.some((known) => known.id === id)) return asset;
    const readings = [...pack.readings, { ...reading, accuracyMv: null }];
    readings.sort((a, b) => a.atDay - b.atDay);
    return { ...asset, pack: { ...pack, readings } };
  });
}

function withSwap(day: DayPack, id: string, at: string, body: Body<"swap">): DayPack {
  const asset = day.assets.find((candidate) => candidate.id === body.assetId);
  const known = asset?.pack?.id === body.newPackId;
  const elsewhere = asset?.pack && body.oldPackId !== null && asset.pack.id !== body.oldPackId;
  if (!asset || known || elsewhere) return day;
  const model = day.models.find((candidate) => candidate.id === asset.modelId);
  const lot = day.van?.lots.find((candidate) => candidate.lotId === body.lotId);
  const series = model?.series ?? asset.pack?.series ?? 1;
  const parallel = model?.parallel ?? asset.pack?.parallel ?? 1;
  const first = { id, atDay: dayOf(at), kind: "loaded" as const, loadUa: null };
  const mv = body.voltageInMv;
  const pack = {
    id: body.newPackId,
    cellTypeId: body.cellTypeId,
    lotCode: lot?.code ?? null,
    ...{ series, parallel, installedDay: dayOf(at) },
    madeDay: lot?.madeOn ? dayOf(lot.madeOn) : null,
    measuredDraw: asset.pack?.measuredDraw ?? null,
    readings:
      mv === null ? [] : [{ ...first, millivolts: mv, temperatureDc: null, accuracyMv: null }],
    events: [],
    forecast: null,
  };
  return takeFromVan(
    onAsset(day, body.assetId, (found) => ({ ...found, pack, worth: null })),
    body,
    series * parallel,
  );
}

function takeFromVan(day: DayPack, body: Body<"swap">, cells: number): DayPack {
  const { van } = day;
  if (!van || body.fromPlaceId !== van.placeId || !body.lotId) return day;
  const lots = van.lots.map((lot) =>
    lot.lotId === body.lotId ? { ...lot, cells: Math.max(0, lot.cells - cells) } : lot,
  );
  return { ...day, van: { ...van, lots } };
}

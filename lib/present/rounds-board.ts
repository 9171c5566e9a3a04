import type { IsoDay } from "@/lib/units";
import { dayNumber, dayOfInstant } from "./calendar-days";
import { type DayBarModel, dayBar, type Leg } from "./day-bar";
import { formatDay } from "./format-day";
import { formatDistance, formatMoney } from "./format-quantity";
import { formatDuration, formatHours, formatTime } from "./format-time";
import { OUT_PERMILLE } from "./horizon";
import { formatNumber, type Presentation } from "./locale";
import { packTone } from "./tone";
import { type WaneDiscModel, waneDisc } from "./wane-disc";

export interface BoardTaskInput {
  readonly kind: string;
  readonly state: string;
  readonly assetId: string;
  readonly tag: string;
  readonly assetName: string;
  readonly designation: string | null;
  readonly cells: number;
  readonly shareLeftPermille: number | null;
  readonly outNowPermille: number | null;
  readonly p50: Date | null;
}

export interface BoardStopInput {
  readonly stopId: string;
  readonly siteId: string;
  readonly siteName: string;
  readonly position: number;
  readonly state: string;
  readonly locked: boolean;
  readonly arrivesAt: Date;
  readonly departsAt: Date;
  readonly latitude: number;
  readonly longitude: number;
  readonly keyCode: string | null;
  readonly tasks: readonly BoardTaskInput[];
}

export interface BoardRoundInput {
  readonly roundId: string;
  readonly technicianId: string;
  readonly technicianName: string;
  readonly day: IsoDay;
  readonly state: string;
  readonly startsAt: Date;
  readonly endsAt: Date;
  readonly driveS: number;
  readonly workS: number;
  readonly distanceM: number;
  readonly overtimeS: number;
  readonly shiftS: number;
  readonly depot: { readonly latitude: number; readonly longitude: number };
  readonly stops: readonly BoardStopInput[];
}

export interface BoardTask {
  readonly assetId: string;
  readonly tag: string;
  readonly name: string;
  /** "2 × LR20", "read", "inspect". */
  readonly work: string;
  readonly disc: WaneDiscModel;
}

export interface BoardStop {
  readonly stopId: string;
  readonly siteId: string;
  readonly siteName: string;
  readonly position: number;
  readonly time: string;
  readonly state: string;
  readonly locked: boolean;
  readonly latitude: number;
  readonly longitude: number;
  readonly tasks: readonly BoardTask[];
}

export interface BoardRound {
  readonly roundId: string;
  readonly technicianId: string;
  readonly day: IsoDay;
  readonly state: string;
  readonly title: string;
  /** "8 stops · 61 km · 6 h 50 min". */
  readonly summary: string;
  readonly stopsLabel: string;
  readonly hours: string;
  readonly over: boolean;
  /** Everything to load, and the same in short. */
  readonly load: string;
  readonly loadShort: string;
  readonly bar: DayBarModel;
  readonly depot: { readonly latitude: number; readonly longitude: number };
  readonly stops: readonly BoardStop[];
}

/** Cell types named in a cell of the board; the rest are counted. */
const TYPES_NAMED = 2;

function cellCounts(stops: readonly BoardStopInput[]): [string, number][] {
  const cells = new Map<string, number>();
  for (const { kind, designation, cells: count } of stops.flatMap((stop) => stop.tasks)) {
    if (kind === "swap" && designation) {
      cells.set(designation, (cells.get(designation) ?? 0) + count);
    }
  }
  return [...cells].sort((a, b) => b[1] - a[1]);
}

function keysOf(stops: readonly BoardStopInput[]): string[] {
  return [...new Set(stops.flatMap((stop) => stop.keyCode ?? []))];
}

/** Everything to load: "12 LR20 · 4 LR6 · keys K3, K14". */
export function loadWords(stops: readonly BoardStopInput[]): string {
  const keys = keysOf(stops);
  const parts = cellCounts(stops).map(([designation, count]) => `${count} ${designation}`);
  if (keys.length > 0) parts.push(`${keys.length === 1 ? "key" : "keys"} ${keys.join(", ")}`);
  return parts.join(" · ");
}

/** The same in one or two lines: "12 LR20 · 4 LR6 · 3 more types · 2 keys". */
export function loadInShort(stops: readonly BoardStopInput[]): string {
  const cells = cellCounts(stops);
  const keys = keysOf(stops);
  // One more type is named as quickly as counted.
  const named = cells.length <= TYPES_NAMED + 1 ? cells : cells.slice(0, TYPES_NAMED);
  const parts = named.map(([designation, count]) => `${count} ${designation}`);
  if (cells.length > named.length) parts.push(`${cells.length - named.length} more types`);
  if (keys.length === 1) parts.push(`key ${keys[0]}`);
  if (keys.length > 1) parts.push(`${keys.length} keys`);
  return parts.join(" · ");
}

/** A round in finished words and marks. */
export function boardRound(
  round: BoardRoundInput,
  today: IsoDay,
  presentation: Presentation,
): BoardRound {
  const { locale } = presentation;
  const dutyS = (round.endsAt.getTime() - round.startsAt.getTime()) / 1000;
  const count = round.stops.length;
  const stopsLabel = count === 1 ? "1 stop" : `${formatNumber(count, locale)} stops`;
  const day = formatDay(round.day, locale, { weekday: true, today });
  return {
    roundId: round.roundId,
    technicianId: round.technicianId,
    day: round.day,
    state: round.state,
    title: `${day} · ${round.technicianName}`,
    summary: `${stopsLabel} · ${formatDistance(round.distanceM, locale)} · ${formatDuration(dutyS, locale)}`,
    stopsLabel,
    hours: formatHours(dutyS, locale),
    over: round.overtimeS > 0,
    load: loadWords(round.stops),
    loadShort: loadInShort(round.stops),
    bar: dayBar({ shiftS: round.shiftS, legs: legsOf(round), locale }),
    depot: round.depot,
    stops: round.stops.map((stop) => boardStop(stop, today, presentation)),
  };
}

function legsOf(round: BoardRoundInput): Leg[] {
  const at = (time: Date) => (time.getTime() - round.startsAt.getTime()) / 1000;
  const legs: Leg[] = [];
  let from = 0;
  for (const stop of round.stops) {
    legs.push({ kind: "drive", fromS: from, toS: at(stop.arrivesAt) });
    legs.push({ kind: "work", fromS: at(stop.arrivesAt), toS: at(stop.departsAt) });
    from = at(stop.departsAt);
  }
  return [...legs, { kind: "drive", fromS: from, toS: at(round.endsAt) }];
}

function boardStop(stop: BoardStopInput, today: IsoDay, presentation: Presentation): BoardStop {
  const { stopId, siteId, siteName, position, state, locked, latitude, longitude } = stop;
  return {
    ...{ stopId, siteId, siteName, position, state, locked, latitude, longitude },
    time: formatTime(stop.arrivesAt, presentation),
    tasks: stop.tasks.map((task) => boardTask(task, today, presentation)),
  };
}

function boardTask(task: BoardTaskInput, today: IsoDay, presentation: Presentation): BoardTask {
  return {
    assetId: task.assetId,
    tag: task.tag,
    name: task.assetName,
    work: task.kind === "swap" ? `${task.cells} × ${task.designation ?? "cells"}` : task.kind,
    disc: packDisc(task, today, presentation),
  };
}

/** The wane disc of a pack from its stored forecast. */
export function packDisc(
  pack: Pick<BoardTaskInput, "shareLeftPermille" | "outNowPermille" | "p50">,
  today: IsoDay,
  { locale, timeZone }: Presentation,
): WaneDiscModel {
  const isOut = (pack.outNowPermille ?? 0) >= OUT_PERMILLE;
  const share = pack.shareLeftPermille === null ? null : pack.shareLeftPermille / 1000;
  const daysToLikely = pack.p50
    ? dayNumber(dayOfInstant(pack.p50, timeZone)) - dayNumber(today)
    : null;
  return waneDisc({ share, isOut, tone: packTone({ isOut, daysToLikely }), locale });
}

export interface ActPriceInput {
  readonly dutyS: number;
  readonly overtimeS: number;
  readonly costMinor: number;
  readonly riskMinor: number;
  readonly totalMinor: number;
  readonly refusals: readonly string[];
}

export interface ActPriceWords {
  readonly allowed: boolean;
  /** "+£12 · +0.4 h · risk −£3", or the reason. */
  readonly words: string;
  /** "+£9": the whole change, for a cell of the board. */
  readonly short: string;
  readonly cheaper: boolean;
}

/** What an act does, in words. */
export function actPriceWords(price: ActPriceInput, presentation: Presentation): ActPriceWords {
  if (price.refusals.length > 0) {
    return { allowed: false, words: price.refusals.join("; "), short: "no", cheaper: false };
  }
  const { locale } = presentation;
  const signed = (minor: number) => {
    const text = formatMoney(Math.abs(minor), presentation, { whole: true });
    // The word joiner keeps the sign on the line of its number.
    return Math.abs(minor) < 50 ? "±0" : `${minor < 0 ? "−" : "+"}\u2060${text}`;
  };
  const hours = Math.round(price.dutyS / 360) / 10;
  const duty =
    hours === 0 ? "±0 h" : `${hours < 0 ? "−" : "+"}${formatHours(Math.abs(price.dutyS), locale)}`;
  const over =
    Math.abs(price.overtimeS) >= 60
      ? ` · overtime ${price.overtimeS < 0 ? "−" : "+"}${formatDuration(Math.abs(price.overtimeS), locale)}`
      : "";
  return {
    allowed: true,
    words: `${duty} · crew and van ${signed(price.costMinor)} · risk ${signed(price.riskMinor)}${over}`,
    short: signed(price.totalMinor),
    cheaper: price.totalMinor < -50,
  };
}

import type { ScenarioAsset } from "./assets";
import { modelByCode } from "./device-models";
import type { Field } from "./field";
import type { ScenarioRound, ScenarioStop, ScenarioTask } from "./field-log";
import { distance, type Point } from "./geometry";
import { localDay, localInstant, weekdayOf } from "./local-time";
import { workOnAsset } from "./site-visit";
import type { ScenarioSite } from "./sites";
import type { ScenarioTechnician } from "./staff";

/** Great circle × detour over road speed: the organisation's own first assumption. */
const DETOUR = 1.3;
const METRES_PER_MINUTE = 45_000 / 60;
const WALK_UP_MINUTES = 6;
const MARGIN_MINUTES = 30;
const SETTING_OUT_MINUTES = 15;

function driveMinutes(from: Point, to: Point): number {
  return (distance(from, to) * DETOUR) / METRES_PER_MINUTE;
}

export interface DaySheet {
  readonly technician: ScenarioTechnician;
  readonly day: number;
  readonly mostStops: number;
  readonly calling: ReadonlyMap<ScenarioSite, number>;
  /** Work is done and logged, or only booked for a day to come. */
  readonly booked: boolean;
}

/** Sites this technician may visit, the most urgent first; sites already taken left out. */
function sitesFor(sheet: DaySheet, taken: ReadonlySet<string>): ScenarioSite[] {
  const { technician } = sheet;
  return [...sheet.calling]
    .filter(([s]) => s.bank === technician.bank && !taken.has(s.code))
    .filter(([s]) => s.tickets.every((t) => technician.tickets.includes(t)))
    .sort(([, a], [, b]) => b - a)
    .map(([site]) => site);
}

/** The most urgent half, then what lies near them: in the order of nearest next. */
function chooseStops(calling: readonly ScenarioSite[], depot: Point, most: number): ScenarioSite[] {
  const must = calling.slice(0, Math.ceil(most / 2));
  const rest = calling
    .slice(must.length)
    .map((site) => ({ site, near: Math.min(...must.map((m) => distance(m.at, site.at))) }))
    .sort((a, b) => a.near - b.near)
    .slice(0, most - must.length)
    .map(({ site }) => site);
  const open = [...must, ...rest];
  const ordered: ScenarioSite[] = [];
  let here = depot;
  while (open.length > 0) {
    open.sort((a, b) => distance(here, a.at) - distance(here, b.at));
    const next = open.shift() as ScenarioSite;
    ordered.push(next);
    here = next.at;
  }
  return ordered;
}

/** Without a habit of its own, a pack of this age is swapped when somebody comes by. */
const USUAL_HABIT_DAYS = 300;

/** Booked work follows the habit of the years before: old packs are swapped, others read. */
function bookedTask(field: Field, asset: ScenarioAsset, day: number): ScenarioTask | null {
  const pack = field.log.installed.get(asset.tag);
  if (!pack) return null;
  const habit = modelByCode(asset.modelCode).habitIntervalDays ?? USUAL_HABIT_DAYS;
  const old = day - localDay(pack.installedAt) > 0.8 * habit;
  return {
    assetTag: asset.tag,
    kind: old ? "swap" : "read",
    packKey: pack.key,
    designation: old ? asset.designation : null,
    cells: old ? pack.series * pack.parallel : 0,
  };
}

function visit(
  field: Field,
  sheet: DaySheet,
  site: ScenarioSite,
  arrival: number,
): { readonly stop: ScenarioStop; readonly leaves: number } | null {
  const tasks: ScenarioTask[] = [];
  let minutes = arrival + WALK_UP_MINUTES;
  for (const asset of field.assetsAt.get(site.code) ?? []) {
    const at = localInstant(sheet.day, minutes);
    const task = sheet.booked
      ? bookedTask(field, asset, sheet.day)
      : workOnAsset(field, asset, sheet.technician, sheet.day, at);
    if (!task) continue;
    const model = modelByCode(asset.modelCode);
    minutes += task.kind === "swap" ? model.swapMinutes : model.readMinutes;
    tasks.push(task);
  }
  if (tasks.length === 0) return null;
  const leaves = Math.round(minutes);
  const stop = {
    siteCode: site.code,
    arrivesAt: localInstant(sheet.day, arrival),
    departsAt: localInstant(sheet.day, leaves),
    tasks,
  };
  return { stop, leaves };
}

interface Driven {
  readonly stops: readonly ScenarioStop[];
  readonly minutes: number;
  readonly metres: number;
  readonly home: number;
}

/** Drives from stop to stop while the shift lasts. */
function drive(
  field: Field,
  sheet: DaySheet,
  depot: Point,
  shift: readonly [number, number],
  taken: Set<string>,
): Driven {
  let here = depot;
  let clock = shift[0] + SETTING_OUT_MINUTES;
  let minutes = 0;
  let metres = 0;
  const stops: ScenarioStop[] = [];
  for (const site of chooseStops(sitesFor(sheet, taken), depot, sheet.mostStops)) {
    const leg = driveMinutes(here, site.at);
    const arrival = Math.max(Math.ceil(clock + leg), site.hours?.[0] ?? 0);
    const stay = WALK_UP_MINUTES + 20 * (field.assetsAt.get(site.code)?.length ?? 1);
    if (arrival + stay + driveMinutes(site.at, depot) > shift[1] - MARGIN_MINUTES) continue;
    if (site.hours && arrival + stay > site.hours[1]) continue;
    const done = visit(field, sheet, site, arrival);
    if (!done) continue;
    taken.add(site.code);
    stops.push(done.stop);
    minutes += leg;
    metres += distance(here, site.at) * DETOUR;
    clock = done.leaves;
    here = site.at;
  }
  const last = driveMinutes(here, depot);
  metres += distance(here, depot) * DETOUR;
  return { stops, minutes: minutes + last, metres, home: Math.ceil(clock + last) };
}

/** One technician's day: goes out, visits what fits in the shift, drives home. Null: stayed in. */
export function runDay(field: Field, sheet: DaySheet, taken: Set<string>): ScenarioRound | null {
  const { technician, day } = sheet;
  const shift = technician.shifts[weekdayOf(day)];
  const depot = field.district.depots.find((d) => d.bank === technician.bank)?.at;
  if (!depot || !shift) return null;
  const { stops, minutes, metres, home } = drive(field, sheet, depot, shift, taken);
  if (stops.length === 0) return null;
  const work = stops.map((s) => (s.departsAt.getTime() - s.arrivesAt.getTime()) / 1000);
  return {
    technicianKey: technician.key,
    day,
    state: sheet.booked ? "published" : "done",
    startsAt: localInstant(day, shift[0] + SETTING_OUT_MINUTES),
    endsAt: localInstant(day, home),
    driveS: Math.round(minutes * 60),
    workS: work.reduce((sum, s) => sum + s, 0),
    distanceM: Math.round(metres),
    stops,
  };
}

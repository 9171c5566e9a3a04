/** From technicians, visits and a travel table to the routing engine's problem. */
import type { IsoDay } from "@/lib/units";
import {
  type DayWindow,
  LARGEST_INTEGER,
  type Problem,
  type Site,
  type Slot,
} from "../routing/problem";
import type { CellsOnHand } from "./due";
import { CHANGE_MINOR, COST_UNITS_A_MINOR, LOADING_S, OVERTIME_S } from "./assumptions";
import {
  TICKETS,
  type KnownVisit,
  type PlanningFrame,
  type PlanningPrices,
  type PlanningTechnician,
  type PointOnEarth,
  type Ticket,
  type TravelTable,
} from "./fleet";
import {
  addDays,
  daysBetween,
  daysFrom,
  elapsedOfInstant,
  elapsedOfWall,
  localDay,
  weekdayOf,
} from "./local-time";
import { startWindow } from "./site-days";
import type { Visit } from "./visit";

/** One technician on one day. */
export interface SlotKey {
  readonly technician: PlanningTechnician;
  readonly day: IsoDay;
}

/** The problem with the names of its sites and slots. */
export interface RoundsProblem {
  readonly frame: PlanningFrame;
  readonly problem: Problem;
  readonly slots: readonly SlotKey[];
  readonly visits: readonly Visit[];
  readonly cellTypeIds: readonly string[];
}

/** Why a technician does not work on a day; null when they do. */
export function whyNotWorking(
  technician: PlanningTechnician,
  day: IsoDay,
): { readonly kind: "absent" | "no_shift" | "taken"; readonly reason: string } | null {
  const away = technician.absences.find((a) => a.firstDay <= day && day <= a.lastDay);
  if (away) return { kind: "absent", reason: away.reason };
  const weekday = weekdayOf(day);
  if (!technician.shifts.some((shift) => shift.weekday === weekday)) {
    return { kind: "no_shift", reason: "" };
  }
  return technician.takenDays.includes(day) ? { kind: "taken", reason: "" } : null;
}

/** Technician-days of the frame on which somebody can still drive, days before today left out. */
export function slotKeys(
  technicians: readonly PlanningTechnician[],
  frame: PlanningFrame,
): SlotKey[] {
  const today = localDay(frame.now, frame.timeZone);
  return daysFrom(frame.firstDay, frame.lastDay)
    .filter((day) => day >= today)
    .flatMap((day) => technicians.map((technician) => ({ technician, day })))
    .filter(({ technician, day }) => whyNotWorking(technician, day) === null)
    .filter((key) => key.day > today || shiftOf(key, frame).startS < shiftOf(key, frame).endS);
}

/** When a slot's driving may start and should end; today nobody starts before now. */
function shiftOf({ technician, day }: SlotKey, frame: PlanningFrame) {
  const shift = technician.shifts.find((s) => s.weekday === weekdayOf(day))!;
  const at = (wallS: number) => elapsedOfWall(day, wallS, frame.timeZone);
  const now = elapsedOfInstant(day, frame.now, frame.timeZone);
  const begins = at(shift.startsS);
  const earliest = day === localDay(frame.now, frame.timeZone) ? Math.max(begins, now) : begins;
  return { startS: earliest + LOADING_S, endS: at(shift.endsS) };
}

/** The break of a slot's shift, on its axis; what is left of it where the slot begins late. */
function breaksOf({ technician, day }: SlotKey, frame: PlanningFrame): DayWindow[] {
  const pause = technician.shifts.find((s) => s.weekday === weekdayOf(day))?.pause;
  if (!pause) return [];
  const at = (wallS: number) => elapsedOfWall(day, wallS, frame.timeZone);
  const openS = Math.max(at(pause.startsS), shiftOf({ technician, day }, frame).startS);
  const closeS = at(pause.endsS);
  return openS < closeS ? [{ openS, closeS }] : [];
}

/** Places of the travel table: every technician's depot, then every visit's site. */
export function placesOf(
  technicians: readonly PlanningTechnician[],
  visits: readonly Visit[],
): PointOnEarth[] {
  return [...technicians.map((t) => t.depot), ...visits.map((v) => v.site)];
}

function ticketMask(tickets: readonly Ticket[]): number {
  return tickets.reduce((mask, ticket) => mask | (1 << TICKETS.indexOf(ticket)), 0);
}

function units(minor: number): number {
  return Math.max(0, Math.min(LARGEST_INTEGER, Math.round(minor * COST_UNITS_A_MINOR)));
}

interface Parts {
  readonly frame: PlanningFrame;
  readonly prices: PlanningPrices;
  readonly technicians: readonly PlanningTechnician[];
  readonly visits: readonly Visit[];
  readonly travel: TravelTable;
  /** Visits that people know already; locked ones stay, moving others has a price. */
  readonly known: readonly KnownVisit[];
  readonly stock: CellsOnHand | null;
}

/**
 * Cells on hand by type, the same on every day. What known visits were promised is theirs, even
 * where stores hold less by now: publishing names the shortage, a plan does not undo the promise.
 */
function stockOf({ stock, known, frame }: Parts, cellTypeIds: readonly string[]) {
  if (!stock) return {};
  const days = daysFrom(frame.firstDay, frame.lastDay);
  const tasks = known.flatMap((visit) => visit.tasks);
  const cells = cellTypeIds.map((id) => {
    const promised = tasks.filter((task) => task.cellTypeId === id);
    const sum = promised.reduce((total, task) => total + task.cells, 0);
    return Math.min(LARGEST_INTEGER, Math.max(0, sum, stock.get(id) ?? 0));
  });
  return { stock: cells.map((most) => days.map(() => most)) };
}

function slotOf(key: SlotKey, parts: Parts, cellTypeIds: readonly string[]): Slot {
  const { technician, day } = key;
  const place = parts.technicians.indexOf(technician);
  const vanCells = technician.vanCells ?? LARGEST_INTEGER;
  return {
    id: `${technician.name} ${day}`,
    technician: place,
    day: daysBetween(parts.frame.firstDay, day),
    startPlace: place,
    endPlace: place,
    ...shiftOf(key, parts.frame),
    overtimeS: OVERTIME_S,
    overtimePerS: perSecond(
      Math.max(0, parts.prices.overtimeMinorPerHour - parts.prices.crewMinorPerHour),
    ),
    breaks: breaksOf(key, parts.frame),
    capacity: cellTypeIds.map(() => vanCells),
    capacityTotal: vanCells,
    skills: ticketMask(technician.tickets),
    openingCost: units((LOADING_S / 3600) * parts.prices.crewMinorPerHour),
    frozen: [],
  };
}

function perSecond(minorPerHour: number): number {
  return Math.round((minorPerHour * COST_UNITS_A_MINOR) / 3600);
}

/** Where a known visit stands, with the price of changing it; nothing where its slot is gone. */
function standing(
  known: KnownVisit | undefined,
  slots: readonly SlotKey[],
): Pick<Site, "lockedTo" | "previous"> {
  const slot = slots.findIndex(
    ({ technician, day }) => technician.technicianId === known?.technicianId && day === known.day,
  );
  if (!known || slot < 0) return {};
  if (known.untold) return known.locked ? { lockedTo: slot } : {};
  const dayCost = units(CHANGE_MINOR.day);
  const technicianCost = units(CHANGE_MINOR.technician);
  const dropCost = units(CHANGE_MINOR.drop);
  const previous = { slot, dayCost, technicianCost, dropCost };
  return known.locked ? { previous, lockedTo: slot } : { previous };
}

function siteOf(
  visit: Visit,
  index: number,
  parts: Parts,
  slots: readonly SlotKey[],
  cellTypeIds: readonly string[],
): Site {
  const { firstDay, lastDay, now, timeZone } = parts.frame;
  const { site, serviceS } = visit;
  const days = daysFrom(firstDay, lastDay);
  const lowest = Math.min(visit.laterMinor, ...visit.dayMinor);
  const known = parts.known.find((k) => k.siteId === site.siteId);
  const noticeUntil = addDays(localDay(now, timeZone), site.noticeDays);
  return {
    id: site.name,
    place: parts.technicians.length + index,
    serviceS,
    windows: days.map((day) => startWindow(site, day, serviceS, timeZone)),
    visitCost: visit.dayMinor.map((minor) => units(minor - lowest)),
    skipCost: units(visit.laterMinor - lowest),
    must: false,
    skills: ticketMask(site.tickets),
    demand: cellTypeIds.map((id) => visit.cells.get(id) ?? 0),
    firstDay: Math.max(0, daysBetween(firstDay, noticeUntil)),
    ...standing(known, slots),
  };
}

/** Builds the routing problem. `travel` covers `placesOf(technicians, visits)` in that order. */
export function roundsProblem(parts: Parts): RoundsProblem {
  const { frame, prices, technicians, visits, travel } = parts;
  const slots = slotKeys(technicians, frame);
  const cellTypeIds = [...new Set(visits.flatMap((visit) => [...visit.cells.keys()]))].sort();
  const problem: Problem = {
    days: daysBetween(frame.firstDay, frame.lastDay) + 1,
    cellTypes: cellTypeIds.length,
    sites: visits.map((visit, i) => siteOf(visit, i, parts, slots, cellTypeIds)),
    slots: slots.map((key) => slotOf(key, parts, cellTypeIds)),
    ...stockOf(parts, cellTypeIds),
    places: technicians.length + visits.length,
    travelS: travel.seconds,
    travelM: travel.metres,
    prices: {
      drivingPerS: 0,
      dutyPerS: perSecond(prices.crewMinorPerHour),
      perM: Math.round((prices.travelMinorPerKm * COST_UNITS_A_MINOR) / 1000),
    },
  };
  return { frame, problem, slots, visits, cellTypeIds };
}

/** The routes in which the known visits stand; visits whose slot is gone are left out. */
export function knownRoutes(
  { slots, visits }: RoundsProblem,
  known: readonly KnownVisit[],
): number[][] {
  const siteIndex = new Map(visits.map((visit, i) => [visit.site.siteId, i]));
  return slots.map(({ technician, day }) =>
    known
      .filter((k) => k.technicianId === technician.technicianId && k.day === day)
      .sort((a, b) => a.position - b.position)
      .flatMap((k) => siteIndex.get(k.siteId) ?? []),
  );
}

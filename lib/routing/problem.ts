/**
 * The routing problem: which site is visited on which technician-day, in which order.
 *
 * Integers only. Times are seconds from the local midnight of the slot's day, lengths are
 * metres, costs are whole units of whatever the caller prices in (a thousandth of a minor
 * currency unit keeps rounding out of sight). Sites and slots are named by their index.
 */
import { invalid, type Fault } from "../errors";
import type { Metres, Seconds } from "../units";

/** A stretch of one day, both ends included. */
export interface DayWindow {
  readonly openS: Seconds;
  readonly closeS: Seconds;
}

/** Where a site stood in the plan that people already know, and what changing it costs. */
export interface PreviousVisit {
  readonly slot: number;
  /** Charged when the visit moves to another day. */
  readonly dayCost: number;
  /** Charged when the visit goes to another technician. */
  readonly technicianCost: number;
  /** Charged, beside `skipCost`, when the visit is dropped. */
  readonly dropCost: number;
}

export interface Site {
  /** The caller's name of the site; only used in messages. */
  readonly id: string;
  /** Row and column in the travel matrices. Sites may share a place. */
  readonly place: number;
  /** Work on the spot; depends on the site alone. */
  readonly serviceS: Seconds;
  /**
   * When work may START, one entry a day; null where the site is closed that day.
   * Where work must also end before closing time, take `serviceS` off `closeS`.
   */
  readonly windows: readonly (DayWindow | null)[];
  /** What a visit on each day costs beside the drive: too early, or too late. */
  readonly visitCost: readonly number[];
  /** What leaving the site out costs. Not charged for a `must` site, which is reported instead. */
  readonly skipCost: number;
  readonly must: boolean;
  /** Tickets the technician needs, as a bit mask. */
  readonly skills: number;
  /** Cells to bring, by cell type. */
  readonly demand: readonly number[];
  /** First day on which the notice that the site asks for has run out. */
  readonly firstDay: number;
  /** A dispatcher's lock: the visit stays in this slot (its place in the order stays free). */
  readonly lockedTo?: number;
  readonly previous?: PreviousVisit;
}

/** One technician on one day: a route that may be driven, from depot to depot. */
export interface Slot {
  readonly id: string;
  readonly technician: number;
  readonly day: number;
  readonly startPlace: number;
  readonly endPlace: number;
  readonly startS: Seconds;
  readonly endS: Seconds;
  /** How far the return may lie beyond `endS`, and what each second of it costs. */
  readonly overtimeS: Seconds;
  readonly overtimePerS: number;
  /** Work and driving stand still during a break, wherever the technician is. */
  readonly breaks: readonly DayWindow[];
  /** Most cells of each type in the van, and of all types together. */
  readonly capacity: readonly number[];
  readonly capacityTotal: number;
  readonly skills: number;
  /** Charged once if the slot has any stop. */
  readonly openingCost: number;
  /**
   * Stops that are started or fixed in place: always first, in this order, never removed.
   * A stop locked at a position is written here together with those before it.
   * They keep their place even where a window or the shift is broken.
   */
  readonly frozen: readonly number[];
}

export interface Prices {
  readonly drivingPerS: number;
  /** Per second on duty: shift start to return, waiting included, breaks not. */
  readonly dutyPerS: number;
  readonly perM: number;
}

export interface Problem {
  readonly days: number;
  /** Length of every `demand` and `capacity`. */
  readonly cellTypes: number;
  readonly sites: readonly Site[];
  readonly slots: readonly Slot[];
  /** Side of the travel matrices. */
  readonly places: number;
  /** `travelS[from * places + to]`; need not be symmetric. */
  readonly travelS: ArrayLike<Seconds>;
  readonly travelM: ArrayLike<Metres>;
  readonly prices: Prices;
}

/** Site indices by slot, in driving order. */
export type Routes = readonly (readonly number[])[];

/** Largest time, price and matrix entry: keeps every sum inside 31 bits where it must be. */
export const LARGEST_INTEGER = 500_000_000;

type Report = (field: string, message: string) => void;

function wholeNumber(report: Report, field: string, value: number | undefined, from = 0): void {
  if (value === undefined || !Number.isInteger(value)) {
    report(field, `is ${String(value)}; give a whole number`);
  } else if (value < from || value > LARGEST_INTEGER) {
    report(field, `is ${value}; keep it between ${from} and ${LARGEST_INTEGER}`);
  }
}

function checkWindow(report: Report, field: string, window: DayWindow): void {
  wholeNumber(report, `${field}.openS`, window.openS);
  wholeNumber(report, `${field}.closeS`, window.closeS);
  if (window.closeS < window.openS) report(field, "closes before it opens; swap the two times");
}

function checkLength(report: Report, field: string, actual: number, expected: number): void {
  if (actual !== expected) report(field, `has ${actual} entries; give ${expected}`);
}

/** Reports the first entry that is wrong: a matrix has millions, and one mend is a start. */
function checkMatrix(
  report: Report,
  field: string,
  matrix: ArrayLike<number>,
  cells: number,
): void {
  checkLength(report, field, matrix.length, cells);
  for (let i = 0; i < matrix.length; i++) {
    const value = matrix[i]!;
    if (Number.isInteger(value) && value >= 0 && value <= LARGEST_INTEGER) continue;
    wholeNumber(report, `${field}[${i}]`, value);
    return;
  }
}

function checkIndex(report: Report, field: string, value: number, size: number): void {
  if (!Number.isInteger(value) || value < 0 || value >= size) {
    report(field, `is ${value}; give an index from 0 to ${size - 1}`);
  }
}

function checkSite(report: Report, problem: Problem, site: Site, field: string): void {
  checkIndex(report, `${field}.place`, site.place, problem.places);
  wholeNumber(report, `${field}.serviceS`, site.serviceS);
  wholeNumber(report, `${field}.skipCost`, site.skipCost);
  wholeNumber(report, `${field}.firstDay`, site.firstDay);
  checkLength(report, `${field}.windows`, site.windows.length, problem.days);
  checkLength(report, `${field}.visitCost`, site.visitCost.length, problem.days);
  checkLength(report, `${field}.demand`, site.demand.length, problem.cellTypes);
  site.windows.forEach((w, d) => w && checkWindow(report, `${field}.windows[${d}]`, w));
  site.visitCost.forEach((c, d) => wholeNumber(report, `${field}.visitCost[${d}]`, c));
  site.demand.forEach((q, t) => wholeNumber(report, `${field}.demand[${t}]`, q));
  if (site.lockedTo !== undefined) {
    checkIndex(report, `${field}.lockedTo`, site.lockedTo, problem.slots.length);
  }
  if (site.previous) {
    checkIndex(report, `${field}.previous.slot`, site.previous.slot, problem.slots.length);
    wholeNumber(report, `${field}.previous.dayCost`, site.previous.dayCost);
    wholeNumber(report, `${field}.previous.technicianCost`, site.previous.technicianCost);
    wholeNumber(report, `${field}.previous.dropCost`, site.previous.dropCost);
  }
}

function checkBreaks(report: Report, field: string, breaks: readonly DayWindow[]): void {
  breaks.forEach((pause, i) => {
    checkWindow(report, `${field}[${i}]`, pause);
    const before = breaks[i - 1];
    if (before && before.closeS > pause.openS) {
      report(`${field}[${i}]`, "starts before the break ahead of it ends; sort and separate them");
    }
  });
}

function checkSlot(report: Report, problem: Problem, slot: Slot, field: string): void {
  checkIndex(report, `${field}.day`, slot.day, problem.days);
  checkIndex(report, `${field}.startPlace`, slot.startPlace, problem.places);
  checkIndex(report, `${field}.endPlace`, slot.endPlace, problem.places);
  checkWindow(report, `${field} shift`, { openS: slot.startS, closeS: slot.endS });
  wholeNumber(report, `${field}.overtimeS`, slot.overtimeS);
  wholeNumber(report, `${field}.overtimePerS`, slot.overtimePerS);
  wholeNumber(report, `${field}.openingCost`, slot.openingCost);
  wholeNumber(report, `${field}.capacityTotal`, slot.capacityTotal);
  checkLength(report, `${field}.capacity`, slot.capacity.length, problem.cellTypes);
  slot.capacity.forEach((q, t) => wholeNumber(report, `${field}.capacity[${t}]`, q));
  checkBreaks(report, `${field}.breaks`, slot.breaks);
  slot.frozen.forEach((s, i) =>
    checkIndex(report, `${field}.frozen[${i}]`, s, problem.sites.length),
  );
}

function checkFrozenOnce(report: Report, problem: Problem): void {
  const seen = new Map<number, number>();
  problem.slots.forEach((slot, r) =>
    slot.frozen.forEach((site) => {
      const other = seen.get(site);
      if (other !== undefined) report(`slots[${r}].frozen`, `holds site ${site}, as slot ${other}`);
      const lockedTo = problem.sites[site]?.lockedTo;
      if (lockedTo !== undefined && lockedTo !== r) {
        report(`slots[${r}].frozen`, `holds site ${site}, which is locked to slot ${lockedTo}`);
      }
      seen.set(site, r);
    }),
  );
}

/**
 * Refuses a problem that is not whole: wrong lengths, fractions, indices out of range.
 * @throws AppError "invalid" with one fault for each thing that is wrong (at most 50).
 */
export function assertProblem(problem: Problem): void {
  const faults: Fault[] = [];
  const report: Report = (field, message) => {
    if (faults.length < 50) faults.push({ field, message: `${field} ${message}.` });
  };
  wholeNumber(report, "days", problem.days);
  wholeNumber(report, "prices.drivingPerS", problem.prices.drivingPerS);
  wholeNumber(report, "prices.dutyPerS", problem.prices.dutyPerS);
  wholeNumber(report, "prices.perM", problem.prices.perM);
  const cells = problem.places * problem.places;
  checkMatrix(report, "travelS", problem.travelS, cells);
  checkMatrix(report, "travelM", problem.travelM, cells);
  problem.sites.forEach((site, i) => checkSite(report, problem, site, `sites[${i}]`));
  problem.slots.forEach((slot, r) => checkSlot(report, problem, slot, `slots[${r}]`));
  checkFrozenOnce(report, problem);
  if (faults.length > 0) throw invalid("The routing problem is not whole.", faults);
}

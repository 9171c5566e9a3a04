/**
 * The routing problem: which site is visited on which technician-day, in which order.
 *
 * Integers only. Times are seconds from the local midnight of the slot's day, lengths are
 * metres, costs are whole units of whatever the caller prices in (a thousandth of a minor
 * currency unit keeps rounding out of sight). Sites and slots are named by their index.
 */
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
  /**
   * Cells that all slots together may take, by type and day: no more than this on the days up to
   * and including it, deliveries by then counted. Left out: stock binds nobody.
   */
  readonly stock?: readonly (readonly number[])[];
}

/** Site indices by slot, in driving order. */
export type Routes = readonly (readonly number[])[];

/** Largest time, price and matrix entry: keeps every sum inside 31 bits where it must be. */
export const LARGEST_INTEGER = 500_000_000;

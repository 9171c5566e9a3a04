/**
 * What one act on a plan does, before it is done: hours, money, risk, or the reason why it cannot
 * be. Priced by the routing engine's own cost function, so the screen and the plan never differ.
 */
import type { IsoDay, Minor, Seconds } from "@/lib/units";
import { priceEdit, type Edit, type PricedEdit } from "../routing/evaluate";
import type { Routes } from "../routing/problem";
import type { RouteSchedule } from "../routing/schedule";
import { LOADING_S } from "./assumptions";
import type { RoundsProblem } from "./problem";
import { refusalWords, type WriteDay } from "./refusal-words";
import { toMinor } from "./rounds";

export interface ActPrice {
  /** Change of time on duty, over all rounds touched. */
  readonly dutyS: Seconds;
  readonly overtimeS: Seconds;
  /** Change of crew pay and kilometres. */
  readonly costMinor: Minor;
  /** Change of the expected cost of silence. */
  readonly riskMinor: Minor;
  /** Change of the number of packs expected to stop before their visit. */
  readonly expectedOut: number;
  /** Change of the whole plan's cost, unused life and later trips included. */
  readonly totalMinor: Minor;
  /** Empty when the act is allowed. */
  readonly refusals: readonly string[];
  readonly routes: Routes;
}

interface Risk {
  readonly silenceMinor: number;
  readonly expectedOut: number;
}

function riskOf(rounds: RoundsProblem, schedules: readonly RouteSchedule[]): Risk {
  let silenceMinor = 0;
  let expectedOut = 0;
  for (const schedule of schedules) {
    const { day } = rounds.problem.slots[schedule.slot]!;
    for (const stop of schedule.stops) {
      const visit = rounds.visits[stop.site]!;
      const swaps = new Set(visit.tasks.flatMap((t) => (t.kind === "swap" ? [t.assetId] : [])));
      for (const outlook of visit.outlooks) {
        if (!swaps.has(outlook.pack.assetId)) continue;
        silenceMinor += outlook.visits[day]!.silenceMinor;
        expectedOut += outlook.visits[day]!.chanceOut;
      }
    }
  }
  return { silenceMinor, expectedOut };
}

function sum(schedules: readonly RouteSchedule[], of: (schedule: RouteSchedule) => number): number {
  return schedules.reduce((total, schedule) => total + of(schedule), 0);
}

function dutyOf(schedule: RouteSchedule): number {
  return schedule.stops.length > 0 ? schedule.dutyS + LOADING_S : 0;
}

function inWords(rounds: RoundsProblem, priced: PricedEdit, write: WriteDay): string[] {
  return [...new Set(priced.refusals.map((refusal) => refusalWords(rounds, refusal, write)))];
}

/** Prices one act. `routes` are the plan's routes as they stand. */
export function priceAct(
  rounds: RoundsProblem,
  routes: Routes,
  edit: Edit,
  write: WriteDay,
): ActPrice {
  const priced = priceEdit(rounds.problem, routes, edit);
  const { before, after, change } = priced;
  const [was, is] = [riskOf(rounds, before), riskOf(rounds, after)];
  return {
    dutyS: sum(after, dutyOf) - sum(before, dutyOf),
    overtimeS: sum(after, (s) => s.overtimeS) - sum(before, (s) => s.overtimeS),
    costMinor: toMinor(change.duty + change.overtime + change.opening + change.driving),
    riskMinor: is.silenceMinor - was.silenceMinor,
    expectedOut: is.expectedOut - was.expectedOut,
    totalMinor: toMinor(change.total),
    refusals: inWords(rounds, priced, write),
    routes: priced.routes,
  };
}

/** The slot of a technician's day, or -1. */
export function slotIndex(rounds: RoundsProblem, technicianId: string, day: IsoDay): number {
  return rounds.slots.findIndex(
    (slot) => slot.technician.technicianId === technicianId && slot.day === day,
  );
}

/** The index of the visit to a site, or -1. */
export function visitIndex(rounds: RoundsProblem, siteId: string): number {
  return rounds.visits.findIndex((visit) => visit.site.siteId === siteId);
}

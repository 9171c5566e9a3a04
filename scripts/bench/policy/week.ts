/** A week lived through: rounds driven, silences answered. The same rules under every policy. */
import type { PackReading } from "@/lib/battery";
import { ARRIVAL_S, URGENT_DISRUPTION_H } from "@/lib/planning/assumptions";
import type { PlannedTask, PlanningSite } from "@/lib/planning/fleet";
import { dayNumber } from "@/lib/planning/local-time";
import type { PlannedRound, PlannedStop } from "@/lib/planning/rounds";
import { greatCircleM } from "@/lib/planning/travel";
import { toEpochDays } from "@/lib/units";
import type { BenchField, BenchPack } from "./field";
import { assetOf, PRICES, ROAD } from "./fleet";

export interface Policy {
  readonly name: string;
  /** The rounds of the week that begins on this Monday. */
  plan(field: BenchField, monday: number): readonly PlannedRound[];
  /** Whether a voltage just taken at a pack means that it comes out at once. */
  readonly swapsAt?: (field: BenchField, pack: BenchPack, reading: PackReading) => boolean;
}

const MORNING = 0.3;
const NOON = 0.5;
/** Days after a Monday on which next week's round would come by. */
const MID_WEEK = 2.5;
const WORKING_DAYS = 5;
const NOTED_AFTER_SWAP = 0.5;

/** Lives through one week from a Monday. */
export function liveWeek(field: BenchField, policy: Policy, monday: number, lastDay: number): void {
  field.beginDay(monday);
  const rounds = policy.plan(field, monday);
  for (const round of rounds) bookRound(field, round);
  for (let day = monday; day < Math.min(monday + 7, lastDay); day++) {
    if (day > monday) field.beginDay(day);
    if (day >= monday + WORKING_DAYS) continue;
    answerSilence(field, rounds, day, monday);
    for (const round of rounds.filter((r) => dayNumber(r.day) === day)) {
      for (const stop of round.stops) workAt(field, policy, stop);
    }
  }
}

/** Pay and kilometres of a round, as planned; the work itself is booked as it is done. */
function bookRound({ ledger, fleet }: BenchField, round: PlannedRound): void {
  const dutyS = (round.endsAt.getTime() - round.startsAt.getTime()) / 1000;
  const tasks = round.stops.flatMap((stop) => stop.tasks);
  const workS = tasks.reduce((sum, task) => {
    const { swapMinutes, readMinutes } = assetOf(fleet, task.assetId).model;
    return sum + 60 * (task.kind === "swap" ? swapMinutes : readMinutes);
  }, 0);
  const overtime = PRICES.overtimeMinorPerHour - PRICES.crewMinorPerHour;
  ledger.minor.crewOnTheRoad +=
    ((dutyS - workS) * PRICES.crewMinorPerHour + round.overtimeS * overtime) / 3600;
  ledger.minor.kilometres += (round.distanceM / 1000) * PRICES.travelMinorPerKm;
  ledger.metres += round.distanceM;
}

function workAt(field: BenchField, policy: Policy, stop: PlannedStop): void {
  field.ledger.visits += 1;
  let at = toEpochDays(stop.beginsAt) + ARRIVAL_S / 86_400;
  const done = new Set<string>();
  for (const task of stop.tasks) {
    workOn(field, policy, task, at);
    done.add(task.assetId);
    const { swapMinutes, readMinutes } = assetOf(field.fleet, task.assetId).model;
    at += (task.kind === "swap" ? swapMinutes : readMinutes) / 1440;
  }
  // Whoever stands before a device that is known to be silent gives it new cells.
  for (const { tag } of field.fleet.assetsAt.get(stop.siteId) ?? []) {
    if (!done.has(tag) && field.isKnownSilent(tag, at)) swapAndNote(field, tag, at);
  }
}

function workOn(field: BenchField, policy: Policy, task: PlannedTask, at: number): void {
  const pack = field.packOf(task.assetId);
  // An urgent trip was here first.
  if (pack.key !== task.packId) return;
  const reading = field.read(pack.tag, at, policy.swapsAt ? "resting" : undefined);
  if (task.kind === "swap") return swapAndNote(field, pack.tag, at);
  field.ledger.reads += 1;
  field.ledger.minor.looking +=
    (assetOf(field.fleet, pack.tag).model.readMinutes / 60) * PRICES.crewMinorPerHour;
  if (pack.silence || policy.swapsAt?.(field, pack, reading)) swapAndNote(field, pack.tag, at);
}

function swapAndNote(field: BenchField, tag: string, at: number): void {
  field.swap(tag, at + 4 / 1440);
  if (field.chance(NOTED_AFTER_SWAP)) field.read(tag, at + 10 / 1440);
}

/** Urgent trips for devices whose silence until a round comes by would cost more. */
function answerSilence(
  field: BenchField,
  rounds: readonly PlannedRound[],
  day: number,
  monday: number,
): void {
  const planned = new Map<string, number>();
  for (const round of rounds.filter((r) => dayNumber(r.day) >= day)) {
    for (const stop of round.stops) planned.set(stop.siteId, dayNumber(round.day));
  }
  for (const [siteId, assets] of field.fleet.assetsAt) {
    const silent = assets.filter(({ tag }) => field.isKnownSilent(tag, day + MORNING));
    if (silent.length === 0) continue;
    const waits = (planned.get(siteId) ?? monday + 7 + MID_WEEK - NOON) - day;
    const hourly = silent.reduce((sum, asset) => sum + asset.silenceMinorPerHour, 0);
    const trip = urgentTrip(field, field.fleet.sites.get(siteId)!);
    if (waits * 24 * hourly <= trip.minor) continue;
    bookTrip(field, trip);
    for (const { tag } of silent) swapAndNote(field, tag, day + NOON);
  }
}

interface Trip {
  readonly metres: number;
  readonly minor: number;
}

/** Out and back from the nearer depot, with the round that is torn up for it. */
function urgentTrip({ fleet }: BenchField, site: PlanningSite): Trip {
  const oneWay = Math.min(...fleet.technicians.map((t) => greatCircleM(t.depot, site)));
  const metres = 2 * oneWay * ROAD.detourFactor;
  const hours = metres / 1000 / ROAD.speedKmh + URGENT_DISRUPTION_H + ARRIVAL_S / 3600;
  const minor = (metres / 1000) * PRICES.travelMinorPerKm + hours * PRICES.crewMinorPerHour;
  return { metres, minor };
}

function bookTrip({ ledger }: BenchField, trip: Trip): void {
  ledger.urgentTrips += 1;
  ledger.visits += 1;
  ledger.metres += trip.metres;
  ledger.minor.urgentTrips += trip.minor;
}

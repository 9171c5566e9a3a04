/**
 * One pack seen from one plan: what a visit costs on each of its days, what the best later visit
 * would cost, and what follows from the two. The Horizon, the plan and its explanations all read
 * these numbers.
 */
import type { EpochDays, IsoDay, Minor } from "@/lib/units";
import {
  ARRIVAL_S,
  KEEP_FACTOR,
  LATER_DAYS,
  NEAR_DAYS,
  NEXT_ROUND_H,
  STOPS_OF_A_ROUND,
  URGENT_DISRUPTION_H,
  URGENT_RESPONSE_H,
} from "./assumptions";
import type {
  PlanningFrame,
  PlanningPack,
  PlanningPrices,
  PlanningSite,
  PointOnEarth,
} from "./fleet";
import { addDays, daysBetween, daysFrom, midday, weekdayOf } from "./local-time";
import { isClosed } from "./site-days";
import { longRunPremium } from "./long-run";
import { greatCircleM, type RoadAssumption } from "./travel";
import {
  cheapestVisit,
  costOfFailure,
  keepCostPerDay,
  priceVisit,
  sufferedSoFar,
  waitingCostPerWeek,
  type SilencePrices,
  type VisitPrice,
  type WaitingPack,
} from "./waiting-cost";

/**
 * due: waiting until after this plan costs more than the life thrown away.
 * near: it does not, but by less than the share of a drive that a visit of its own would pay
 * within the next weeks.
 */
export type Standing = "due" | "near" | "later";

export interface PackOutlook {
  readonly pack: PlanningPack;
  /** One price a day of the plan. */
  readonly visits: readonly VisitPrice[];
  readonly later: { readonly day: IsoDay; readonly price: VisitPrice };
  /** Best later visit less best visit in this plan; what not going costs. */
  readonly gainMinor: Minor;
  readonly standing: Standing;
  readonly waitingMinorPerWeek: Minor;
  /** Silence that a device known to be out has cost already; 0 for any other. */
  readonly sufferedMinor: Minor;
}

/** What outlooks of one plan share. */
export interface OutlookContext {
  readonly now: EpochDays;
  readonly days: readonly IsoDay[];
  readonly moments: readonly EpochDays[];
  /** The last of those days on which the plan makes rounds; it only looks at those after it. */
  readonly lastMoment: EpochDays;
  /** Days after the plan on which a later visit is looked for, nearest first. */
  readonly laterDays: readonly IsoDay[];
  readonly laterMoments: readonly EpochDays[];
  readonly prices: PlanningPrices;
  readonly depots: readonly PointOnEarth[];
  readonly road: RoadAssumption;
}

/**
 * Days on which a later visit is priced, nearest first: one in each week for a year, in every
 * fourth until the third year, then two a year. Mid-week, where they work then.
 */
function laterDaysOf(frame: PlanningFrame): IsoDay[] {
  const inWeek = [3, 2, 4, 1, 5, 6, 7].find((weekday) => frame.workingDays.includes(weekday)) ?? 3;
  let day = addDays(frame.lastDay, 1);
  while (weekdayOf(day) !== inWeek) day = addDays(day, 1);
  const step = (ahead: number) => (ahead < 364 ? 7 : ahead < 1092 ? 28 : 182);
  const days: IsoDay[] = [];
  for (let ahead = 0; ahead <= LATER_DAYS; ahead += step(ahead)) days.push(addDays(day, ahead));
  return days;
}

/**
 * Prepares what the outlooks of one plan share.
 * @param lastDay the last day of rounds, where the frame looks further
 */
export function outlookContext(
  frame: PlanningFrame,
  prices: PlanningPrices,
  depots: readonly PointOnEarth[],
  road: RoadAssumption,
  lastDay = frame.lastDay,
): OutlookContext {
  const days = daysFrom(frame.firstDay, frame.lastDay);
  const laterDays = laterDaysOf(frame);
  const at = (day: IsoDay) => midday(day, frame.timeZone);
  return {
    now: frame.now.getTime() / 86_400_000,
    days,
    moments: days.map(at),
    lastMoment: at(lastDay),
    laterDays,
    laterMoments: laterDays.map(at),
    prices,
    depots,
    road,
  };
}

interface SiteTrip {
  /** Share of a round's drive that one stop here pays, with the walk to the gate. */
  readonly shareMinor: Minor;
  /** A trip to this site alone, out of turn, without the work. */
  readonly urgentMinor: Minor;
}

/** What driving to a site costs, as a share of a usual round and as a trip of its own. */
export function tripOf(
  site: PointOnEarth,
  context: Pick<OutlookContext, "prices" | "road" | "depots">,
): SiteTrip {
  const { prices, road } = context;
  const distances = context.depots.map((depot) => greatCircleM(depot, site));
  const oneWayM = (distances.length > 0 ? Math.min(...distances) : 0) * road.detourFactor;
  const driveMinor = (metres: number) =>
    (metres / 1000) *
    (prices.travelMinorPerKm + prices.crewMinorPerHour / Math.max(1, road.speedKmh));
  return {
    shareMinor:
      driveMinor((2 * oneWayM) / STOPS_OF_A_ROUND) + (ARRIVAL_S / 3600) * prices.crewMinorPerHour,
    urgentMinor: driveMinor(2 * oneWayM) + URGENT_DISRUPTION_H * prices.crewMinorPerHour,
  };
}

/** The pack as the pricing of waiting sees it. */
export function waitingPack(
  pack: Pick<PlanningPack, "life" | "installedAt" | "silenceMinorPerHour" | "swapS" | "cellsMinor">,
  trip: SiteTrip,
  prices: PlanningPrices,
): WaitingPack {
  const workMinor = (pack.swapS / 3600) * prices.crewMinorPerHour;
  const cycleMinor = pack.cellsMinor + workMinor + trip.shareMinor;
  const silence: SilencePrices = {
    silenceMinorPerHour: pack.silenceMinorPerHour,
    // The trip does the work of the planned swap and saves its share of a drive.
    urgentTripMinor: Math.max(0, trip.urgentMinor - trip.shareMinor),
    urgentResponseH: URGENT_RESPONSE_H,
    nextRoundH: NEXT_ROUND_H,
  };
  return {
    ...silence,
    life: pack.life,
    keepMinorPerDay:
      keepCostPerDay(pack.life, pack.installedAt, cycleMinor) *
      longRunPremium(costOfFailure(silence), cycleMinor) *
      KEEP_FACTOR,
  };
}

function standingOf(
  gainMinor: Minor,
  tripShareMinor: Minor,
  laterDay: IsoDay,
  context: OutlookContext,
): Standing {
  if (gainMinor >= 0) return "due";
  const ahead = daysBetween(context.days.at(-1)!, laterDay);
  return gainMinor >= -tripShareMinor && ahead <= NEAR_DAYS ? "near" : "later";
}

/** The outlook of one pack. */
export function outlookOf(
  pack: PlanningPack,
  site: PlanningSite,
  context: OutlookContext,
): PackOutlook {
  const trip = tripOf(site, context);
  const open = context.laterDays.flatMap((day, i) => (isClosed(site, day) ? [] : [i]));
  const choices = open.length > 0 ? open : context.laterDays.map((_, i) => i);
  const waiting = waitingPack(pack, trip, context.prices);
  const { index, price } = cheapestVisit(
    waiting,
    context.now,
    choices.map((i) => context.laterMoments[i]!),
  );
  const visits = context.moments.map((moment) => priceVisit(waiting, context.now, moment));
  const cheapestNow = Math.min(...visits.map((visit) => visit.totalMinor));
  const gainMinor = price.totalMinor - cheapestNow;
  const day = context.laterDays[choices[index]!]!;
  return {
    pack,
    visits,
    later: { day, price },
    gainMinor,
    standing: standingOf(gainMinor, trip.shareMinor, day, context),
    waitingMinorPerWeek: waitingCostPerWeek(waiting, context.now, context.lastMoment),
    sufferedMinor: sufferedSoFar(waiting, context.now),
  };
}

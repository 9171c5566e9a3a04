/** What a plan leaves out, and why, in words. */
import type { IsoDay, Minor } from "@/lib/units";
import { type LeftOutReasons, whyLeftOut } from "../routing/evaluate";
import type { Routes } from "../routing/problem";
import type { RefusalCode } from "../routing/schedule";
import type { DueSite } from "./due";
import type { ReturnDay } from "./fleet";
import { addDays, daysBetween, localDay } from "./local-time";
import type { PackOutlook } from "./outlook";
import type { RoundsProblem } from "./problem";
import { foundWords, ticketWords } from "./refusal-words";
import { closureOn, isClosed } from "./site-days";
import { greatCircleM } from "./travel";
import type { Visit } from "./visit";

export type LeftOutReason =
  | "cheaper_later"
  | "notice"
  | "closed"
  | "no_ticket"
  | "no_cells"
  | "no_time"
  | "too_far"
  | "excluded";

export interface LeftOut {
  readonly assetId: string;
  readonly packId: string;
  readonly reason: LeftOutReason;
  /** Words without a date; the earliest day is beside them. */
  readonly detail: string;
  readonly earliestDay: IsoDay | null;
  readonly waitingMinorPerWeek: Minor;
}

/** Sites whose next visit may be one trip: within this distance and time. No source. */
const NEIGHBOUR_M = 2500;
const NEIGHBOUR_DAYS = 28;

interface Why {
  readonly reason: LeftOutReason;
  readonly detail: string;
  readonly earliestDay: IsoDay | null;
}

function firstOpenDay(visit: Visit, after: IsoDay): IsoDay | null {
  for (let ahead = 1; ahead <= 366; ahead++) {
    const day = addDays(after, ahead);
    if (!isClosed(visit.site, day)) return day;
  }
  return null;
}

function ofNotice(visit: Visit, today: IsoDay): Why {
  const { noticeDays } = visit.site;
  const days = noticeDays === 1 ? "1 day's" : `${noticeDays} days'`;
  return {
    reason: "notice",
    detail: `needs ${days} notice`,
    earliestDay: addDays(today, noticeDays),
  };
}

/** The day that a technician named, or the first open one after it. */
function ofReturn(visit: Visit, returnOn: ReturnDay): Why {
  const earliestDay = firstOpenDay(visit, addDays(returnOn.day, -1));
  return {
    reason: "closed",
    detail: `${foundWords(returnOn)}, not to be tried before`,
    earliestDay,
  };
}

function ofClosure(visit: Visit, rounds: RoundsProblem): Why {
  const { returnOn } = visit.site;
  if (returnOn && returnOn.day > rounds.frame.firstDay) return ofReturn(visit, returnOn);
  const season = closureOn(visit.site.closures, rounds.frame.firstDay);
  const because = season?.reason ? `: ${season.reason}` : "";
  return {
    reason: "closed",
    detail: `closed on every working day of this plan${because}`,
    earliestDay: firstOpenDay(visit, rounds.frame.lastDay),
  };
}

function neighboursOf(visit: Visit, day: IsoDay, others: readonly Visit[]): number {
  return others.filter(
    (other) =>
      other !== visit &&
      greatCircleM(visit.site, other.site) <= NEIGHBOUR_M &&
      other.outlooks.some((o) => Math.abs(daysBetween(day, o.later.day)) <= NEIGHBOUR_DAYS),
  ).length;
}

function ofCost(visit: Visit, day: IsoDay, others: readonly Visit[]): Why {
  const count = neighboursOf(visit, day, others);
  const company =
    count === 0 ? "" : count === 1 ? " with its neighbour" : ` with its ${count} neighbours`;
  return { reason: "cheaper_later", detail: `cheaper later${company}`, earliestDay: day };
}

/** Whether every technician-day refuses for one of these reasons. */
function everywhere({ fixed }: LeftOutReasons, ...codes: readonly RefusalCode[]): boolean {
  return fixed.every((slot) => slot.some(({ code }) => codes.includes(code)));
}

function ofRefusals(
  rounds: RoundsProblem,
  visit: Visit,
  outlook: PackOutlook,
  why: LeftOutReasons,
  others: readonly Visit[],
  intended: IsoDay | null,
): Why {
  const today = localDay(rounds.frame.now, rounds.frame.timeZone);
  const tickets = visit.site.tickets.map(ticketWords).join(" and a ");
  if (why.fixed.length === 0) {
    return { reason: "no_time", detail: "nobody works in this plan", earliestDay: null };
  }
  if (everywhere(why, "notice")) return ofNotice(visit, today);
  if (everywhere(why, "site_closed")) return ofClosure(visit, rounds);
  if (everywhere(why, "skill_missing")) {
    return {
      reason: "no_ticket",
      detail: `nobody in this plan holds a ${tickets}`,
      earliestDay: null,
    };
  }
  if (everywhere(why, "notice", "site_closed", "skill_missing")) return ofNoDay(visit, today);
  if (why.shortTypes.length > 0) return ofStock(rounds, visit, why);
  if (!why.fits) {
    return {
      reason: "no_time",
      detail: "every round that may go there is full",
      earliestDay: intended ?? addDays(rounds.frame.lastDay, 1),
    };
  }
  return ofCost(visit, intended ?? outlook.later.day, others);
}

function ofStock(rounds: RoundsProblem, { outlooks }: Visit, { shortTypes }: LeftOutReasons): Why {
  const ids = shortTypes.map((type) => rounds.cellTypeIds[type]);
  const short = outlooks.map(({ pack }) => pack).filter((pack) => ids.includes(pack.cellTypeId));
  return noCells(short.map((pack) => pack.designation));
}

function noCells(designations: readonly string[]): Why {
  const names = [...new Set(designations)].join(" and ");
  return { reason: "no_cells", detail: `not enough ${names} on hand`, earliestDay: null };
}

function ofNoDay(visit: Visit, today: IsoDay): Why {
  const noticeEnds = addDays(today, visit.site.noticeDays);
  const returnDay = visit.site.returnOn?.day ?? noticeEnds;
  const earliestDay = returnDay > noticeEnds ? returnDay : noticeEnds;
  const reason = visit.site.noticeDays > 0 ? "notice" : "closed";
  return {
    reason,
    detail: "notice, opening days and tickets leave no round that may go there",
    earliestDay,
  };
}

function row(outlook: PackOutlook, why: Why): LeftOut {
  return {
    assetId: outlook.pack.assetId,
    packId: outlook.pack.packId,
    waitingMinorPerWeek: Math.round(outlook.waitingMinorPerWeek),
    ...why,
  };
}

/**
 * Due and near-due packs in no round of the plan, the dearest to wait for first.
 * @param lastDay of the plan's rounds; routes on later days are only an intention
 */
export function leftOut(
  rounds: RoundsProblem,
  routes: Routes,
  lastDay: IsoDay,
  due: readonly DueSite[],
  excludedAssets: ReadonlySet<string>,
): LeftOut[] {
  const dayOf = new Map(routes.flatMap((route, r) => route.map((s) => [s, rounds.slots[r]!.day])));
  const inPlan = (s: number) => (dayOf.get(s) ?? "9999") <= lastDay;
  const absent = rounds.visits.filter((_, s) => !inPlan(s));
  const lastIndex = daysBetween(rounds.frame.firstDay, lastDay);
  const own = { ...rounds, frame: { ...rounds.frame, lastDay } };
  const rows: LeftOut[] = [];
  rounds.visits.forEach((visit, s) => {
    if (inPlan(s)) return;
    const why = whyLeftOut(rounds.problem, routes, s, lastIndex);
    const intended = dayOf.get(s) ?? null;
    const swaps = new Set(visit.tasks.flatMap((t) => (t.kind === "swap" ? [t.assetId] : [])));
    for (const outlook of visit.outlooks.filter((o) => swaps.has(o.pack.assetId))) {
      rows.push(row(outlook, ofRefusals(own, visit, outlook, why, absent, intended)));
    }
  });
  for (const outlook of due.flatMap((site) => site.withoutCells)) {
    rows.push(row(outlook, noCells([outlook.pack.designation])));
  }
  return rows
    .map((r) =>
      excludedAssets.has(r.assetId)
        ? { ...r, reason: "excluded" as const, detail: "taken out by hand", earliestDay: null }
        : r,
    )
    .sort((a, b) => b.waitingMinorPerWeek - a.waitingMinorPerWeek);
}

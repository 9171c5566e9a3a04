/** Why a stop cannot go somewhere, in words a dispatcher can act on. */
import type { IsoDay, Seconds } from "@/lib/units";
import type { Refusal } from "../routing/schedule";
import type { PlanningTechnician, ReturnDay, Ticket } from "./fleet";
import { addDays, localDay } from "./local-time";
import { whyNotWorking, type RoundsProblem } from "./problem";
import { closureOn } from "./site-days";
import type { Visit } from "./visit";

/** How days are written; the words themselves are English. */
export type WriteDay = (day: IsoDay) => string;

const TICKET_WORDS: Record<Ticket, string> = {
  height: "working-at-height",
  boat: "boat",
  confined_space: "confined-space",
  roadside: "roadside",
  explosive_atmosphere: "explosive-atmosphere",
};

export function ticketWords(ticket: Ticket): string {
  return `${TICKET_WORDS[ticket]} ticket`;
}

function minutes(seconds: Seconds): string {
  const whole = Math.max(1, Math.ceil(seconds / 60));
  return whole < 60 ? `${whole} min` : `${Math.floor(whole / 60)} h ${whole % 60} min`;
}

function clock(wallS: Seconds): string {
  const pad = (value: number) => String(value).padStart(2, "0");
  return `${pad(Math.floor(wallS / 3600))}:${pad(Math.floor((wallS % 3600) / 60))}`;
}

/** "needs 10 days' notice: not before Mon 14 Dec". */
export function noticeWords(visit: Visit, today: IsoDay, write: WriteDay): string {
  const { noticeDays } = visit.site;
  const days = noticeDays === 1 ? "1 day's" : `${noticeDays} days'`;
  return `needs ${days} notice: not before ${write(addDays(today, noticeDays))}`;
}

const FOUND_WORDS: Record<ReturnDay["reason"], string> = {
  no_access: "no way in at the last visit",
  flooded: "flooded at the last visit",
  not_found: "not found at the last visit",
  unsafe: "unsafe at the last visit",
  no_cells: "no cells at the last visit",
  other: "could not be done at the last visit",
};

/** What a technician found who could not do the work. */
export function foundWords({ reason }: ReturnDay): string {
  return FOUND_WORDS[reason];
}

/** "flooded at the last visit: not before Mon 14 Dec", "closed that day: nesting birds", ... */
export function closedWords(visit: Visit, day: IsoDay, write: WriteDay): string {
  const { returnOn } = visit.site;
  if (returnOn && day < returnOn.day) {
    return `${foundWords(returnOn)}, not before ${write(returnOn.day)}`;
  }
  const season = closureOn(visit.site.closures, day);
  if (season) return `closed that day${season.reason ? `: ${season.reason}` : ""}`;
  return "its opening hours are too short for the work";
}

/** Tickets that the site asks for and the technician lacks, in words. */
export function missingTicketWords(visit: Visit, technician: PlanningTechnician): string {
  const missing = visit.site.tickets.filter((ticket) => !technician.tickets.includes(ticket));
  return `needs a ${missing.map(ticketWords).join(" and a ")}, which ${technician.name} does not hold`;
}

/** Why nobody can send this technician out that day; null when they work. */
export function notWorkingWords(technician: PlanningTechnician, day: IsoDay): string | null {
  const why = whyNotWorking(technician, day);
  if (!why) return null;
  if (why.kind === "taken") return `${technician.name} already has a round that day`;
  if (why.kind === "no_shift") return `${technician.name} does not work that day`;
  return `${technician.name} is away${why.reason ? `: ${why.reason}` : ""}`;
}

/** The cell type that is short, as people call it. */
function designationOf({ cellTypeIds, visits }: RoundsProblem, { type }: Refusal): string {
  const packs = visits.flatMap((visit) => visit.outlooks.map((outlook) => outlook.pack));
  const short = packs.find((pack) => pack.cellTypeId === cellTypeIds[type ?? -1]);
  return short?.designation || "cells";
}

/** One refusal of the routing engine in words. */
export function refusalWords(rounds: RoundsProblem, refusal: Refusal, write: WriteDay): string {
  const { technician, day } = rounds.slots[refusal.slot]!;
  const visit = refusal.site === undefined ? undefined : rounds.visits[refusal.site];
  const name = visit ? `${visit.site.name} ` : "";
  const excess = refusal.excess ?? 0;
  const today = localDay(rounds.frame.now, rounds.frame.timeZone);
  switch (refusal.code) {
    case "locked":
      return `${name}is locked in its round`;
    case "notice":
      return visit ? `${name}${noticeWords(visit, today, write)}` : "needs notice";
    case "skill_missing":
      return visit ? `${name}${missingTicketWords(visit, technician)}` : "needs a ticket";
    case "site_closed":
      return visit ? `${name}is not open: ${closedWords(visit, day, write)}` : "closed";
    case "outside_hours":
      return `${name}would be reached ${minutes(excess)} too late for its hours${
        visit?.site.hours ? ` (closes ${clock(visit.site.hours.closesS)})` : ""
      }`;
    case "outside_shift":
      return `the round would end ${minutes(excess)} beyond ${technician.name}'s shift and the overtime allowed`;
    case "stock_short":
      return `stores and vans lack ${excess} ${designationOf(rounds, refusal)} for the rounds up to that day`;
    case "van_full":
      return `the van would need to hold ${excess} more cells than it can`;
  }
}

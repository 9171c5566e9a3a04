import { z } from "zod";
import { getOrganisation } from "@/db/queries/organisation";
import { loadTechniciansToPlan } from "@/db/queries/planning-fleet";
import { plansWithin } from "@/db/queries/plans";
import { loadRoundSheets } from "@/db/queries/round-sheets";
import { invalid } from "@/lib/errors";
import { addDays, daysBetween, localDay, mondayOf } from "@/lib/planning/local-time";
import { calendarEvent } from "@/lib/present/calendar-event";
import { roundsShown } from "./rounds-of-week";
import { defineUseCase } from "./use-case";

/** Visits between two days, published and proposed, with the technicians as resources. */
export const readCalendar = defineUseCase({
  name: "read-calendar",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({ from: z.iso.date(), to: z.iso.date() }),
  async run(deps, actor, { from, to }) {
    if (to < from || daysBetween(from, to) > 100) {
      throw invalid("These days make no span.", [
        { field: "to", message: "Give at most 100 days, the last not before the first." },
      ]);
    }
    const organisation = await getOrganisation(deps.db);
    const today = localDay(deps.now(), organisation.timeZone);
    const technicians = await loadTechniciansToPlan(deps.db, []);
    const plans = await plansWithin(deps.db, from, to);
    const drafts = plans.filter((plan) => plan.state === "draft");
    const rounds = await roundsShown(deps.db, technicians, { firstDay: from, lastDay: to }, drafts);
    const sheets = await loadRoundSheets(
      deps.db,
      rounds.map((round) => round.id),
    );
    const roundOf = new Map(rounds.map((round) => [round.id, round]));
    const names = new Map(technicians.map((t) => [t.id, t.name]));
    return {
      today,
      timeZone: organisation.timeZone,
      locale: organisation.locale,
      mayEdit:
        actor.kind === "person" &&
        actor.roles.some((role) => role !== "supervisor" && role !== "technician"),
      workingDays: organisation.workingDays,
      drafts: drafts.map(({ id, name, version, firstDay }) => ({ id, name, version, firstDay })),
      technicians: technicians.map(({ id, name, crewName }) => ({ id, name, crew: crewName })),
      events: sheets.map((stop) => {
        const round = roundOf.get(stop.roundId)!;
        return calendarEvent(stop, round, names.get(round.technicianId) ?? "", organisation);
      }),
    };
  },
});
export type CalendarView = Awaited<ReturnType<typeof readCalendar>>;

/** The weeks around a day (today, when none is named): what the Calendar opens on. */
export const readCalendarStart = defineUseCase({
  name: "read-calendar-start",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({ day: z.iso.date().nullable().catch(null) }),
  async run(deps, actor, input) {
    const { timeZone } = await getOrganisation(deps.db);
    const day = input.day ?? localDay(deps.now(), timeZone);
    const span = monthSpan(day);
    return { day, span, view: await readCalendar(deps, actor, span) };
  },
});

/** From the Monday before the month of a day to the Sunday after it. */
export function monthSpan(day: string): { readonly from: string; readonly to: string } {
  const from = addDays(mondayOf(`${day.slice(0, 7)}-01`), -7);
  return { from, to: addDays(from, 55) };
}

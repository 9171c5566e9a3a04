import { z } from "zod";
import { getOrganisation } from "@/db/queries/organisation";
import { loadTechniciansToPlan } from "@/db/queries/planning-fleet";
import { plansWithin } from "@/db/queries/plans";
import { loadRoundSheets } from "@/db/queries/round-sheets";
import { invalid } from "@/lib/errors";
import { daysBetween, localDay } from "@/lib/planning/local-time";
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
    const draft = plans.find((plan) => plan.state === "draft") ?? null;
    const rounds = await roundsShown(deps.db, technicians, { firstDay: from, lastDay: to }, draft);
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
      draft: draft && { id: draft.id, name: draft.name, version: draft.version },
      technicians: technicians.map(({ id, name, crewName }) => ({ id, name, crew: crewName })),
      events: sheets.map((stop) => {
        const round = roundOf.get(stop.roundId)!;
        return calendarEvent(stop, round, names.get(round.technicianId) ?? "", organisation);
      }),
    };
  },
});
export type CalendarView = Awaited<ReturnType<typeof readCalendar>>;

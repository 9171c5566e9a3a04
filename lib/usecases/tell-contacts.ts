import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { loadPlanRounds } from "@/db/queries/plan-rounds";
import { loadRoundSheets, noteContactsTold } from "@/db/queries/round-sheets";
import { formatDay } from "@/lib/present/format-day";
import { formatTime } from "@/lib/present/format-time";
import { queueMail } from "./queue-mail";
import type { Publication } from "./read-publication";
import type { Deps } from "./use-case";

/**
 * Tells the contacts of the plan's sites when somebody comes, once a stop. Contacts without an
 * address are rung up; the round's sheet names them.
 * @returns how many were written to
 */
export async function tellContacts(
  trx: Transaction<Database>,
  deps: Deps,
  { plan, organisation, technicians }: Publication,
): Promise<number> {
  const rounds = await loadPlanRounds(trx, plan.id);
  const stops = await loadRoundSheets(
    trx,
    rounds.map((round) => round.id),
  );
  const untold = stops.filter((stop) => stop.contactEmail && !stop.contactToldAt);
  for (const stop of untold) {
    const round = rounds.find((r) => r.id === stop.roundId)!;
    const technician = technicians.find((t) => t.id === round.technicianId);
    const day = formatDay(round.day, organisation.locale, { weekday: true, year: true });
    await queueMail(trx, deps, {
      template: "visit-notice",
      toEmail: stop.contactEmail!.toLowerCase(),
      toPersonId: null,
      subject: `Visit to ${stop.siteName} on ${day}`,
      props: {
        organisation: organisation.name,
        locale: organisation.locale,
        timeZone: organisation.timeZone,
        currency: organisation.currency,
        contactName: stop.contactName ?? "",
        siteName: stop.siteName,
        day: round.day,
        around: formatTime(stop.arrivesAt, organisation),
        minutes: Math.round((stop.departsAt.getTime() - stop.arrivesAt.getTime()) / 60_000),
        technicianName: technician?.name ?? "",
      },
      idempotencyKey: `visit-${stop.stopId}-${round.day}`,
    });
  }
  await noteContactsTold(
    trx,
    untold.map((stop) => stop.stopId),
    deps.now(),
  );
  return untold.length;
}

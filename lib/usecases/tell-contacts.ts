import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import type { Organisation } from "@/db/queries/organisation";
import { loadPlanRounds } from "@/db/queries/plan-rounds";
import { loadRoundSheets, noteContactsTold, type SheetStop } from "@/db/queries/round-sheets";
import type { VisitMailProps } from "@/emails/mail-props";
import { formatDay } from "@/lib/present/format-day";
import { formatTime } from "@/lib/present/format-time";
import { type MailOrder, queueMail } from "./queue-mail";
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
    const technician = technicians.find((t) => t.id === round.technicianId)?.name ?? "";
    await queueMail(trx, deps, visitNotice(organisation, stop, round.day, technician));
  }
  await noteContactsTold(
    trx,
    untold.map((stop) => stop.stopId),
    deps.now(),
  );
  return untold.length;
}

function visitNotice(
  organisation: Organisation,
  stop: SheetStop,
  day: string,
  technicianName: string,
): MailOrder {
  const { name, locale, timeZone, currency } = organisation;
  const props: VisitMailProps = {
    ...{ organisation: name, locale, timeZone, currency },
    contactName: stop.contactName ?? "",
    siteName: stop.siteName,
    day,
    around: formatTime(stop.arrivesAt, organisation),
    minutes: Math.round((stop.departsAt.getTime() - stop.arrivesAt.getTime()) / 60_000),
    technicianName,
  };
  const written = formatDay(day, locale, { weekday: true, year: true });
  return {
    template: "visit-notice",
    toEmail: (stop.contactEmail ?? "").toLowerCase(),
    toPersonId: null,
    subject: `Visit to ${stop.siteName} on ${written}`,
    props: { ...props },
    idempotencyKey: `visit-${stop.stopId}-${day}`,
  };
}

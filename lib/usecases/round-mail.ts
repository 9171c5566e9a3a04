import type { Organisation } from "@/db/queries/organisation";
import type { StoredRound } from "@/db/queries/plan-rounds";
import type { SheetStop, SheetTask } from "@/db/queries/round-sheets";
import type { RoundMailProps, RoundMailTask } from "@/emails/mail-props";
import { loadGear } from "@/lib/planning/load-list";
import type { Ticket } from "@/lib/planning/fleet";
import { formatDay } from "@/lib/present/format-day";
import type { TechnicianRow } from "./planning-world";
import type { MailOrder } from "./queue-mail";

export interface RoundNews {
  readonly news: "published" | "changed" | "cancelled";
  readonly round: StoredRound;
  readonly stops: readonly SheetStop[];
  readonly technician: TechnicianRow;
  readonly changes: readonly string[];
  /** RFC 5545 SEQUENCE of this news. */
  readonly sequence: number;
  readonly at: Date;
}

/** Orders the mail that tells a technician what became of a day. */
export function roundMail(organisation: Organisation, appUrl: string, news: RoundNews): MailOrder {
  const { round, technician, sequence } = news;
  const day = formatDay(round.day, organisation.locale, { weekday: true, year: true });
  const subject = {
    published: `Your round on ${day}`,
    changed: `Changed: your round on ${day}`,
    cancelled: `Cancelled: your round on ${day}`,
  }[news.news];
  return {
    template: `round-${news.news}`,
    toEmail: technician.email,
    toPersonId: technician.personId,
    subject,
    props: { ...roundMailProps(organisation, appUrl, news) },
    idempotencyKey: `round-${round.icalUid}-${sequence}`,
  };
}

function roundMailProps(
  organisation: Organisation,
  appUrl: string,
  { round, stops, technician, changes, sequence, at }: RoundNews,
): RoundMailProps {
  return {
    organisation: organisation.name,
    locale: organisation.locale,
    timeZone: organisation.timeZone,
    currency: organisation.currency,
    technicianName: technician.name,
    day: round.day,
    url: `${appUrl}/today?day=${round.day}`,
    depotName: technician.depotName,
    startsAt: round.startsAt.toISOString(),
    endsAt: round.endsAt.toISOString(),
    distanceM: round.distanceM,
    driveS: round.driveS,
    workS: round.workS,
    stops: stops.map((stop) => ({
      position: stop.position,
      arrivesAt: stop.arrivesAt.toISOString(),
      departsAt: stop.departsAt.toISOString(),
      siteName: stop.siteName,
      latitude: stop.latitude,
      longitude: stop.longitude,
      access: accessWords(stop),
      hazards: stop.hazards,
      tasks: stop.tasks.map(mailTask),
    })),
    load: cellsToLoad(stops),
    keys: loadGear(stops.map((s) => ({ ...s, tickets: s.tickets as Ticket[] }))).keys,
    changes,
    calendar: { uid: round.icalUid, sequence, stamp: at.toISOString() },
  };
}

function mailTask(task: SheetTask): RoundMailTask {
  const { tag, assetName, designation, cells } = task;
  return { kind: task.kind as RoundMailTask["kind"], tag, assetName, designation, cells };
}

/** The way in, in a sentence or two: key, hours, notes. */
export function accessWords(
  stop: Pick<SheetStop, "keyCode" | "opens" | "closes" | "driveUpNotes">,
): string {
  const hours =
    stop.opens && stop.closes ? `Open ${stop.opens.slice(0, 5)}–${stop.closes.slice(0, 5)}.` : "";
  const key = stop.keyCode ? `Key ${stop.keyCode}.` : "";
  return [key, hours, stop.driveUpNotes].filter(Boolean).join(" ");
}

/** Cells to load, by type. */
export function cellsToLoad(
  stops: readonly SheetStop[],
): { readonly designation: string; readonly cells: number }[] {
  const cells = new Map<string, number>();
  for (const task of stops.flatMap((stop) => stop.tasks)) {
    if (task.kind !== "swap" || !task.designation) continue;
    cells.set(task.designation, (cells.get(task.designation) ?? 0) + task.cells);
  }
  return [...cells].map(([designation, count]) => ({ designation, cells: count }));
}

import type { Insertable } from "kysely";
import type { Database } from "@/db/client";
import { isoDay, localInstant } from "../simulate/scenario/local-time";
import type { Scenario } from "../simulate/scenario/scenario";
import { toWgs84 } from "../simulate/scenario/geometry";
import { rowId } from "./row-id";

type Rows<Table extends keyof Database> = Insertable<Database[Table]>[];

export function clock(minutes: number): string {
  const pad = (n: number): string => String(n).padStart(2, "0");
  return `${pad(Math.floor(minutes / 60))}:${pad(minutes % 60)}:00`;
}

export function organisationRow(s: Scenario): Insertable<Database["organisation"]> {
  return { ...s.organisation, isDemonstration: true, createdAt: localInstant(s.firstDay, 480) };
}

export function personRows(s: Scenario, passwordHash: string): Rows<"person"> {
  const joined = localInstant(s.firstDay, 9 * 60);
  return s.people.map((p) => ({
    id: rowId("person", p.key),
    name: p.name,
    email: p.email,
    roles: [...p.roles],
    passwordHash,
    invitedAt: joined,
    joinedAt: joined,
    createdAt: joined,
  }));
}

/** Monday's digest for the supervisor, Monday's and Thursday's for the dispatcher. */
export function digestRows(): Rows<"digestSetting"> {
  return [
    { personId: rowId("person", "supervisor"), weekdays: [1], sendAt: "07:00:00", horizonDays: 14 },
    {
      personId: rowId("person", "dispatcher"),
      weekdays: [1, 4],
      sendAt: "06:45:00",
      horizonDays: 21,
    },
  ];
}

export function depotRows(s: Scenario): Rows<"depot"> {
  return s.district.depots.map((d) => ({
    id: rowId("depot", d.bank),
    name: d.name,
    ...toWgs84(d.at),
  }));
}

export function crewRows(s: Scenario): Rows<"crew"> {
  return s.crews.map((c) => ({
    id: rowId("crew", c.key),
    name: c.name,
    depotId: rowId("depot", c.bank),
  }));
}

export function vanRows(s: Scenario): Rows<"van"> {
  return s.technicians.map((t) => ({
    id: rowId("van", t.vanKey),
    name: t.vanName,
    crewId: rowId("crew", t.crewKey),
    cellCapacity: 240,
  }));
}

export function technicianRows(s: Scenario): Rows<"technician"> {
  return s.technicians.map((t) => ({
    id: rowId("technician", t.key),
    personId: rowId("person", t.personKey),
    crewId: rowId("crew", t.crewKey),
    vanId: rowId("van", t.vanKey),
    tickets: [...t.tickets],
  }));
}

/** Everybody's break, in minutes past local midnight. */
const NOON = 12 * 60;
const BREAK_MINUTES = 30;

export function shiftRows(s: Scenario): Rows<"shift"> {
  return s.technicians.flatMap((t) =>
    Object.entries(t.shifts).map(([weekday, [starts, ends]]) => ({
      technicianId: rowId("technician", t.key),
      weekday: Number(weekday),
      starts: clock(starts),
      ends: clock(ends),
      breakStarts: clock(NOON),
      breakEnds: clock(NOON + BREAK_MINUTES),
    })),
  );
}

export function absenceRows(s: Scenario): Rows<"absence"> {
  return s.absences.map((a) => ({
    id: rowId("absence", `${a.technicianKey}/${a.firstDay}`),
    technicianId: rowId("technician", a.technicianKey),
    firstDay: isoDay(a.firstDay),
    lastDay: isoDay(a.lastDay),
    reason: a.reason,
  }));
}

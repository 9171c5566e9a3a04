import { weekName } from "@/lib/usecases/plan-week";
import type { Insertable } from "kysely";
import type { Database } from "@/db/client";
import type { ScenarioRound } from "../simulate/scenario/field-log";
import { isoDay, localInstant, weekdayOf } from "../simulate/scenario/local-time";
import type { Scenario } from "../simulate/scenario/scenario";
import { rowId } from "./row-id";

type Rows<Table extends keyof Database> = Insertable<Database[Table]>[];

/** Rounds older than this are history enough as packs and readings. */
const KEPT_DAYS = 56;

export interface RoundRows {
  readonly plans: Rows<"plan">;
  readonly rounds: Rows<"round">;
  readonly stops: Rows<"stop">;
  readonly tasks: Rows<"task">;
}

const mondayOf = (day: number): number => day - (weekdayOf(day) - 1);
const planKey = (day: number): string => isoDay(mondayOf(day));
const roundKey = (r: ScenarioRound): string => `${r.technicianKey}/${isoDay(r.day)}`;

function planRow(monday: number, now: Date): Insertable<Database["plan"]> {
  const usual = localInstant(monday - 3, 15 * 60);
  const published = usual < now ? usual : now;
  const dispatcher = rowId("person", "dispatcher");
  return {
    id: rowId("plan", isoDay(monday)),
    name: weekName(isoDay(monday), isoDay(monday)),
    firstDay: isoDay(monday),
    lastDay: isoDay(monday + 6),
    state: "published",
    createdBy: dispatcher,
    createdAt: new Date(published.getTime() - 3_600_000),
    publishedBy: dispatcher,
    publishedAt: published,
  };
}

function roundRow(r: ScenarioRound, publishedAt: Date): Insertable<Database["round"]> {
  const id = rowId("round", roundKey(r));
  const done = r.state === "done";
  return {
    id,
    planId: rowId("plan", planKey(r.day)),
    technicianId: rowId("technician", r.technicianKey),
    day: isoDay(r.day),
    state: r.state,
    startsAt: r.startsAt,
    endsAt: r.endsAt,
    driveS: r.driveS,
    workS: Math.round(r.workS),
    distanceM: r.distanceM,
    icalUid: `${id}@quillmere.example`,
    publishedAt,
    startedAt: done ? r.startsAt : null,
    doneAt: done ? r.endsAt : null,
  };
}

function stopRows(r: ScenarioRound): Rows<"stop"> {
  return r.stops.map((stop, i) => ({
    id: rowId("stop", `${roundKey(r)}/${stop.siteCode}`),
    roundId: rowId("round", roundKey(r)),
    siteId: rowId("site", stop.siteCode),
    position: i + 1,
    arrivesAt: stop.arrivesAt,
    departsAt: stop.departsAt,
    state: r.state === "done" ? "done" : "planned",
    doneAt: r.state === "done" ? stop.departsAt : null,
  }));
}

function taskRows(r: ScenarioRound): Rows<"task"> {
  return r.stops.flatMap((stop) =>
    stop.tasks.map((task) => ({
      id: rowId("task", `${roundKey(r)}/${task.assetTag}`),
      stopId: rowId("stop", `${roundKey(r)}/${stop.siteCode}`),
      assetId: rowId("asset", task.assetTag),
      packId: task.packKey && rowId("pack", task.packKey),
      kind: task.kind,
      cellTypeId: task.designation && rowId("cell-type", task.designation),
      cells: task.cells,
      state: r.state === "done" ? "done" : "planned",
      doneAt: r.state === "done" ? stop.departsAt : null,
    })),
  );
}

/** Rounds of the last weeks (done) and the few already promised, week by week in published plans. */
export function roundRows(s: Scenario): RoundRows {
  const kept = s.rounds.filter((r) => r.day >= mondayOf(s.today - KEPT_DAYS));
  const mondays = [...new Set(kept.map((r) => mondayOf(r.day)))].sort((a, b) => a - b);
  const plans = mondays.map((monday) => planRow(monday, s.now));
  const publishedAt = new Map(plans.map((p) => [p.firstDay, p.publishedAt as Date]));
  return {
    plans,
    rounds: kept.map((r) => roundRow(r, publishedAt.get(planKey(r.day)) ?? s.now)),
    stops: kept.flatMap(stopRows),
    tasks: kept.flatMap(taskRows),
  };
}

import { type Kysely, sql } from "kysely";
import type { Database } from "../client";
import type { SiteAccess } from "./sites";

/** A task with the words and the forecast that go with it. */
export interface SheetTask {
  readonly taskId: string;
  readonly stopId: string;
  readonly kind: string;
  readonly state: string;
  readonly assetId: string;
  readonly tag: string;
  readonly assetName: string;
  readonly cellTypeId: string | null;
  readonly designation: string | null;
  readonly chemistry: string | null;
  readonly cells: number;
  readonly shareLeftPermille: number | null;
  readonly outNowPermille: number | null;
  readonly p50: Date | null;
}

export interface SheetStop extends SiteAccess {
  readonly stopId: string;
  readonly roundId: string;
  readonly position: number;
  readonly state: string;
  readonly locked: boolean;
  readonly arrivesAt: Date;
  readonly departsAt: Date;
  readonly contactToldAt: Date | null;
  readonly siteId: string;
  readonly siteCode: string;
  readonly siteName: string;
  readonly latitude: number;
  readonly longitude: number;
  readonly tasks: readonly SheetTask[];
}

/** What stands on the sheets of these rounds: stops in order with site, tasks and forecasts. */
export async function loadRoundSheets(
  db: Kysely<Database>,
  roundIds: readonly string[],
): Promise<SheetStop[]> {
  if (roundIds.length === 0) return [];
  const stops = await db
    .selectFrom("stop")
    .innerJoin("site", "site.id", "stop.siteId")
    .select(["stop.id as stopId", "stop.roundId", "stop.position", "stop.state", "stop.locked"])
    .select(["stop.arrivesAt", "stop.departsAt", "stop.contactToldAt"])
    .select(["site.id as siteId", "site.code as siteCode", "site.name as siteName"])
    .select(["site.latitude", "site.longitude", "site.noticeDays", "site.opens", "site.closes"])
    .select(["site.keyCode", "site.contactName", "site.contactEmail", "site.contactPhone"])
    .select(["site.hazards", "site.tickets", "site.driveUpNotes"])
    .where("stop.roundId", "in", roundIds)
    .orderBy("stop.position")
    .execute();
  const tasks = await loadSheetTasks(db, roundIds);
  const byStop = new Map<string, SheetTask[]>();
  for (const task of tasks) {
    const list = byStop.get(task.stopId);
    if (list) list.push(task);
    else byStop.set(task.stopId, [task]);
  }
  return stops.map((stop) => ({ ...stop, tasks: byStop.get(stop.stopId) ?? [] }));
}

async function loadSheetTasks(
  db: Kysely<Database>,
  roundIds: readonly string[],
): Promise<SheetTask[]> {
  return db
    .selectFrom("task")
    .innerJoin("stop", "stop.id", "task.stopId")
    .innerJoin("asset", "asset.id", "task.assetId")
    .leftJoin("cellType", "cellType.id", "task.cellTypeId")
    .leftJoin("forecast", "forecast.packId", "task.packId")
    .select(["task.id as taskId", "task.stopId", "task.kind", "task.state", "task.assetId"])
    .select(["asset.tag", "asset.name as assetName", "task.cellTypeId", "task.cells"])
    .select(["cellType.designation", "cellType.chemistry"])
    .select(["forecast.shareLeftPermille", "forecast.outNowPermille", "forecast.p50"])
    .where("stop.roundId", "in", roundIds)
    .orderBy(sql`task.kind = 'swap'`, "desc")
    .orderBy("asset.tag")
    .execute();
}

/** Notes that the contacts of these stops have been told. */
export async function noteContactsTold(
  db: Kysely<Database>,
  stopIds: readonly string[],
  at: Date,
): Promise<void> {
  if (stopIds.length === 0) return;
  await db.updateTable("stop").set({ contactToldAt: at }).where("id", "in", stopIds).execute();
}

import type { Kysely } from "kysely";
import type { Database } from "../client";

const BINDING = ["published", "started", "done"] as const;

/** A technician's rounds that bind, with stops in order and their tasks. */
export async function loadFieldRounds(
  db: Kysely<Database>,
  technicianId: string,
  firstDay: string,
  lastDay: string,
) {
  const rounds = await db
    .selectFrom("round")
    .select(["id", "day", "state", "startsAt", "endsAt", "driveS", "workS", "distanceM"])
    .select(["reorderedAt", "orderReplacedAt"])
    .where("technicianId", "=", technicianId)
    .where("state", "in", BINDING)
    .where("day", ">=", firstDay)
    .where("day", "<=", lastDay)
    .orderBy("day")
    .execute();
  const ids = rounds.map((round) => round.id);
  if (ids.length === 0) return { rounds, stops: [], tasks: [] };
  const [stops, tasks] = await Promise.all([
    db
      .selectFrom("stop")
      .select(["id", "roundId", "siteId", "position", "arrivesAt", "departsAt", "state"])
      .select(["cannotReason", "returnOn", "doneAt"])
      .where("roundId", "in", ids)
      .orderBy("position")
      .execute(),
    db
      .selectFrom("task")
      .innerJoin("stop", "stop.id", "task.stopId")
      .innerJoin("asset", "asset.id", "task.assetId")
      .select(["task.id", "task.stopId", "task.kind", "task.assetId", "task.packId"])
      .select(["task.cellTypeId", "task.cells", "task.state"])
      .where("stop.roundId", "in", ids)
      .orderBy("asset.tag")
      .execute(),
  ]);
  return { rounds, stops, tasks };
}
export type FieldRoundRows = Awaited<ReturnType<typeof loadFieldRounds>>;

/** Everything about these sites that matters on the spot. */
export async function loadFieldSites(db: Kysely<Database>, siteIds: readonly string[]) {
  if (siteIds.length === 0) return { sites: [], closures: [] };
  const [sites, closures] = await Promise.all([
    db
      .selectFrom("site")
      .select(["id", "code", "name", "latitude", "longitude", "opens", "closes", "keyCode"])
      .select(["contactName", "contactPhone", "hazards", "tickets", "driveUpNotes"])
      .where("id", "in", siteIds)
      .execute(),
    db
      .selectFrom("siteClosure")
      .select(["siteId", "firstMonthDay", "lastMonthDay", "reason"])
      .where("siteId", "in", siteIds)
      .orderBy("firstMonthDay")
      .execute(),
  ]);
  return { sites, closures };
}

/** The assets in service or stored at these sites, and those of tasks whatever their state. */
export async function loadFieldAssets(
  db: Kysely<Database>,
  siteIds: readonly string[],
  assetIds: readonly string[],
) {
  if (siteIds.length === 0) return [];
  return db
    .selectFrom("asset")
    .leftJoin("pack", (join) =>
      join.onRef("pack.assetId", "=", "asset.id").on("pack.removedAt", "is", null),
    )
    .leftJoin("lot", "lot.id", "pack.lotId")
    .leftJoin("forecast", "forecast.packId", "pack.id")
    .innerJoin("site", "site.id", "asset.siteId")
    .select(["asset.id", "asset.tag", "asset.name", "asset.siteId", "asset.deviceModelId"])
    .select(["asset.state", "asset.note", "site.climateId"])
    .select(["pack.id as packId", "lot.code as lotCode"])
    .select(["forecast.computedAt", "forecast.staleSince", "forecast.p05", "forecast.p50"])
    .select(["forecast.p95", "forecast.shareLeftPermille", "forecast.shareLeftLowPermille"])
    .select(["forecast.shareLeftHighPermille", "forecast.outNowPermille"])
    .where((eb) =>
      eb.or([
        eb.and([eb("asset.siteId", "in", siteIds), eb("asset.state", "!=", "retired")]),
        ...(assetIds.length > 0 ? [eb("asset.id", "in", assetIds)] : []),
      ]),
    )
    .orderBy("asset.tag")
    .execute();
}
export type FieldAssetRow = Awaited<ReturnType<typeof loadFieldAssets>>[number];

/** Device models with the cell types they take, the preferred one first. */
export async function loadFieldModels(db: Kysely<Database>, modelIds: readonly string[]) {
  if (modelIds.length === 0) return { models: [], accepted: [] };
  const [models, accepted] = await Promise.all([
    db
      .selectFrom("deviceModel")
      .select(["id", "name", "series", "parallel"])
      .where("id", "in", modelIds)
      .execute(),
    db
      .selectFrom("deviceModelCellType")
      .innerJoin("cellType", "cellType.id", "deviceModelCellType.cellTypeId")
      .select(["deviceModelId", "cellTypeId", "cellType.designation", "cellType.retired"])
      .where("deviceModelId", "in", modelIds)
      .orderBy("preferred", "desc")
      .orderBy("cellType.designation")
      .execute(),
  ]);
  return { models, accepted };
}

/** What lies in a technician's van, lot by lot, oldest date code first; null without a van. */
export async function loadVanStock(db: Kysely<Database>, technicianId: string) {
  const van = await db
    .selectFrom("technician")
    .innerJoin("stockPlace", "stockPlace.vanId", "technician.vanId")
    .select(["stockPlace.id as placeId", "stockPlace.name"])
    .where("technician.id", "=", technicianId)
    .executeTakeFirst();
  if (!van) return null;
  const lots = await db
    .selectFrom("lotStock")
    .innerJoin("lot", "lot.id", "lotStock.lotId")
    .select(["lot.id as lotId", "lot.code", "lot.cellTypeId", "lot.madeOn", "lotStock.cells"])
    .where("lotStock.placeId", "=", van.placeId)
    .where("lotStock.cells", ">", 0)
    .orderBy((eb) => eb.fn.coalesce("lot.madeOn", "lot.receivedOn"))
    .orderBy("lot.code")
    .execute();
  return { ...van, lots };
}

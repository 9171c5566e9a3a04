import type { Kysely } from "kysely";
import type { Database } from "../client";

/** Which part of the register a plan looks at. Empty crews: all of them; null sites: all. */
export interface FleetScope {
  readonly crewIds: readonly string[];
  readonly siteIds: readonly string[] | null;
}

/** Sites of the scope with their closed seasons, in a steady order. */
export async function loadSitesToPlan(db: Kysely<Database>, scope: FleetScope) {
  const sites = await db
    .selectFrom("site")
    .select(["id", "code", "name", "latitude", "longitude", "noticeDays", "opens", "closes"])
    .select(["tickets", "keyCode"])
    .$if(scope.siteIds !== null, (q) => q.where("id", "in", [...(scope.siteIds ?? []), NOBODY]))
    .$if(scope.siteIds === null && scope.crewIds.length > 0, (q) =>
      q.where((eb) => eb.or([eb("crewId", "in", scope.crewIds), eb("crewId", "is", null)])),
    )
    .orderBy("code")
    .execute();
  const closures = await db
    .selectFrom("siteClosure")
    .select(["siteId", "firstMonthDay", "lastMonthDay", "reason"])
    .execute();
  return sites.map((site) => ({ ...site, closures: closures.filter((c) => c.siteId === site.id) }));
}

/**
 * Sites whose last visit could not be done and where a day from which to try again is given that
 * lies ahead. A visit that was done since, or a later "can't do it" without a day, takes it away.
 */
export async function loadReturnDays(db: Kysely<Database>, today: string) {
  const last = db
    .selectFrom("stop")
    .innerJoin("round", "round.id", "stop.roundId")
    .distinctOn("stop.siteId")
    .select(["stop.siteId", "stop.state", "stop.cannotReason", "stop.returnOn"])
    .where("stop.state", "in", ["cannot_do", "done"])
    .orderBy("stop.siteId")
    .orderBy("round.day", "desc")
    .orderBy("stop.state", "desc");
  return db
    .selectFrom(last.as("last"))
    .select(["siteId", "cannotReason as reason"])
    .select((eb) => eb.ref("returnOn").$notNull().as("day"))
    .where("state", "=", "cannot_do")
    .where("returnOn", ">", today)
    .execute();
}

/** `in ()` is not SQL: a list is never empty with this id in it, which nothing has. */
const NOBODY = "00000000-0000-0000-0000-000000000000";

/** Installed packs of assets in service, with forecast, at these sites (all when null). */
export async function loadPacksToPlan(db: Kysely<Database>, siteIds: readonly string[] | null) {
  return db
    .selectFrom("pack")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .innerJoin("deviceModel", "deviceModel.id", "asset.deviceModelId")
    .innerJoin("forecast", "forecast.packId", "pack.id")
    .select([
      "pack.id as packId",
      "pack.assetId",
      "pack.installedAt",
      "pack.cellTypeId as installedCellTypeId",
      "asset.tag",
      "asset.name as assetName",
      "asset.siteId",
      "asset.deviceModelId",
      "asset.silenceCostMinorPerHour as ownSilenceCostMinorPerHour",
      "deviceModel.silenceCostMinorPerHour",
      "deviceModel.series",
      "deviceModel.parallel",
      "deviceModel.swapMinutes",
      "deviceModel.readMinutes",
      "deviceModel.habitIntervalDays",
      "forecast.cdfDays",
      "forecast.shareLeftPermille",
    ])
    .where("pack.removedAt", "is", null)
    .where("asset.state", "=", "in_service")
    .$if(siteIds !== null, (q) => q.where("asset.siteId", "in", [...(siteIds ?? []), NOBODY]))
    .orderBy("asset.tag")
    .execute();
}

/** Cell types that each device model takes, the preferred one first. */
export async function loadAcceptedCells(db: Kysely<Database>) {
  return db
    .selectFrom("deviceModelCellType")
    .innerJoin("cellType", "cellType.id", "deviceModelCellType.cellTypeId")
    .select([
      "deviceModelCellType.deviceModelId",
      "cellType.id as cellTypeId",
      "cellType.designation",
      "cellType.unitCostMinor",
    ])
    .where("cellType.retired", "=", false)
    .orderBy("deviceModelCellType.preferred", "desc")
    .orderBy("cellType.designation")
    .execute();
}

/** Technicians of these crews (all when empty) with depot, shifts, absences and van. */
export async function loadTechniciansToPlan(db: Kysely<Database>, crewIds: readonly string[]) {
  const technicians = await db
    .selectFrom("technician")
    .innerJoin("person", "person.id", "technician.personId")
    .innerJoin("crew", "crew.id", "technician.crewId")
    .innerJoin("depot", "depot.id", "crew.depotId")
    .leftJoin("van", "van.id", "technician.vanId")
    .select([
      "technician.id",
      "person.id as personId",
      "person.name",
      "person.email",
      "technician.crewId",
      "crew.name as crewName",
      "technician.tickets",
      "depot.name as depotName",
      "depot.latitude",
      "depot.longitude",
      "van.id as vanId",
      "van.name as vanName",
      "van.cellCapacity",
    ])
    .where("person.active", "=", true)
    .$if(crewIds.length > 0, (q) => q.where("technician.crewId", "in", crewIds))
    .orderBy("crew.name")
    .orderBy("person.name")
    .execute();
  const shifts = await db.selectFrom("shift").selectAll().orderBy("weekday").execute();
  const absences = await db.selectFrom("absence").selectAll().orderBy("firstDay").execute();
  return technicians.map((technician) => ({
    ...technician,
    shifts: shifts.filter((shift) => shift.technicianId === technician.id),
    absences: absences.filter((absence) => absence.technicianId === technician.id),
  }));
}

/** Cells in stores and vans, by lot, oldest date code first. */
export async function loadLotsOnHand(db: Kysely<Database>) {
  return db
    .selectFrom("lotStock")
    .innerJoin("stockPlace", "stockPlace.id", "lotStock.placeId")
    .innerJoin("lot", "lot.id", "lotStock.lotId")
    .select(["lot.id as lotId", "lot.code", "lot.cellTypeId", "lot.madeOn", "lot.receivedOn"])
    .select((eb) => eb.fn.sum<string>("lotStock.cells").as("cells"))
    .where("stockPlace.kind", "in", ["stores", "van"])
    .where("lotStock.cells", ">", 0)
    .groupBy("lot.id")
    .orderBy((eb) => eb.fn.coalesce("lot.madeOn", "lot.receivedOn"))
    .execute()
    .then((rows) => rows.map((row) => ({ ...row, cells: Number(row.cells) })));
}

export async function listCellTypeNames(db: Kysely<Database>): Promise<Map<string, string>> {
  const rows = await db.selectFrom("cellType").select(["id", "designation"]).execute();
  return new Map(rows.map((row) => [row.id, row.designation]));
}

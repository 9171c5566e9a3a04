import type { Kysely } from "kysely";
import { sql } from "kysely";
import type { Database } from "../client";

/** What every forecast of a run shares: few rows, read once. */
export async function loadForecastCatalogue(db: Kysely<Database>) {
  const [cellTypes, points, models, states, climates, depots, shifts] = await Promise.all([
    db.selectFrom("cellType").selectAll().execute(),
    db.selectFrom("capacityPoint").selectAll().execute(),
    db
      .selectFrom("deviceModel")
      .select(["id", "cutoffMv", "silenceCostMinorPerHour", "swapMinutes"])
      .execute(),
    db.selectFrom("dutyState").selectAll().orderBy("deviceModelId").orderBy("position").execute(),
    db.selectFrom("climate").select(["id", "monthlyMeanDc"]).execute(),
    db.selectFrom("depot").select(["latitude", "longitude"]).execute(),
    loadDrawShifts(db),
  ]);
  return { cellTypes, points, models, states, climates, depots, shifts };
}
export type ForecastCatalogueRows = Awaited<ReturnType<typeof loadForecastCatalogue>>;

export interface DrawShiftRow {
  readonly deviceModelId: string;
  /** The day from which the model draws otherwise. */
  readonly since: string;
  readonly factor: number;
  readonly relativeSd: number;
  readonly foundAt: Date;
}

/** Shifts of models' draws that were found and not dismissed. */
async function loadDrawShifts(db: Kysely<Database>): Promise<DrawShiftRow[]> {
  const result = await sql<DrawShiftRow>`
    select device_model_id, since, factor, relative_sd, found_at from finding
    where kind = 'draw-shift' and dismissed_at is null and relative_sd is not null`.execute(db);
  return result.rows;
}

const BEARS_ON_LIFE = [
  "pack.id as packId",
  "pack.assetId",
  "pack.cellTypeId",
  "pack.series",
  "pack.parallel",
  "pack.installedAt",
  "pack.removedAt",
  "pack.stoppedAt",
  "asset.deviceModelId",
  "asset.silenceCostMinorPerHour",
  "asset.lastHeardAt",
  "site.climateId",
  "site.latitude",
  "site.longitude",
  "measured.averageUa as measuredAverageUa",
  "measured.at as measuredAt",
] as const;

/**
 * Those of `packIds` that are in service with what bears on their life, one row a pack; or,
 * for judging forecasts afterwards, those that came out.
 */
export async function loadPacksToForecast(
  db: Kysely<Database>,
  packIds: readonly string[],
  which: "installed" | "removed" = "installed",
) {
  return db
    .selectFrom("pack")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .innerJoin("site", "site.id", "asset.siteId")
    .leftJoin("lot", "lot.id", "pack.lotId")
    .leftJoinLateral(
      (eb) =>
        eb
          .selectFrom("drawMeasurement")
          .select(["averageUa", "at"])
          .whereRef("drawMeasurement.assetId", "=", "asset.id")
          .orderBy("at", "desc")
          .limit(1)
          .as("measured"),
      (join) => join.onTrue(),
    )
    .select(BEARS_ON_LIFE)
    .select(sql<string | null>`coalesce(pack.made_on, lot.made_on)`.as("madeOn"))
    .where("pack.id", "in", packIds)
    .where("pack.removedAt", which === "installed" ? "is" : "is not", null)
    .execute();
}
export type PackToForecast = Awaited<ReturnType<typeof loadPacksToForecast>>[number];

/** Voltages of these packs in time order, the latest verdict applied; set-aside ones left out. */
export async function loadReadingsToForecast(db: Kysely<Database>, packIds: readonly string[]) {
  return db
    .selectFrom("reading")
    .leftJoinLateral(
      (eb) =>
        eb
          .selectFrom("readingVerdict")
          .select(["verdict", "correctedMv"])
          .whereRef("readingVerdict.readingId", "=", "reading.id")
          .orderBy("at", "desc")
          .limit(1)
          .as("judged"),
      (join) => join.onTrue(),
    )
    .select([
      "reading.id",
      "reading.packId",
      "reading.at",
      "reading.kind",
      "reading.loadUa",
      "reading.temperatureDc",
      "reading.accuracyMv",
      (eb) => eb.fn.coalesce("judged.correctedMv", "reading.millivolts").as("millivolts"),
    ])
    .where("reading.packId", "in", packIds)
    .where((eb) =>
      eb.or([eb("judged.verdict", "is", null), eb("judged.verdict", "!=", "set_aside")]),
    )
    .orderBy("reading.packId")
    .orderBy("reading.at")
    .execute();
}
export type ReadingToForecast = Awaited<ReturnType<typeof loadReadingsToForecast>>[number];

/** Events on these assets that bear on life: replacements, firmware, stops. */
export async function loadDeviceEvents(db: Kysely<Database>, assetIds: readonly string[]) {
  return db
    .selectFrom("deviceEvent")
    .select(["assetId", "at", "kind", "lastHeardAt"])
    .where("assetId", "in", assetIds)
    .orderBy("at")
    .execute();
}
export type DeviceEventRow = Awaited<ReturnType<typeof loadDeviceEvents>>[number];

import type { Kysely } from "kysely";
import type { Database } from "../client";

/** Every installed pack of an asset in service with its place and forecast. */
export async function loadMapPacks(db: Kysely<Database>, until: Date | null) {
  return db
    .selectFrom("pack")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .innerJoin("site", "site.id", "asset.siteId")
    .leftJoin("forecast", "forecast.packId", "pack.id")
    .select(["asset.id as assetId", "asset.tag", "asset.name as assetName"])
    .select(["site.id as siteId", "site.name as siteName", "site.latitude", "site.longitude"])
    .select(["forecast.p05", "forecast.p50", "forecast.p95", "forecast.shareLeftPermille"])
    .select(["forecast.outNowPermille", "forecast.waitingCostMinorPerWeek"])
    .where("pack.removedAt", "is", null)
    .where("asset.state", "=", "in_service")
    .$if(until !== null, (q) => q.where("forecast.p50", "<=", until ?? new Date(0)))
    .orderBy("forecast.p50")
    .orderBy("asset.tag")
    .execute();
}

import { type Kysely, sql, type SqlBool, type Transaction } from "kysely";
import type { Database } from "../client";

/** Everyone who gets a digest, with what they chose. */
export async function listDigestSettings(db: Kysely<Database>) {
  return db
    .selectFrom("digestSetting")
    .innerJoin("person", "person.id", "digestSetting.personId")
    .select([
      "person.id as personId",
      "person.name",
      "person.email",
      "digestSetting.weekdays",
      "digestSetting.sendAt",
      "digestSetting.horizonDays",
      "digestSetting.lastSentOn",
    ])
    .where("person.active", "=", true)
    .execute();
}

/**
 * Marks a person's digest of a day as ordered.
 * @returns false when another worker was first
 */
export async function claimDigest(
  trx: Transaction<Database>,
  personId: string,
  day: string,
): Promise<boolean> {
  const row = await trx
    .updateTable("digestSetting")
    .set({ lastSentOn: day })
    .where("personId", "=", personId)
    .where((eb) => eb.or([eb("lastSentOn", "is", null), eb("lastSentOn", "<", day)]))
    .returning("personId")
    .executeTakeFirst();
  return row !== undefined;
}

/** Chance below which a pack is not called due. */
const LIKELY_ENOUGH = 0.5;

/** Packs more likely than not to reach cut-off within `days`, soonest first, with their visit. */
export async function duePacks(db: Kysely<Database>, now: Date, today: string, days: number) {
  const limit = now.getTime() / 86_400_000 + days;
  return db
    .selectFrom("forecast")
    .innerJoin("pack", "pack.id", "forecast.packId")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .innerJoin("site", "site.id", "asset.siteId")
    .select([
      "asset.tag",
      "asset.name as assetName",
      "site.name as siteName",
      "forecast.p05",
      "forecast.p50",
      "forecast.p95",
      "forecast.shareLeftPermille",
      "forecast.outNowPermille",
      sql<string | null>`(select min(round.day) from task
          join stop on stop.id = task.stop_id join round on round.id = stop.round_id
        where task.asset_id = asset.id and task.kind = 'swap' and task.state = 'planned'
          and round.state in ('published', 'started') and round.day >= ${today}::date)`.as(
        "visitOn",
      ),
    ])
    .where("pack.removedAt", "is", null)
    .where("asset.state", "=", "in_service")
    .where(
      sql<SqlBool>`(select count(*) from unnest(forecast.cdf_days) d where d <= ${limit}) >= ${LIKELY_ENOUGH * 50}`,
    )
    .orderBy("forecast.p50")
    .execute();
}

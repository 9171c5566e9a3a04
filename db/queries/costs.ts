import { type Kysely, sql } from "kysely";
import type { Database } from "../client";

/** Packs that came out, by month and reason, with what was thrown away and what went in. */
export async function removalsByMonth(db: Kysely<Database>, since: Date, timeZone: string) {
  return db
    .selectFrom("pack")
    .innerJoin("cellType", "cellType.id", "pack.cellTypeId")
    .leftJoin("forecastOutcome as outcome", "outcome.packId", "pack.id")
    .select([
      sql<string>`to_char(pack.removed_at at time zone ${timeZone}, 'YYYY-MM')`.as("month"),
      sql<number>`count(*)`.as("removals"),
      sql<number>`count(*) filter (where reason_out = 'early')`.as("early"),
      sql<number>`count(*) filter (where reason_out = 'due')`.as("due"),
      sql<number>`count(*) filter (where stopped_at is not null)`.as("stopped"),
      sql<number>`coalesce(sum(extract(epoch from pack.removed_at - stopped_at) / 3600)
        filter (where stopped_at is not null), 0)::float8`.as("silentHours"),
      sql<number>`sum(series * parallel * unit_cost_minor)::float8`.as("cellsMinor"),
      sql<number>`coalesce(sum(share_left_permille / 1000.0 * rated_capacity_mah * parallel), 0)::float8`.as(
        "thrownMah",
      ),
      sql<number>`coalesce(sum(rated_capacity_mah * parallel)
        filter (where outcome.pack_id is not null), 0)::float8`.as("ratedMah"),
    ])
    .where("pack.removedAt", ">=", since)
    .groupBy("month")
    .orderBy("month")
    .execute();
}

/** Driving and working in rounds that were done, by month. */
export async function roundsByMonth(db: Kysely<Database>, since: string) {
  return db
    .selectFrom("round")
    .select([
      sql<string>`to_char(day, 'YYYY-MM')`.as("month"),
      sql<number>`count(*)`.as("rounds"),
      sql<number>`sum(drive_s + work_s)::float8`.as("seconds"),
      sql<number>`sum(distance_m)::float8`.as("metres"),
    ])
    .where("state", "=", "done")
    .where("day", ">=", since)
    .groupBy("month")
    .orderBy("month")
    .execute();
}

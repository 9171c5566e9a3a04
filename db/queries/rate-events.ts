import type { Kysely } from "kysely";
import type { Database } from "../client";

/** Counts one attempt under each bucket. @returns the rows' ids, to take them back again */
export async function insertRateEvents(
  db: Kysely<Database>,
  buckets: readonly string[],
  at: Date,
): Promise<number[]> {
  const rows = await db
    .insertInto("rateEvent")
    .values(buckets.map((bucket) => ({ bucket, at })))
    .returning("id")
    .execute();
  return rows.map((row) => row.id);
}

/** How many attempts a bucket holds since a moment, and when the first of them was. */
export async function countRateEvents(
  db: Kysely<Database>,
  bucket: string,
  since: Date,
): Promise<{ count: number; first: Date | null }> {
  const row = await db
    .selectFrom("rateEvent")
    .select((eb) => [eb.fn.countAll<number>().as("count"), eb.fn.min("at").as("first")])
    .where("bucket", "=", bucket)
    .where("at", ">", since)
    .executeTakeFirstOrThrow();
  return { count: row.count, first: row.first };
}

export async function deleteRateEvents(
  db: Kysely<Database>,
  ids: readonly number[],
): Promise<void> {
  await db.deleteFrom("rateEvent").where("id", "in", ids).execute();
}

/** Forgives a bucket wholly. */
export async function clearRateBucket(db: Kysely<Database>, bucket: string): Promise<void> {
  await db.deleteFrom("rateEvent").where("bucket", "=", bucket).execute();
}

/** Drops what one bucket no longer counts. */
export async function forgetBucketEvents(
  db: Kysely<Database>,
  bucket: string,
  before: Date,
): Promise<void> {
  await db.deleteFrom("rateEvent").where("bucket", "=", bucket).where("at", "<=", before).execute();
}

/** Keeps the table small: attempts this old count nowhere. */
export async function forgetRateEvents(db: Kysely<Database>, before: Date): Promise<void> {
  await db.deleteFrom("rateEvent").where("at", "<", before).execute();
}

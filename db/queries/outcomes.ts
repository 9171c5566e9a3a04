import { type Insertable, type Kysely, sql } from "kysely";
import type { Database } from "../client";

export type OutcomeRow = Insertable<Database["forecastOutcome"]>;

/** Packs that came out and have no outcome kept, or no promised life beside it, oldest first. */
export async function unjudgedPacks(
  db: Kysely<Database>,
  limit: number,
): Promise<{ readonly id: string; readonly kept: boolean }[]> {
  return db
    .selectFrom("pack")
    .leftJoin("forecastOutcome", "forecastOutcome.packId", "pack.id")
    .select(["pack.id", sql<boolean>`forecast_outcome.pack_id is not null`.as("kept")])
    .where("pack.removedAt", "is not", null)
    .where("forecastOutcome.promisedDays", "is", null)
    .orderBy("pack.removedAt")
    .orderBy("pack.id")
    .limit(limit)
    .execute();
}

/** Keeps outcomes; one that is kept already stays as it is. */
export async function insertOutcomes(
  db: Kysely<Database>,
  rows: readonly OutcomeRow[],
): Promise<void> {
  if (rows.length === 0) return;
  await db
    .insertInto("forecastOutcome")
    .values([...rows])
    .onConflict((conflict) => conflict.column("packId").doNothing())
    .execute();
}

export interface PackPromise {
  readonly packId: string;
  /** Median life by the data sheet alone, days. */
  readonly promisedDays: number;
}

/** Puts beside kept outcomes what the data sheets had promised. */
export async function keepPromises(
  db: Kysely<Database>,
  promises: readonly PackPromise[],
): Promise<void> {
  const ids = promises.map(({ packId }) => packId);
  const days = promises.map(({ promisedDays }) => promisedDays);
  await sql`
    update forecast_outcome o set promised_days = p.days
    from unnest(${ids}::uuid[], ${days}::real[]) as p(id, days)
    where o.pack_id = p.id`.execute(db);
}

/** How much there is to learn of each chemistry: changes when a pack comes out. */
export async function finishedByChemistry(db: Kysely<Database>) {
  return db
    .selectFrom("pack")
    .innerJoin("cellType", "cellType.id", "pack.cellTypeId")
    .select(["cellType.chemistry", sql<string>`count(*) || ' ' || max(removed_at)`.as("version")])
    .where("pack.removedAt", "is not", null)
    .groupBy("cellType.chemistry")
    .execute();
}

/**
 * The latest packs on cells of a chemistry that came out before a moment (any, where null), at
 * most so many of a device model.
 */
export async function listFinishedPacks(
  db: Kysely<Database>,
  chemistry: string,
  ofEachModel: number,
  before: Date | null,
) {
  return db
    .with("latest", (eb) =>
      eb
        .selectFrom("pack")
        .innerJoin("asset", "asset.id", "pack.assetId")
        .innerJoin("cellType", "cellType.id", "pack.cellTypeId")
        .select(["pack.id as packId", "pack.lotId"])
        .select([
          sql<boolean>`stopped_at is null`.as("censored"),
          sql<Date>`coalesce(stopped_at, removed_at)`.as("endedAt"),
          sql<number>`row_number() over (partition by asset.device_model_id
            order by coalesce(stopped_at, removed_at) desc, pack.id)`.as("place"),
        ])
        .where("cellType.chemistry", "=", chemistry)
        .where("pack.removedAt", "is not", null)
        .$if(before !== null, (q) => q.where("pack.removedAt", "<", before)),
    )
    .selectFrom("latest")
    .select(["packId", "lotId", "censored", "endedAt"])
    .where("place", "<=", ofEachModel)
    .execute();
}

/** Mean share of charge that packs had left, by forecast, when they came out alive; null: none. */
export async function meanShareLeft(
  db: Kysely<Database>,
  since: Date,
  crewId: string | null,
): Promise<number | null> {
  const row = await db
    .selectFrom("forecastOutcome as outcome")
    .innerJoin("pack", "pack.id", "outcome.packId")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .innerJoin("site", "site.id", "asset.siteId")
    .select(sql<number | null>`(avg(share_left_permille) / 1000)::float8`.as("share"))
    .where("outcome.censored", "=", true)
    .where("pack.removedAt", ">=", since)
    .$if(crewId !== null, (q) => q.where("site.crewId", "=", crewId ?? ""))
    .executeTakeFirstOrThrow();
  return row.share;
}

import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "../client";

/** Marks forecasts as older than what is known; keeps the first moment of staleness. */
export async function markForecastsStale(
  trx: Transaction<Database>,
  packIds: readonly string[],
  at: Date,
): Promise<void> {
  await trx
    .updateTable("forecast")
    .set({ staleSince: at })
    .where("packId", "in", packIds)
    .where("staleSince", "is", null)
    .execute();
}

/** Packs in service of these assets. */
export async function installedPackIds(
  db: Kysely<Database>,
  assetIds: readonly string[],
): Promise<string[]> {
  const rows = await db
    .selectFrom("pack")
    .select("id")
    .where("removedAt", "is", null)
    .where("assetId", "in", assetIds)
    .execute();
  return rows.map((row) => row.id);
}

/** The next packs in service by id, after one (from the first when null). */
export async function installedPackPage(
  db: Kysely<Database>,
  after: string | null,
  count: number,
): Promise<string[]> {
  const rows = await db
    .selectFrom("pack")
    .select("id")
    .where("removedAt", "is", null)
    .$if(after !== null, (query) => query.where("id", ">", after ?? ""))
    .orderBy("id")
    .limit(count)
    .execute();
  return rows.map((row) => row.id);
}

export interface ForecastRow {
  readonly packId: string;
  readonly p05: Date;
  readonly p20: Date;
  readonly p50: Date;
  readonly p80: Date;
  readonly p95: Date;
  readonly cdfDays: number[];
  readonly shareLeftPermille: number;
  readonly shareLeftLowPermille: number;
  readonly shareLeftHighPermille: number;
  readonly drawUa: number;
  readonly outNowPermille: number;
  readonly waitingCostMinorPerWeek: number;
  readonly basis: Record<string, unknown>;
  readonly weights: readonly unknown[];
}

/**
 * Writes forecasts that rest on what was known at `knownAt`. Whatever was marked stale
 * after that moment stays stale: its own job is still to come.
 */
export async function saveForecasts(
  db: Kysely<Database>,
  rows: readonly ForecastRow[],
  knownAt: Date,
): Promise<void> {
  if (rows.length === 0) return;
  const values = rows.map((row) => ({
    ...row,
    computedAt: knownAt,
    basis: JSON.stringify(row.basis),
    weights: JSON.stringify(row.weights),
  }));
  await db
    .insertInto("forecast")
    .values(values)
    .onConflict((conflict) =>
      conflict.column("packId").doUpdateSet((eb) => ({
        ...Object.fromEntries(COLUMNS.map((column) => [column, eb.ref(`excluded.${column}`)])),
        staleSince: sql<Date | null>`case when forecast.stale_since > ${knownAt}
          then forecast.stale_since end`,
      })),
    )
    .execute();
}

const COLUMNS = [
  "computedAt",
  "p05",
  "p20",
  "p50",
  "p80",
  "p95",
  "cdfDays",
  "shareLeftPermille",
  "shareLeftLowPermille",
  "shareLeftHighPermille",
  "drawUa",
  "outNowPermille",
  "waitingCostMinorPerWeek",
  "basis",
  "weights",
] as const;

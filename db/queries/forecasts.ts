import type { Kysely, Transaction } from "kysely";
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

/** Packs in service of these assets (all when null). */
export async function installedPackIds(
  db: Kysely<Database>,
  assetIds: readonly string[] | null,
): Promise<string[]> {
  const rows = await db
    .selectFrom("pack")
    .select("id")
    .where("removedAt", "is", null)
    .$if(assetIds !== null, (query) => query.where("assetId", "in", assetIds ?? []))
    .execute();
  return rows.map((row) => row.id);
}

import type { Kysely, Transaction } from "kysely";
import type { Database } from "../client";

export interface LeftOutRow {
  readonly assetId: string;
  readonly reason: string;
  readonly detail: string;
  readonly earliestDay: string | null;
  readonly waitingCostMinorPerWeek: number;
}

/** Writes what a plan leaves out; hand-made exclusions stay unless `rows` says otherwise. */
export async function replaceLeftOut(
  trx: Transaction<Database>,
  planId: string,
  rows: readonly LeftOutRow[],
): Promise<void> {
  await trx.deleteFrom("planLeftOut").where("planId", "=", planId).execute();
  for (let from = 0; from < rows.length; from += 1000) {
    await trx
      .insertInto("planLeftOut")
      .values(rows.slice(from, from + 1000).map((row) => ({ ...row, planId })))
      .execute();
  }
}

/** Notes that an asset is not in the plan any more, or takes the note back (null). */
export async function noteLeftOut(
  trx: Transaction<Database>,
  planId: string,
  assetIds: readonly string[],
  row: Omit<LeftOutRow, "assetId"> | null,
): Promise<void> {
  if (assetIds.length === 0) return;
  await trx
    .deleteFrom("planLeftOut")
    .where("planId", "=", planId)
    .where("assetId", "in", assetIds)
    .execute();
  if (!row) return;
  await trx
    .insertInto("planLeftOut")
    .values(assetIds.map((assetId) => ({ ...row, assetId, planId })))
    .execute();
}

export async function loadLeftOut(db: Kysely<Database>, planId: string): Promise<LeftOutRow[]> {
  return db
    .selectFrom("planLeftOut")
    .select(["assetId", "reason", "detail", "earliestDay", "waitingCostMinorPerWeek"])
    .where("planId", "=", planId)
    .orderBy("waitingCostMinorPerWeek", "desc")
    .orderBy("assetId")
    .execute();
}

/** What a plan leaves out, with the asset's words, place and forecast; swaps it holds left out. */
export async function loadLeftOutAssets(db: Kysely<Database>, planId: string) {
  return db
    .selectFrom("planLeftOut")
    .innerJoin("asset", "asset.id", "planLeftOut.assetId")
    .innerJoin("site", "site.id", "asset.siteId")
    .leftJoin("pack", (join) =>
      join.onRef("pack.assetId", "=", "asset.id").on("pack.removedAt", "is", null),
    )
    .leftJoin("forecast", "forecast.packId", "pack.id")
    .select(["planLeftOut.assetId", "planLeftOut.reason", "planLeftOut.detail"])
    .select(["planLeftOut.earliestDay", "planLeftOut.waitingCostMinorPerWeek"])
    .select(["asset.tag", "asset.name as assetName", "site.id as siteId"])
    .select(["site.latitude", "site.longitude"])
    .select(["forecast.shareLeftPermille", "forecast.outNowPermille", "forecast.p50"])
    .where("planLeftOut.planId", "=", planId)
    .orderBy("planLeftOut.waitingCostMinorPerWeek", "desc")
    .orderBy("asset.tag")
    .execute();
}

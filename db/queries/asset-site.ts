import type { Kysely } from "kysely";
import type { Database } from "../client";

/** Where an asset stands and what its next pack would be, or null. */
export async function findAssetSite(db: Kysely<Database>, assetId: string) {
  const row = await db
    .selectFrom("asset")
    .innerJoin("deviceModel", "deviceModel.id", "asset.deviceModelId")
    .leftJoin("pack", (join) =>
      join.onRef("pack.assetId", "=", "asset.id").on("pack.removedAt", "is", null),
    )
    .leftJoin("deviceModelCellType as accepted", (join) =>
      join
        .onRef("accepted.deviceModelId", "=", "deviceModel.id")
        .on("accepted.preferred", "=", true),
    )
    .select(["asset.tag", "asset.name", "asset.siteId", "pack.id as packId"])
    .select((eb) => [
      eb.fn.coalesce("accepted.cellTypeId", "pack.cellTypeId").as("cellTypeId"),
      eb("deviceModel.series", "*", eb.ref("deviceModel.parallel")).as("cells"),
    ])
    .where("asset.id", "=", assetId)
    .where("asset.state", "=", "in_service")
    .executeTakeFirst();
  return row ? { ...row, cells: Number(row.cells) } : null;
}

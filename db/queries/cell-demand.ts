import { type Kysely, sql } from "kysely";
import type { Database } from "../client";

/**
 * Installed packs of assets in service with their forecast, and the cell type that would replace
 * each: the device model's preferred one that is not retired, else the type that is in.
 */
export async function loadPacksThatWillAsk(db: Kysely<Database>) {
  return db
    .selectFrom("pack")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .innerJoin("deviceModel", "deviceModel.id", "asset.deviceModelId")
    .innerJoin("forecast", "forecast.packId", "pack.id")
    .select(["pack.installedAt", "forecast.cdfDays"])
    .select(sql<number>`device_model.series * device_model.parallel`.as("cells"))
    .select(
      sql<string>`coalesce((select takes.cell_type_id from device_model_cell_type takes
        join cell_type on cell_type.id = takes.cell_type_id and not cell_type.retired
        where takes.device_model_id = device_model.id
        order by takes.preferred desc, cell_type.designation limit 1), pack.cell_type_id)`.as(
        "cellTypeId",
      ),
    )
    .where("pack.removedAt", "is", null)
    .where("asset.state", "=", "in_service")
    .execute();
}

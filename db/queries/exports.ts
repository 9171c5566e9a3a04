import type { Kysely } from "kysely";
import type { Database } from "../client";

/** Every pack there was, for the file of installs. */
export async function listInstalls(db: Kysely<Database>) {
  return db
    .selectFrom("pack")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .innerJoin("cellType", "cellType.id", "pack.cellTypeId")
    .leftJoin("lot", "lot.id", "pack.lotId")
    .select([
      "asset.tag",
      "pack.installedAt",
      "cellType.designation",
      "pack.series",
      "pack.parallel",
      "lot.code as lotCode",
      "pack.madeOn",
      "pack.removedAt",
      "pack.reasonOut",
      "pack.voltageOutMv",
      "pack.stoppedAt",
      "pack.lookOut",
    ])
    .orderBy("pack.installedAt")
    .orderBy("asset.tag")
    .execute();
}

/** Every voltage there is, for the file of readings. */
export async function listReadings(db: Kysely<Database>) {
  return db
    .selectFrom("reading")
    .innerJoin("pack", "pack.id", "reading.packId")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .select([
      "asset.tag",
      "reading.at",
      "reading.millivolts",
      "reading.kind",
      "reading.loadUa",
      "reading.temperatureDc",
      "reading.accuracyMv",
      "reading.instrument",
      "reading.note",
      "reading.doubt",
    ])
    .orderBy("reading.at")
    .orderBy("asset.tag")
    .execute();
}

import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "../client";

export const REASONS_OUT = [
  "due",
  "early",
  "found_stopped",
  "fault",
  "device_removed",
  "other",
] as const;
export type ReasonOut = (typeof REASONS_OUT)[number];

/** Locks an asset for the rest of the transaction: two swaps at once wait for each other. */
export async function lockAsset(trx: Transaction<Database>, assetId: string) {
  const row = await trx
    .selectFrom("asset")
    .innerJoin("deviceModel", "deviceModel.id", "asset.deviceModelId")
    .select([
      "asset.id",
      "asset.tag",
      "asset.state",
      "asset.deviceModelId",
      "deviceModel.series",
      "deviceModel.parallel",
    ])
    .where("asset.id", "=", assetId)
    .forUpdate("asset")
    .executeTakeFirst();
  return row ?? null;
}

/** The pack in an asset now, or null. */
export async function findInstalledPack(db: Kysely<Database>, assetId: string) {
  const row = await db
    .selectFrom("pack")
    .innerJoin("cellType", "cellType.id", "pack.cellTypeId")
    .select([
      "pack.id",
      "pack.lotId",
      "pack.cellTypeId",
      "pack.installedAt",
      "pack.series",
      "pack.parallel",
      "cellType.chemistry",
      "cellType.nominalMv",
    ])
    .where("pack.assetId", "=", assetId)
    .where("pack.removedAt", "is", null)
    .executeTakeFirst();
  return row ?? null;
}

/** A pack by its id, to tell a repeat from a clash. */
export async function findPack(db: Kysely<Database>, packId: string) {
  const row = await db
    .selectFrom("pack")
    .select(["id", "assetId", "installedAt", "removedAt"])
    .where("id", "=", packId)
    .executeTakeFirst();
  return row ?? null;
}

/** Whether a device model takes this cell type. */
export async function acceptsCellType(
  db: Kysely<Database>,
  deviceModelId: string,
  cellTypeId: string,
): Promise<boolean> {
  const row = await db
    .selectFrom("deviceModelCellType")
    .select("cellTypeId")
    .where("deviceModelId", "=", deviceModelId)
    .where("cellTypeId", "=", cellTypeId)
    .executeTakeFirst();
  return row !== undefined;
}

export interface NewPack {
  readonly id: string;
  readonly assetId: string;
  readonly cellTypeId: string;
  readonly lotId: string | null;
  readonly series: number;
  readonly parallel: number;
  readonly madeOn: string | null;
  readonly installedAt: Date;
  readonly installedBy: string | null;
}

export async function insertPack(trx: Transaction<Database>, pack: NewPack): Promise<void> {
  await trx.insertInto("pack").values(pack).execute();
}

export interface PackRemoval {
  readonly removedAt: Date;
  readonly removedBy: string | null;
  readonly reasonOut: ReasonOut;
  readonly voltageOutMv: number | null;
  readonly stoppedAt: Date | null;
  readonly lookOut: string;
}

export async function closePack(
  trx: Transaction<Database>,
  packId: string,
  removal: PackRemoval,
): Promise<void> {
  await trx
    .updateTable("pack")
    .set(removal)
    .where("id", "=", packId)
    .where("removedAt", "is", null)
    .execute();
}

/**
 * Keeps the forecast that stood beside what happened, and takes it out of the standing ones:
 * a pack that is out has none. Does nothing when no forecast stood.
 */
export async function settleForecast(
  trx: Transaction<Database>,
  packId: string,
  outcome: { readonly recordedAt: Date; readonly censored: boolean; readonly endedAt: Date },
): Promise<void> {
  await sql`
    insert into forecast_outcome
      (pack_id, recorded_at, forecast_at, p05, p20, p50, p80, p95, share_left_permille, censored,
       ended_at, chance_stopped_permille)
    select pack_id, ${outcome.recordedAt}::timestamptz, computed_at, p05, p20, p50, p80, p95,
      share_left_permille, ${outcome.censored}::boolean, ${outcome.endedAt}::timestamptz,
      (select count(*) * 20 from unnest(cdf_days) as day
        where day <= extract(epoch from ${outcome.endedAt}::timestamptz) / 86400)
    from forecast where pack_id = ${packId}
    on conflict (pack_id) do nothing`.execute(trx);
  await trx.deleteFrom("forecast").where("packId", "=", packId).execute();
}

export interface NewDeviceEvent {
  readonly id: string;
  readonly assetId: string;
  readonly at: Date;
  readonly kind: "device_replaced" | "firmware_changed" | "reported" | "stopped";
  readonly lastHeardAt: Date | null;
  readonly note: string;
  readonly personId: string | null;
}

export async function insertDeviceEvent(
  trx: Transaction<Database>,
  event: NewDeviceEvent,
): Promise<void> {
  await trx
    .insertInto("deviceEvent")
    .values(event)
    .onConflict((conflict) => conflict.column("id").doNothing())
    .execute();
}

/** All packs an asset has had, newest first. */
export async function listAssetPacks(db: Kysely<Database>, assetId: string) {
  return db
    .selectFrom("pack")
    .innerJoin("cellType", "cellType.id", "pack.cellTypeId")
    .leftJoin("lot", "lot.id", "pack.lotId")
    .leftJoin("person as installer", "installer.id", "pack.installedBy")
    .leftJoin("person as remover", "remover.id", "pack.removedBy")
    .select([
      "pack.id",
      "pack.series",
      "pack.parallel",
      "pack.madeOn",
      "pack.installedAt",
      "pack.removedAt",
      "pack.reasonOut",
      "pack.voltageOutMv",
      "pack.stoppedAt",
      "pack.lookOut",
      "cellType.id as cellTypeId",
      "cellType.designation",
      "cellType.chemistry",
      "cellType.nominalMv",
      "lot.code as lotCode",
      "installer.name as installedBy",
      "remover.name as removedBy",
    ])
    .where("pack.assetId", "=", assetId)
    .orderBy("pack.installedAt", "desc")
    .execute();
}

export type AssetPackRow = Awaited<ReturnType<typeof listAssetPacks>>[number];

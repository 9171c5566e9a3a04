import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "../client";
import type { NewPack, PackRemoval } from "./packs";

/** All packs of these assets, oldest first. */
export async function findPacksOfAssets(db: Kysely<Database>, assetIds: readonly string[]) {
  if (assetIds.length === 0) return [];
  return db
    .selectFrom("pack")
    .selectAll()
    .where("assetId", "in", assetIds)
    .orderBy("installedAt")
    .execute();
}

export type PackRecordRow = Awaited<ReturnType<typeof findPacksOfAssets>>[number];

/** A whole pack: what went in and how it came out. */
export type WholePack = NewPack & { [K in keyof PackRemoval]: PackRemoval[K] | null };

/**
 * Writes packs, new or known by their id. Known ones first: a pack that the file ends must be
 * out before the next one goes in.
 */
export async function upsertPacks(
  trx: Transaction<Database>,
  known: readonly WholePack[],
  fresh: readonly WholePack[],
): Promise<void> {
  const rows = (packs: readonly WholePack[]) =>
    JSON.stringify(
      packs.map((p) => ({
        ...{ id: p.id, asset_id: p.assetId, cell_type_id: p.cellTypeId, lot_id: p.lotId },
        ...{ series: p.series, parallel: p.parallel, made_on: p.madeOn },
        ...{ installed_at: p.installedAt, installed_by: p.installedBy },
        ...{ removed_at: p.removedAt, removed_by: p.removedBy, reason_out: p.reasonOut },
        ...{ voltage_out_mv: p.voltageOutMv, stopped_at: p.stoppedAt },
        look_out: p.lookOut ?? "",
      })),
    );
  if (known.length > 0) {
    await sql`
      update pack set cell_type_id = n.cell_type_id, lot_id = n.lot_id, made_on = n.made_on,
        removed_at = n.removed_at, removed_by = n.removed_by, reason_out = n.reason_out,
        voltage_out_mv = n.voltage_out_mv, stopped_at = n.stopped_at, look_out = n.look_out
      from json_populate_recordset(null::pack, ${rows(known)}::json) n
      where pack.id = n.id`.execute(trx);
  }
  if (fresh.length > 0) {
    await sql`insert into pack select * from json_populate_recordset(null::pack, ${rows(fresh)}::json)`.execute(
      trx,
    );
  }
}

/** Lots with these codes. */
export async function findLotsByCode(db: Kysely<Database>, codes: readonly string[]) {
  if (codes.length === 0) return [];
  return db
    .selectFrom("lot")
    .select(["id", "code", "cellTypeId", "madeOn"])
    .where("code", "in", codes)
    .execute();
}

/** Stop events of devices that a file says stopped; known ones are left as they are. */
export async function insertStops(
  trx: Transaction<Database>,
  stops: readonly { id: string; assetId: string; at: Date; personId: string | null }[],
): Promise<void> {
  if (stops.length === 0) return;
  await trx
    .insertInto("deviceEvent")
    .values(stops.map((stop) => ({ ...stop, kind: "stopped", lastHeardAt: null })))
    .onConflict((conflict) => conflict.column("id").doNothing())
    .execute();
}

import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "../client";

export type StockReason = "received" | "moved" | "installed" | "returned" | "counted" | "scrapped";

export interface StockMove {
  readonly id: string;
  readonly lotId: string;
  readonly fromPlaceId: string | null;
  readonly toPlaceId: string | null;
  readonly cells: number;
  readonly at: Date;
  readonly reason: StockReason;
  readonly personId: string | null;
  readonly note: string;
}

/**
 * Appends a move and carries the counts of both places along. The caller has made sure
 * that the place holds enough (`lockLotStock`).
 */
export async function applyStockMove(
  trx: Transaction<Database>,
  move: StockMove,
): Promise<boolean> {
  const inserted = await trx
    .insertInto("stockMove")
    .values(move)
    .onConflict((conflict) => conflict.column("id").doNothing())
    .returning("id")
    .executeTakeFirst();
  if (!inserted) return false;
  if (move.fromPlaceId) await addCells(trx, move.lotId, move.fromPlaceId, -move.cells);
  if (move.toPlaceId) await addCells(trx, move.lotId, move.toPlaceId, move.cells);
  return true;
}

async function addCells(
  trx: Transaction<Database>,
  lotId: string,
  placeId: string,
  cells: number,
): Promise<void> {
  if (cells < 0) {
    await trx
      .updateTable("lotStock")
      .set((eb) => ({ cells: eb("cells", "+", cells) }))
      .where("lotId", "=", lotId)
      .where("placeId", "=", placeId)
      .execute();
    return;
  }
  await trx
    .insertInto("lotStock")
    .values({ lotId, placeId, cells })
    .onConflict((conflict) =>
      conflict
        .columns(["lotId", "placeId"])
        .doUpdateSet((eb) => ({ cells: eb("lotStock.cells", "+", cells) })),
    )
    .execute();
}

/** Cells of a lot at a place, locked for the rest of the transaction; 0 when never there. */
export async function lockLotStock(
  trx: Transaction<Database>,
  lotId: string,
  placeId: string,
): Promise<number> {
  await sql`select pg_advisory_xact_lock(hashtextextended(${lotId} || ${placeId}, 0))`.execute(trx);
  const row = await trx
    .selectFrom("lotStock")
    .select("cells")
    .where("lotId", "=", lotId)
    .where("placeId", "=", placeId)
    .forUpdate()
    .executeTakeFirst();
  return row?.cells ?? 0;
}

export async function stockMoveExists(db: Kysely<Database>, id: string): Promise<boolean> {
  const row = await db.selectFrom("stockMove").select("id").where("id", "=", id).executeTakeFirst();
  return row !== undefined;
}

/** Places cells can lie in: stores first, then vans, then return boxes. */
export async function listPlaces(db: Kysely<Database>) {
  return db
    .selectFrom("stockPlace")
    .leftJoin("van", "van.id", "stockPlace.vanId")
    .select(["stockPlace.id", "stockPlace.kind", "stockPlace.name", "van.cellCapacity"])
    .orderBy(sql`array_position(array['stores','van','return_box'], stock_place.kind)`)
    .orderBy("stockPlace.name")
    .execute();
}

export type PlaceRow = Awaited<ReturnType<typeof listPlaces>>[number];

/** Cells by type and place, for types that lie anywhere. */
export async function countByTypeAndPlace(db: Kysely<Database>) {
  return db
    .selectFrom("lotStock")
    .innerJoin("lot", "lot.id", "lotStock.lotId")
    .select((eb) => [
      "lot.cellTypeId",
      "lotStock.placeId",
      eb.fn.sum<string>("lotStock.cells").as("cells"),
    ])
    .groupBy(["lot.cellTypeId", "lotStock.placeId"])
    .execute();
}

/** The latest moves, newest first. */
export async function listStockMoves(
  db: Kysely<Database>,
  page: { readonly limit: number; readonly offset: number; readonly lotId?: string | undefined },
) {
  return db
    .selectFrom("stockMove")
    .innerJoin("lot", "lot.id", "stockMove.lotId")
    .innerJoin("cellType", "cellType.id", "lot.cellTypeId")
    .leftJoin("stockPlace as origin", "origin.id", "stockMove.fromPlaceId")
    .leftJoin("stockPlace as target", "target.id", "stockMove.toPlaceId")
    .leftJoin("person", "person.id", "stockMove.personId")
    .select([
      "stockMove.id",
      "stockMove.at",
      "stockMove.cells",
      "stockMove.reason",
      "stockMove.note",
      "lot.code as lotCode",
      "cellType.designation",
      "origin.name as fromPlace",
      "target.name as toPlace",
      "person.name as personName",
    ])
    .$if(page.lotId !== undefined, (query) => query.where("lot.id", "=", page.lotId ?? ""))
    .orderBy("stockMove.at", "desc")
    .orderBy("stockMove.id")
    .limit(page.limit)
    .offset(page.offset)
    .execute();
}

export async function countStockMoves(db: Kysely<Database>): Promise<number> {
  const row = await db
    .selectFrom("stockMove")
    .select((eb) => eb.fn.countAll<number>().as("n"))
    .executeTakeFirstOrThrow();
  return row.n;
}

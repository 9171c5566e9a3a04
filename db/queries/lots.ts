import { type Kysely, type RawBuilder, sql, type Transaction } from "kysely";
import type { Database } from "../client";

/** A lot with its cell type, or null. */
export async function findLot(db: Kysely<Database>, lotId: string) {
  const row = await db
    .selectFrom("lot")
    .innerJoin("cellType", "cellType.id", "lot.cellTypeId")
    .select([
      "lot.id",
      "lot.code",
      "lot.cellTypeId",
      "lot.madeOn",
      "lot.receivedOn",
      "lot.cellsReceived",
      "cellType.designation",
    ])
    .where("lot.id", "=", lotId)
    .executeTakeFirst();
  return row ?? null;
}

export interface NewLot {
  readonly id: string;
  readonly code: string;
  readonly cellTypeId: string;
  readonly madeOn: string | null;
  readonly receivedOn: string;
  readonly supplierReference: string;
  readonly cellsReceived: number;
  readonly unitCostMinor: number;
}

export async function insertLot(trx: Transaction<Database>, lot: NewLot): Promise<void> {
  await trx.insertInto("lot").values(lot).execute();
}

export interface LotFilter {
  readonly cellTypeId?: string | undefined;
  readonly withStockOnly: boolean;
}

export interface LotWindow {
  /** null: all. */
  readonly limit: number | null;
  readonly offset: number;
}

function where({ cellTypeId: given, withStockOnly }: LotFilter): RawBuilder<unknown> {
  const cellTypeId = given ?? null;
  return sql`(${cellTypeId}::uuid is null or l.cell_type_id = ${cellTypeId}::uuid)
    and (not ${withStockOnly}::boolean
      or exists (select from lot_stock where lot_id = l.id and cells > 0))`;
}

export async function countLots(db: Kysely<Database>, filter: LotFilter): Promise<number> {
  const result = await sql<{ n: number }>`
    select count(*)::int as n from lot l where ${where(filter)}`.execute(db);
  return result.rows[0]?.n ?? 0;
}

/** Lots with what is left of them and where: `places` as name → cells. The newest come first. */
export async function listLots(db: Kysely<Database>, filter: LotFilter & LotWindow) {
  const result = await sql<{
    id: string;
    code: string;
    cellTypeId: string;
    designation: string;
    madeOn: string | null;
    receivedOn: string;
    supplierReference: string;
    cellsReceived: number;
    unitCostMinor: number;
    left: number;
    places: { id: string; name: string; cells: number }[];
    packsIn: number;
  }>`
    select l.id, l.code, l.cell_type_id, c.designation, l.made_on, l.received_on,
      l.supplier_reference, l.cells_received, l.unit_cost_minor,
      coalesce(s.cells, 0)::int as left, coalesce(s.places, '[]'::json) as places,
      (select count(*)::int from pack where pack.lot_id = l.id and pack.removed_at is null) as packs_in
    from lot l
    join cell_type c on c.id = l.cell_type_id
    left join lateral (
      select sum(ls.cells) as cells,
        json_agg(json_build_object('id', p.id, 'name', p.name, 'cells', ls.cells) order by p.kind, p.name) as places
      from lot_stock ls join stock_place p on p.id = ls.place_id
      where ls.lot_id = l.id and ls.cells > 0) s on true
    where ${where(filter)}
    order by l.received_on desc, l.code
    limit ${filter.limit} offset ${filter.offset}`.execute(db);
  return result.rows;
}

export type LotRow = Awaited<ReturnType<typeof listLots>>[number];

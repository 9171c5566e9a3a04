import { type Kysely, sql, type Transaction } from "kysely";
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

/** A lot by its code, or null. */
export async function findLotByCode(db: Kysely<Database>, code: string) {
  const row = await db
    .selectFrom("lot")
    .select(["id", "cellTypeId"])
    .where("code", "=", code)
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

/** Lots with what is left of them and where: `places` as name → cells. */
export async function listLots(
  db: Kysely<Database>,
  filter: { readonly cellTypeId?: string | undefined; readonly withStockOnly: boolean },
) {
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
    where (${filter.cellTypeId ?? null}::uuid is null or l.cell_type_id = ${filter.cellTypeId ?? null}::uuid)
      and (not ${filter.withStockOnly}::boolean or coalesce(s.cells, 0) > 0)
    order by l.received_on desc, l.code
    limit 500`.execute(db);
  return result.rows;
}

export type LotRow = Awaited<ReturnType<typeof listLots>>[number];

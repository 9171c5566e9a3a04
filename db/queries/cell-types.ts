import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "../client";

/** All cell types with what lies in stores and vans and how many packs use them. */
export async function listCellTypes(db: Kysely<Database>) {
  return db
    .selectFrom("cellType")
    .selectAll()
    .select([
      sql<number>`(select coalesce(sum(ls.cells), 0)::int from lot_stock ls
        join lot l on l.id = ls.lot_id join stock_place p on p.id = ls.place_id
        where l.cell_type_id = cell_type.id and p.kind <> 'return_box')`.as("inStock"),
      sql<number>`(select count(*)::int from pack
        where pack.cell_type_id = cell_type.id and removed_at is null)`.as("packsIn"),
      sql<number>`(select count(*)::int from capacity_point
        where capacity_point.cell_type_id = cell_type.id)`.as("points"),
    ])
    .orderBy("retired")
    .orderBy("designation")
    .execute();
}

export type CellTypeRow = Awaited<ReturnType<typeof listCellTypes>>[number];

/** A cell type with its capacity table; null when there is none. */
export async function findCellType(db: Kysely<Database>, id: string) {
  const row = await db.selectFrom("cellType").selectAll().where("id", "=", id).executeTakeFirst();
  if (!row) return null;
  const points = await db
    .selectFrom("capacityPoint")
    .select(["currentUa", "cutoffMv", "temperatureDc", "capacityMah", "source"])
    .where("cellTypeId", "=", id)
    .orderBy("temperatureDc")
    .orderBy("cutoffMv")
    .orderBy("currentUa")
    .execute();
  return { ...row, points };
}

export interface CellTypeRecord {
  readonly id: string;
  readonly designation: string;
  readonly name: string;
  readonly chemistry: string;
  readonly size: string;
  readonly nominalMv: number;
  readonly ratedCapacityMah: number;
  readonly ratedCurrentUa: number;
  readonly ratedCutoffMv: number;
  readonly ratedTemperatureDc: number;
  readonly selfDischargePpmPerYear: number;
  readonly resistanceMohm: number;
  readonly maxPulseUa: number | null;
  readonly massMg: number | null;
  readonly shelfLifeMonths: number | null;
  readonly unitCostMinor: number;
  readonly reorderPoint: number;
  readonly leadTimeDays: number;
  readonly updatedAt: Date;
}

export interface CapacityRecord {
  readonly currentUa: number;
  readonly cutoffMv: number;
  readonly temperatureDc: number;
  readonly capacityMah: number;
  readonly source: string;
}

/** Writes a cell type and its capacity table in place of the old one. */
export async function saveCellTypeRecord(
  trx: Transaction<Database>,
  cellType: CellTypeRecord,
  points: readonly CapacityRecord[],
): Promise<void> {
  const { id, ...changes } = cellType;
  await trx
    .insertInto("cellType")
    .values(cellType)
    .onConflict((conflict) => conflict.column("id").doUpdateSet(changes))
    .execute();
  await trx.deleteFrom("capacityPoint").where("cellTypeId", "=", id).execute();
  if (points.length === 0) return;
  await trx
    .insertInto("capacityPoint")
    .values(points.map((point) => ({ ...point, cellTypeId: id })))
    .execute();
}

/** Packs in service on this cell type: their forecasts hang on its figures. */
export async function packsOfCellType(db: Kysely<Database>, id: string): Promise<string[]> {
  const rows = await db
    .selectFrom("pack")
    .select("id")
    .where("cellTypeId", "=", id)
    .where("removedAt", "is", null)
    .execute();
  return rows.map((row) => row.id);
}

/** Every capacity point, for the file of cell types. */
export async function listCapacityPoints(db: Kysely<Database>) {
  return db
    .selectFrom("capacityPoint")
    .innerJoin("cellType", "cellType.id", "capacityPoint.cellTypeId")
    .select([
      "cellType.designation",
      "currentUa",
      "cutoffMv",
      "temperatureDc",
      "capacityMah",
      "source",
    ])
    .orderBy("cellType.designation")
    .orderBy("temperatureDc")
    .orderBy("cutoffMv")
    .orderBy("currentUa")
    .execute();
}

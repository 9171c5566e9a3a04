import type { Kysely, Transaction } from "kysely";
import type { Database } from "../client";

export interface ReturnedCells {
  readonly packId: string;
  readonly cellTypeId: string;
  readonly lotId: string | null;
  readonly cells: number;
  readonly look: string;
  readonly at: Date;
  readonly personId: string | null;
}

/** Puts the cells of a pack into the return box; once a pack. */
export async function returnCells(
  trx: Transaction<Database>,
  returned: ReturnedCells,
): Promise<void> {
  if (returned.cells <= 0) return;
  await trx
    .insertInto("returnedCells")
    .values(returned)
    .onConflict((conflict) => conflict.column("packId").doNothing())
    .execute();
}

/** What waits for recycling, by cell type and lot. */
export async function listReturnBox(db: Kysely<Database>) {
  return db
    .selectFrom("returnedCells")
    .innerJoin("cellType", "cellType.id", "returnedCells.cellTypeId")
    .leftJoin("lot", "lot.id", "returnedCells.lotId")
    .select(["returnedCells.cellTypeId", "cellType.designation", "cellType.chemistry"])
    .select(["returnedCells.lotId", "lot.code as lotCode"])
    .select((eb) => [
      eb.fn.sum<string>("returnedCells.cells").as("cells"),
      eb.fn
        .sum<string>(
          eb
            .case()
            .when("returnedCells.look", "!=", "sound")
            .then(eb.ref("returnedCells.cells"))
            .else(0)
            .end(),
        )
        .as("damaged"),
      eb.fn.countAll<number>().as("packs"),
      eb.fn.min("returnedCells.at").as("since"),
      eb.fn.max("returnedCells.at").as("until"),
    ])
    .where("returnedCells.collectedAt", "is", null)
    .groupBy(["returnedCells.cellTypeId", "cellType.designation", "cellType.chemistry"])
    .groupBy(["returnedCells.lotId", "lot.code"])
    .orderBy("cellType.designation")
    .orderBy("lot.code")
    .execute();
}

/**
 * Marks what lay in the box of a cell type up to a moment as collected.
 * @returns how many cells
 */
export async function collectReturned(
  trx: Transaction<Database>,
  given: { cellTypeId: string; until: Date; at: Date; personId: string | null },
): Promise<number> {
  const rows = await trx
    .updateTable("returnedCells")
    .set({ collectedAt: given.at, collectedBy: given.personId })
    .where("cellTypeId", "=", given.cellTypeId)
    .where("at", "<=", given.until)
    .where("collectedAt", "is", null)
    .returning("cells")
    .execute();
  return rows.reduce((sum, row) => sum + row.cells, 0);
}

import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { applyStockMove, lockLotStock } from "@/db/queries/stock";
import type { Deps } from "./use-case";

export interface CellsTaken {
  readonly lotId: string;
  readonly placeId: string;
  readonly cells: number;
  readonly at: Date;
  readonly personId: string | null;
  readonly note: string;
}

/**
 * Takes the cells of an installed pack out of a place. They are in the device already, so a
 * count that says otherwise is wrong: it is put right first by a `counted` move that says so.
 */
export async function takeCells(
  trx: Transaction<Database>,
  deps: Deps,
  taken: CellsTaken,
): Promise<void> {
  const held = await lockLotStock(trx, taken.lotId, taken.placeId);
  const { placeId, ...move } = taken;
  if (held < taken.cells) {
    await applyStockMove(trx, {
      ...move,
      id: deps.newId(),
      fromPlaceId: null,
      toPlaceId: placeId,
      cells: taken.cells - held,
      reason: "counted",
      note: `More were fitted than counted here. ${taken.note}`.trim(),
    });
  }
  await applyStockMove(trx, {
    ...move,
    id: deps.newId(),
    fromPlaceId: placeId,
    toPlaceId: null,
    reason: "installed",
  });
}

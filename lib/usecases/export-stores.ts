import { listLots } from "@/db/queries/lots";
import { listStockMoves } from "@/db/queries/stock";
import { type ExportContext, type OutTable, scaled } from "./export-table";

/** Every lot with what is left of it and where. */
export async function lotTable({ deps }: ExportContext): Promise<OutTable> {
  const lots = await listLots(deps.db, { withStockOnly: false, limit: null, offset: 0 });
  return {
    head: [
      ...["lot", "cell type", "made on", "received on", "supplier reference", "cells received"],
      ...["unit cost", "cells left", "places", "packs in service"],
    ],
    rows: lots.map((lot) => [
      ...[lot.code, lot.designation, lot.madeOn, lot.receivedOn, lot.supplierReference],
      ...[scaled(lot.cellsReceived), scaled(lot.unitCostMinor, 2), scaled(lot.left)],
      lot.places.map((p) => `${p.name}: ${p.cells}`).join(" | "),
      scaled(lot.packsIn),
    ]),
  };
}

/** The book of moves, newest first. */
export async function moveTable({ deps, timeZone }: ExportContext): Promise<OutTable> {
  const moves = await listStockMoves(deps.db, { limit: 100_000, offset: 0 });
  return {
    head: ["at", "lot", "cell type", "cells", "reason", "from", "to", "by", "note"],
    rows: moves.map((m) => [
      ...[{ at: m.at, timeZone }, m.lotCode, m.designation, scaled(m.cells), m.reason],
      ...[m.fromPlace, m.toPlace, m.personName, m.note],
    ]),
  };
}

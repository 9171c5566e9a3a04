import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import { bookedSwaps } from "@/db/queries/plan-rounds";
import { listCellTypeNames, loadLotsOnHand } from "@/db/queries/planning-fleet";
import type { SheetStop } from "@/db/queries/round-sheets";
import { loadCells, type PackToLoad } from "@/lib/planning/load-list";
import { groupBy } from "./forecast-input";

/** Cells of one type that a plan lacks, and the assets that would go without. */
export interface PlanShortage {
  readonly designation: string;
  readonly cells: number;
  readonly tags: readonly string[];
}

/**
 * What a draft lacks: its swaps and those that other rounds have been promised, laid against the
 * lots in stores and vans. Promised ones are served first, whatever the day.
 * @param stops stops of the draft
 * @param isElsewhere tells a promised swap that the draft does not replace
 */
export async function planShortages(
  db: Kysely<Database>,
  today: string,
  stops: readonly SheetStop[],
  isElsewhere: (swap: Awaited<ReturnType<typeof bookedSwaps>>[number]) => boolean,
): Promise<PlanShortage[]> {
  const [lots, booked, names] = await Promise.all([
    loadLotsOnHand(db),
    bookedSwaps(db, today),
    listCellTypeNames(db),
  ]);
  const promised = booked
    .filter(isElsewhere)
    .flatMap(({ assetId, cellTypeId, cells }) =>
      cellTypeId === null ? [] : [{ assetId, tag: "", cellTypeId, cells }],
    );
  const free = loadCells(promised, lots).lines;
  const taken = groupBy(free, (line) => line.lotId);
  const left = lots.map((lot) => ({
    ...lot,
    cells: (taken.get(lot.lotId) ?? []).reduce((cells, line) => cells - line.cells, lot.cells),
  }));
  const swaps = stops.flatMap((stop) => stop.tasks.filter((task) => task.kind === "swap"));
  const packs: PackToLoad[] = swaps.map(({ assetId, tag, cellTypeId, cells }) => ({
    ...{ assetId, tag, cells },
    cellTypeId: cellTypeId ?? "",
  }));
  return loadCells(packs, left).shortages.map(({ cellTypeId, cells, forTags }) => ({
    designation: names.get(cellTypeId) ?? "cells of no known type",
    cells,
    tags: forTags,
  }));
}

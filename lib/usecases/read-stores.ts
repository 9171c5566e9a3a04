import { z } from "zod";
import { listCellTypes } from "@/db/queries/cell-types";
import { badLotIds } from "@/db/queries/findings";
import { countLots, listLots } from "@/db/queries/lots";
import { getOrganisation } from "@/db/queries/organisation";
import {
  countByTypeAndPlace,
  countStockMoves,
  listPlaces,
  listStockMoves,
} from "@/db/queries/stock";
import { filterId, listEntries, PAGE_SIZE, pageWindow } from "./list-entries";
import { defineUseCase } from "./use-case";

const allow = { roles: ["administrator", "dispatcher", "supervisor"] as const };

/** Cell types with their counts by place, against the reorder point. */
export const readStores = defineUseCase({
  name: "read-stores",
  allow,
  input: z.object({}),
  run: async (deps) => {
    const [organisation, cellTypes, places, counts] = await Promise.all([
      getOrganisation(deps.db),
      listCellTypes(deps.db),
      listPlaces(deps.db),
      countByTypeAndPlace(deps.db),
    ]);
    const cells = new Map(counts.map((c) => [`${c.cellTypeId} ${c.placeId}`, Number(c.cells)]));
    const rows = cellTypes.map((type) => ({
      ...type,
      byPlace: places.map((place) => cells.get(`${type.id} ${place.id}`) ?? 0),
      low: !type.retired && type.inStock < type.reorderPoint,
    }));
    return { organisation, places, rows };
  },
});

export type StoresView = Awaited<ReturnType<typeof readStores>>;

/** One page of lots with what is left of them and where. */
export const listLotsInStores = defineUseCase({
  name: "list-lots",
  allow,
  input: z.object({
    cellTypeId: filterId,
    all: z.boolean().catch(false),
    page: listEntries.page,
  }),
  run: async (deps, _actor, { cellTypeId, all, page }) => {
    const filter = { cellTypeId: cellTypeId ?? undefined, withStockOnly: !all };
    const [organisation, lots, total, places, cellTypes, weakLots] = await Promise.all([
      getOrganisation(deps.db),
      listLots(deps.db, { ...filter, ...pageWindow(page) }),
      countLots(deps.db, filter),
      listPlaces(deps.db),
      listCellTypes(deps.db),
      badLotIds(deps.db),
    ]);
    const stock = { lots, total, page, pageSize: PAGE_SIZE, places, cellTypes, weakLots };
    return { organisation, ...stock, now: deps.now() };
  },
});

export type LotsView = Awaited<ReturnType<typeof listLotsInStores>>;

/** The book of moves, newest first. */
export const listMoves = defineUseCase({
  name: "list-stock-moves",
  allow,
  input: z.object({ page: listEntries.page }),
  run: async (deps, _actor, { page }) => ({
    organisation: await getOrganisation(deps.db),
    rows: await listStockMoves(deps.db, pageWindow(page)),
    total: await countStockMoves(deps.db),
    page,
    pageSize: PAGE_SIZE,
  }),
});

export type MovesView = Awaited<ReturnType<typeof listMoves>>;

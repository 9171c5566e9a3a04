import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { findLot } from "@/db/queries/lots";
import { acceptsCellType, findPack, insertPack, type lockAsset } from "@/db/queries/packs";
import { conflict, invalid } from "@/lib/errors";
import { mapDatabaseFault } from "./database-faults";
import { takeCells } from "./take-cells";
import { touchForecasts } from "./touch-forecasts";
import type { Deps } from "./use-case";

/** What goes in. */
export interface PackIn {
  /** Made by the client. */
  readonly id: string;
  readonly cellTypeId: string;
  readonly lotId: string | null;
  /** The month on the cells where the lot is not known. */
  readonly madeOn: string | null;
  /** Where the cells came from; null: no count is kept of them. */
  readonly fromPlaceId: string | null;
}

export interface FitOrder extends PackIn {
  readonly at: Date;
  readonly personId: string | null;
}

/**
 * Puts a pack into an asset whose lock the caller holds, takes its cells out of stock and
 * asks for its first forecast.
 * @throws AppError invalid when the device does not take these cells, conflict on overlap
 */
export async function fitPack(
  trx: Transaction<Database>,
  deps: Deps,
  asset: NonNullable<Awaited<ReturnType<typeof lockAsset>>>,
  order: FitOrder,
): Promise<void> {
  if (asset.state === "retired") throw conflict(`${asset.tag} is retired: bring it back first.`);
  await checkCells(trx, asset, order);
  const lot = order.lotId ? await findLot(trx, order.lotId) : null;
  await mapDatabaseFault(() =>
    insertPack(trx, {
      id: order.id,
      assetId: asset.id,
      cellTypeId: order.cellTypeId,
      lotId: order.lotId,
      series: asset.series,
      parallel: asset.parallel,
      madeOn: order.madeOn ?? lot?.madeOn ?? null,
      installedAt: order.at,
      installedBy: order.personId,
    }),
  );
  if (order.lotId && order.fromPlaceId) {
    await takeCells(trx, deps, {
      lotId: order.lotId,
      placeId: order.fromPlaceId,
      cells: asset.series * asset.parallel,
      at: order.at,
      personId: order.personId,
      note: asset.tag,
    });
  }
  await touchForecasts(trx, deps, [order.id]);
}

async function checkCells(
  trx: Transaction<Database>,
  asset: { readonly tag: string; readonly deviceModelId: string },
  order: FitOrder,
): Promise<void> {
  if (!(await acceptsCellType(trx, asset.deviceModelId, order.cellTypeId))) {
    const message = `The device model of ${asset.tag} does not list these cells. Choose another type, or add it to the model first.`;
    throw invalid(message, [{ field: "cellTypeId", message }]);
  }
  const lot = order.lotId ? await findLot(trx, order.lotId) : null;
  if (order.lotId && lot?.cellTypeId !== order.cellTypeId) {
    const message = "This lot is of another cell type.";
    throw invalid(message, [{ field: "lotId", message }]);
  }
}

/**
 * Whether this pack was recorded before.
 * @throws AppError conflict when the id belongs to a pack of another asset
 */
export async function repeatOfPack(
  trx: Transaction<Database>,
  packId: string,
  assetId: string,
): Promise<boolean> {
  const known = await findPack(trx, packId);
  if (known && known.assetId !== assetId) throw conflict("This id belongs to another pack.");
  return known !== null;
}

/** @throws AppError invalid when the moment is more than ten minutes ahead of the clock */
export function refuseFuture(at: Date, now: Date): void {
  if (at.getTime() <= now.getTime() + 10 * 60_000) return;
  const message = "This moment is still to come: check the date.";
  throw invalid(message, [{ field: "at", message }]);
}

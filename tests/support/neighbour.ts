import { randomUUID } from "node:crypto";
import type { FieldScenario } from "./field-scenario";

/** An asset beside a planned one that is in no task of the round. */
export interface Neighbour {
  readonly assetId: string;
  readonly tag: string;
  readonly packId: string;
  /** In the van, with exactly one pack's cells. */
  readonly lotId: string;
  readonly lotCode: string;
  readonly cells: number;
}

/** Puts a second device of the same make beside the asset of the round's first stop. */
export async function addNeighbour({ db, stops, vanPlaceId }: FieldScenario): Promise<Neighbour> {
  const stop = stops[0];
  if (!stop) throw new Error("the round has no stop");
  const like = await db
    .selectFrom("pack")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .select(["asset.siteId", "asset.deviceModelId", "pack.cellTypeId"])
    .select(["pack.series", "pack.parallel"])
    .where("pack.id", "=", stop.packId)
    .executeTakeFirstOrThrow();
  const { siteId, deviceModelId, cellTypeId, series, parallel } = like;
  const [assetId, packId, lotId] = [randomUUID(), randomUUID(), randomUUID()];
  const tag = `E2E-${assetId.slice(0, 6).toUpperCase()}`;
  const lotCode = `E2E-${lotId.slice(0, 8)}`;
  const cells = series * parallel;
  const lot = { id: lotId, code: lotCode, cellTypeId, cellsReceived: cells };
  await db
    .insertInto("asset")
    .values({ id: assetId, tag, name: "Gauge beside the planned one", siteId, deviceModelId })
    .execute();
  const installedAt = new Date(Date.now() - 900 * 86_400_000);
  await db
    .insertInto("pack")
    .values({ id: packId, assetId, cellTypeId, series, parallel, installedAt })
    .execute();
  await db
    .insertInto("lot")
    .values({ ...lot, madeOn: "2026-01-01", receivedOn: "2026-02-01" })
    .execute();
  await db.insertInto("lotStock").values({ lotId, placeId: vanPlaceId, cells }).execute();
  return { assetId, tag, packId, lotId, lotCode, cells };
}

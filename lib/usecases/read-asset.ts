import { z } from "zod";
import { findAsset, listAssetVisits, listDeviceEvents } from "@/db/queries/assets";
import { listAudit } from "@/db/queries/asset-audit";
import { findDeviceModel, listAcceptedCellTypes } from "@/db/queries/device-models";
import { listDrawMeasurements } from "@/db/queries/draw-measurements";
import { findStandingForecast } from "@/db/queries/standing-forecast";
import { listLots } from "@/db/queries/lots";
import { getOrganisation } from "@/db/queries/organisation";
import { listAssetPacks } from "@/db/queries/packs";
import { listPackReadings } from "@/db/queries/readings";
import { listAssetPhotos } from "@/db/queries/photos";
import { listPlaces } from "@/db/queries/stock";
import { notFound } from "@/lib/errors";
import { defineUseCase } from "./use-case";

/** Everything an asset's page shows. */
export const readAsset = defineUseCase({
  name: "read-asset",
  allow: { roles: ["administrator", "dispatcher", "supervisor"], apiScope: "register:read" },
  input: z.object({ tag: z.string().min(1) }),
  run: async (deps, _actor, { tag }) => {
    const asset = await findAsset(deps.db, tag);
    if (!asset) throw notFound(`The asset ${tag}`);
    const [organisation, model, packs, events, visits, draws, acts, photos, acceptedCells] =
      await Promise.all([
        getOrganisation(deps.db),
        findDeviceModel(deps.db, asset.deviceModelId),
        listAssetPacks(deps.db, asset.id),
        listDeviceEvents(deps.db, asset.id),
        listAssetVisits(deps.db, asset.id),
        listDrawMeasurements(deps.db, asset.id),
        listAudit(deps.db, "asset", asset.id),
        listAssetPhotos(deps.db, asset),
        listAcceptedCellTypes(deps.db, asset.deviceModelId),
      ]);
    const pack = packs.find((p) => p.removedAt === null) ?? null;
    const [readings, forecast] = await Promise.all([
      pack ? listPackReadings(deps.db, pack.id) : [],
      pack ? findStandingForecast(deps.db, pack.id) : null,
    ]);
    return {
      ...{ organisation, asset, model, packs, pack, readings, forecast },
      ...{ events, visits, draws, acts, photos, acceptedCells, now: deps.now() },
    };
  },
});

export type AssetView = Awaited<ReturnType<typeof readAsset>>;

/** What the swap and install forms offer: cells the device takes, their lots, places. */
export const readSwapChoices = defineUseCase({
  name: "read-swap-choices",
  allow: { roles: ["administrator", "dispatcher", "technician"] },
  input: z.object({ tag: z.string().min(1) }),
  run: async (deps, _actor, { tag }) => {
    const asset = await findAsset(deps.db, tag);
    if (!asset) throw notFound(`The asset ${tag}`);
    const cellTypes = await listAcceptedCellTypes(deps.db, asset.deviceModelId);
    const accepted = new Set(cellTypes.map((c) => c.id));
    const lots = await listLots(deps.db, { withStockOnly: true, limit: null, offset: 0 });
    return {
      cellTypes,
      lots: lots.filter((lot) => accepted.has(lot.cellTypeId)),
      places: (await listPlaces(deps.db)).filter((p) => p.kind !== "return_box"),
    };
  },
});

export type SwapChoices = Awaited<ReturnType<typeof readSwapChoices>>;

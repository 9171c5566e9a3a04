import { z } from "zod";
import { findAsset, findAssetById, saveAssetRecord } from "@/db/queries/assets";
import { appendAudit } from "@/db/queries/audit";
import { findDeviceModel, listDeviceModels } from "@/db/queries/device-models";
import { installedPackIds } from "@/db/queries/forecasts";
import { findInstalledPack, insertDeviceEvent } from "@/db/queries/packs";
import { findSite, listSiteNames } from "@/db/queries/sites";
import { conflict, invalid, notFound } from "@/lib/errors";
import { mapDatabaseFault } from "./database-faults";
import { optionalScaledEntry, optionalTextEntry, requiredId, textEntry } from "./form-entries";
import { touchForecasts } from "./touch-forecasts";
import { defineUseCase, personIdOf } from "./use-case";

export const TAG_PATTERN = /^[A-Za-z0-9][A-Za-z0-9._/-]{0,39}$/;

const input = z.object({
  id: z.uuid(),
  tag: textEntry("the tag on the device", 40).pipe(
    z.string().regex(TAG_PATTERN, "Letters, digits and . _ / - only, starting with the first two."),
  ),
  name: textEntry("a name, such as Sluice 9 level gauge"),
  siteCode: textEntry("the code of a site", 100),
  deviceModelId: requiredId,
  silenceCostPerHour: optionalScaledEntry(2, {
    min: 0,
    max: 100_000_000,
    wanted: "the cost of an hour without data, or leave it empty",
  }),
  firmware: optionalTextEntry(100),
  note: optionalTextEntry(),
});

/**
 * Adds an asset or changes it. A change of device model is refused while a pack is in,
 * because the pack's cells belong to the model it was put into.
 */
export const saveAsset = defineUseCase({
  name: "save-asset",
  allow: { roles: ["administrator", "dispatcher"] },
  input,
  run: async (deps, actor, given): Promise<{ readonly tag: string }> => {
    const { siteCode, silenceCostPerHour: silenceCostMinorPerHour, ...asset } = given;
    const site = await findSite(deps.db, siteCode);
    if (!site) throw fieldFault("siteCode", `There is no site with the code ${siteCode}.`);
    if (!(await findDeviceModel(deps.db, given.deviceModelId))) throw notFound("The device model");
    return deps.db.transaction().execute(async (trx) => {
      const before = await findAssetById(trx, given.id);
      if (before && before.deviceModelId !== given.deviceModelId) {
        if (await findInstalledPack(trx, given.id)) {
          throw conflict("Take the pack out before you change the device model.");
        }
      }
      const at = deps.now();
      const record = { ...asset, siteId: site.id, silenceCostMinorPerHour, updatedAt: at };
      await mapDatabaseFault(() => saveAssetRecord(trx, record));
      const personId = personIdOf(actor);
      if (before && before.firmware !== given.firmware && given.firmware !== "") {
        await insertDeviceEvent(trx, {
          ...{ id: deps.newId(), assetId: given.id, at, personId, lastHeardAt: null },
          kind: "firmware_changed",
          note: `${before.firmware || "unknown"} to ${given.firmware}`,
        });
      }
      await touchForecasts(trx, deps, await installedPackIds(trx, [given.id]));
      await appendAudit(trx, {
        ...{ at, personId, act: "save-asset", subjectKind: "asset", subjectId: given.id },
        detail: { tag: given.tag, isNew: before === null, siteCode },
      });
      return { tag: given.tag };
    });
  },
});

function fieldFault(field: string, message: string) {
  return invalid(message, [{ field, message }]);
}

/** What the asset form needs: the asset (null: a new one), sites and models to choose from. */
export const readAssetForm = defineUseCase({
  name: "read-asset-form",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({ tag: z.string().nullable() }),
  run: async (deps, _actor, { tag }) => {
    const asset = tag === null ? null : await findAsset(deps.db, tag);
    if (tag !== null && !asset) throw notFound(`The asset ${tag}`);
    const [sites, models] = await Promise.all([listSiteNames(deps.db), listDeviceModels(deps.db)]);
    return {
      asset,
      sites,
      models: models.filter((m) => !m.retired || m.id === asset?.deviceModelId),
    };
  },
});

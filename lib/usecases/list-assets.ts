import { z } from "zod";
import { ASSET_ORDERS, ASSET_STATES, countAssets, listAssets as query } from "@/db/queries/assets";
import { listCrewNames } from "@/db/queries/crew-names";
import { listDeviceModels } from "@/db/queries/device-models";
import { getOrganisation } from "@/db/queries/organisation";
import { CHEMISTRIES } from "@/lib/battery/pack";
import { filterId, filterWord, listEntries, PAGE_SIZE, pageWindow } from "./list-entries";
import { defineUseCase } from "./use-case";

export const assetListInput = z.object({
  ...listEntries,
  modelId: filterId,
  chemistry: filterWord(CHEMISTRIES),
  state: filterWord(ASSET_STATES),
  crewId: filterId,
  siteCode: z.string().max(100).nullable().catch(null),
  order: z.enum(ASSET_ORDERS).catch("tag"),
});

/** One page of the fleet, with what the filters offer. */
export const listAssets = defineUseCase({
  name: "list-assets",
  allow: { roles: ["administrator", "dispatcher", "supervisor"], apiScope: "register:read" },
  input: assetListInput,
  run: async (deps, _actor, given) => {
    const [organisation, rows, total, models, crews] = await Promise.all([
      getOrganisation(deps.db),
      query(deps.db, { ...given, ...pageWindow(given.page) }),
      countAssets(deps.db, given),
      listDeviceModels(deps.db),
      listCrewNames(deps.db),
    ]);
    return {
      ...{ organisation, rows, total, crews },
      models: models.map(({ id, name }) => ({ id, name })),
      page: given.page,
      pageSize: PAGE_SIZE,
      now: deps.now(),
    };
  },
});

export type AssetListView = Awaited<ReturnType<typeof listAssets>>;

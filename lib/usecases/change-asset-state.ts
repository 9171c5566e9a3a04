import { z } from "zod";
import { ASSET_STATES, setAssetState } from "@/db/queries/assets";
import { appendAudit } from "@/db/queries/audit";
import { findInstalledPack, lockAsset } from "@/db/queries/packs";
import { conflict, notFound } from "@/lib/errors";
import { defineUseCase, personIdOf } from "./use-case";

/** Puts an asset into service, into store or out of use. Its history stays. */
export const changeAssetState = defineUseCase({
  name: "change-asset-state",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({ assetId: z.uuid(), state: z.enum(ASSET_STATES, "Choose a state.") }),
  run: async (deps, actor, { assetId, state }): Promise<{ readonly tag: string }> =>
    deps.db.transaction().execute(async (trx) => {
      const asset = await lockAsset(trx, assetId);
      if (!asset) throw notFound("The asset");
      if (asset.state === state) return { tag: asset.tag };
      if (state === "retired" && (await findInstalledPack(trx, assetId))) {
        throw conflict(`Take the pack out of ${asset.tag} first: cells left inside leak.`);
      }
      await setAssetState(trx, assetId, state, deps.now());
      await appendAudit(trx, {
        ...{ at: deps.now(), personId: personIdOf(actor), act: "change-asset-state" },
        ...{ subjectKind: "asset", subjectId: assetId },
        detail: { tag: asset.tag, from: asset.state, to: state },
      });
      return { tag: asset.tag };
    }),
});

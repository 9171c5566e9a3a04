import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { getOrganisation } from "@/db/queries/organisation";
import { findInstalledPack, lockAsset } from "@/db/queries/packs";
import { conflict, notFound } from "@/lib/errors";
import { refuseFuture } from "./fit-pack";
import { localInstant } from "./local-instant";
import { packOutEntries, readPackOut } from "./record-swap";
import { takeOut } from "./swap-pack";
import { defineUseCase, personIdOf } from "./use-case";

/** Takes a pack out and leaves the asset without one. */
export const removePack = defineUseCase({
  name: "remove-pack",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object(packOutEntries),
  run: async (deps, actor, given): Promise<{ readonly tag: string }> => {
    const { timeZone } = await getOrganisation(deps.db);
    const at = localInstant(given.at, timeZone, "at");
    const out = readPackOut(given, at, timeZone);
    const personId = personIdOf(actor);
    return deps.db.transaction().execute(async (trx) => {
      const asset = await lockAsset(trx, given.assetId);
      if (!asset) throw notFound("The asset");
      refuseFuture(at, deps.now());
      const old = await findInstalledPack(trx, asset.id);
      if (old?.id !== given.oldPackId) {
        throw conflict(
          `The pack you saw in ${asset.tag} is out already. Open the asset again to see what is in it.`,
        );
      }
      await takeOut(trx, deps, asset, old, { at, personId, out });
      await appendAudit(trx, {
        ...{ at: deps.now(), personId, act: "remove-pack" },
        ...{ subjectKind: "asset", subjectId: asset.id },
        detail: { tag: asset.tag, out: old.id, reason: out.reason },
      });
      return { tag: asset.tag };
    });
  },
});

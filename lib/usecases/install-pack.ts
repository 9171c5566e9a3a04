import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { getOrganisation } from "@/db/queries/organisation";
import { findInstalledPack, lockAsset } from "@/db/queries/packs";
import { conflict, notFound } from "@/lib/errors";
import { fitPack, refuseFuture, repeatOfPack } from "./fit-pack";
import { localInstant } from "./local-instant";
import { packInEntries } from "./record-swap";
import type { SwapResult } from "./swap-pack";
import { defineUseCase, personIdOf } from "./use-case";

/** Puts the first pack, or the first after an empty spell, into an asset. */
export const installPack = defineUseCase({
  name: "install-pack",
  allow: { roles: ["administrator", "dispatcher", "technician"] },
  input: z.object({
    assetId: z.uuid(),
    at: z.string().trim().min(1, "Enter when it was done."),
    ...packInEntries,
  }),
  run: async (deps, actor, given): Promise<SwapResult> => {
    const { timeZone } = await getOrganisation(deps.db);
    const at = localInstant(given.at, timeZone, "at");
    const personId = personIdOf(actor);
    return deps.db.transaction().execute(async (trx) => {
      const asset = await lockAsset(trx, given.assetId);
      if (!asset) throw notFound("The asset");
      const done = { packId: given.packId, tag: asset.tag };
      if (await repeatOfPack(trx, given.packId, asset.id)) return { ...done, repeated: true };
      refuseFuture(at, deps.now());
      if (await findInstalledPack(trx, asset.id)) {
        throw conflict(`${asset.tag} holds a pack already: record a swap instead.`);
      }
      await fitPack(trx, deps, asset, { ...given, id: given.packId, at, personId });
      await appendAudit(trx, {
        ...{ at: deps.now(), personId, act: "install-pack" },
        ...{ subjectKind: "asset", subjectId: asset.id },
        detail: { tag: asset.tag, in: given.packId },
      });
      return { ...done, repeated: false };
    });
  },
});

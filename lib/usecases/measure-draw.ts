import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { insertDrawMeasurement } from "@/db/queries/draw-measurements";
import { installedPackIds } from "@/db/queries/forecasts";
import { getOrganisation } from "@/db/queries/organisation";
import { lockAsset } from "@/db/queries/packs";
import { invalid, notFound } from "@/lib/errors";
import { refuseFuture } from "./fit-pack";
import { optionalScaledEntry, optionalTextEntry, scaledEntry } from "./form-entries";
import { localInstant } from "./local-instant";
import { touchForecasts } from "./touch-forecasts";
import { defineUseCase, personIdOf } from "./use-case";

/** Records a measured draw: from then on it stands in for the device model's duty cycle. */
export const measureDraw = defineUseCase({
  name: "measure-draw",
  allow: { roles: ["administrator", "dispatcher", "technician"] },
  input: z.object({
    id: z.uuid(),
    assetId: z.uuid(),
    at: z.string().trim().min(1, "Enter when it was measured."),
    averageMicroamps: scaledEntry(0, {
      min: 1,
      max: 100_000_000,
      wanted: "the average draw of the pack in µA",
    }),
    peakMilliamps: optionalScaledEntry(3, {
      min: 1,
      max: 100_000_000,
      wanted: "the peak draw in mA, or leave it empty",
    }),
    method: optionalTextEntry(200),
  }),
  run: async (deps, actor, given): Promise<{ readonly tag: string }> => {
    const { timeZone } = await getOrganisation(deps.db);
    const at = localInstant(given.at, timeZone, "at");
    refuseFuture(at, deps.now());
    const { id, assetId, averageMicroamps: averageUa, peakMilliamps: peakUa, method } = given;
    if (peakUa !== null && peakUa < averageUa) {
      const message = "The peak is at least the average: check the units (µA and mA).";
      throw invalid(message, [{ field: "peakMilliamps", message }]);
    }
    const personId = personIdOf(actor);
    return deps.db.transaction().execute(async (trx) => {
      const asset = await lockAsset(trx, assetId);
      if (!asset) throw notFound("The asset");
      const measurement = { id, assetId, at, averageUa, peakUa, method, personId };
      if (await insertDrawMeasurement(trx, measurement)) {
        await touchForecasts(trx, deps, await installedPackIds(trx, [assetId]));
        await appendAudit(trx, {
          ...{ at: deps.now(), personId, act: "measure-draw" },
          ...{ subjectKind: "asset", subjectId: assetId },
          detail: { tag: asset.tag, averageUa, peakUa },
        });
      }
      return { tag: asset.tag };
    });
  },
});

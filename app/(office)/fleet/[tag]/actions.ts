"use server";

import { revalidatePath } from "next/cache";
import { defineAction } from "@/lib/server/define-action";
import { changeAssetState } from "@/lib/usecases/change-asset-state";
import { forecastWhatIf } from "@/lib/usecases/forecast-what-if";
import { giveVerdict } from "@/lib/usecases/give-verdict";
import { installPack } from "@/lib/usecases/install-pack";
import { measureDraw } from "@/lib/usecases/measure-draw";
import { recordReading } from "@/lib/usecases/record-reading";
import { recordSwap } from "@/lib/usecases/record-swap";
import { removePack } from "@/lib/usecases/remove-pack";
import { texts } from "../_parts/form-entries";

const renew = () => revalidatePath("/fleet", "layout");
const PACK_IN = ["packId", "cellTypeId", "lotId", "madeOn", "fromPlaceId"] as const;
const PACK_OUT = ["oldPackId", "reason", "voltageOut", "stoppedAt", "look"] as const;

export const logVoltageAction = defineAction(
  recordReading,
  (form) =>
    texts(
      form,
      ...(["id", "assetId", "at", "volts", "kind", "loadMilliamps", "temperatureC"] as const),
      ...(["accuracyMv", "instrument", "note"] as const),
    ) as never,
  renew,
);
export const swapAction = defineAction(
  recordSwap,
  (form) => texts(form, "assetId", "at", ...PACK_OUT, ...PACK_IN) as never,
  renew,
);
export const installAction = defineAction(
  installPack,
  (form) => texts(form, "assetId", "at", ...PACK_IN),
  renew,
);
export const removeAction = defineAction(
  removePack,
  (form) => texts(form, "assetId", "at", ...PACK_OUT) as never,
  renew,
);
export const measureDrawAction = defineAction(
  measureDraw,
  (form) => texts(form, "id", "assetId", "at", "averageMicroamps", "peakMilliamps", "method"),
  renew,
);
export const verdictAction = defineAction(
  giveVerdict,
  (form) => texts(form, "id", "readingId", "verdict", "correctedVolts", "note") as never,
  renew,
);
export const changeStateAction = defineAction(
  changeAssetState,
  (form) => texts(form, "assetId", "state") as never,
  renew,
);
/** Asks and changes nothing, so there is nothing to renew. */
export const whatIfAction = defineAction(
  forecastWhatIf,
  (form) =>
    texts(
      form,
      ...(["tag", "volts", "kind", "periodMinutes", "stateName", "stateMilliamps"] as const),
      "cellTypeId",
    ) as never,
);

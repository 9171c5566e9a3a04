"use server";

import { revalidatePath } from "next/cache";
import { redirect } from "next/navigation";
import { defineAction } from "@/lib/server/define-action";
import { saveAsset } from "@/lib/usecases/save-asset";
import { saveDeviceModel } from "@/lib/usecases/save-device-model";
import { HAZARDS, saveSite, TICKETS } from "@/lib/usecases/save-site";
import { rows, texts, ticked } from "./_parts/form-entries";

export const saveAssetAction = defineAction(
  saveAsset,
  (form) =>
    texts(
      form,
      ...(["id", "tag", "name", "siteCode", "deviceModelId", "silenceCostPerHour"] as const),
      ...(["firmware", "note"] as const),
    ),
  ({ tag }) => {
    revalidatePath("/fleet", "layout");
    redirect(`/fleet/${encodeURIComponent(tag)}`);
  },
);

export const saveSiteAction = defineAction(
  saveSite,
  (form) => ({
    ...texts(form, "id", "code", "name", "latitude", "longitude", "crewId", "climateId"),
    ...texts(form, "noticeDays", "opens", "closes", "keyCode", "driveUpNotes"),
    ...texts(form, "contactName", "contactEmail", "contactPhone"),
    hazards: ticked(form, "hazard", HAZARDS),
    tickets: ticked(form, "ticket", TICKETS),
    closures: rows(form, "closures", ["firstMonthDay", "lastMonthDay", "reason"]),
  }),
  () => {
    revalidatePath("/fleet", "layout");
    redirect("/fleet/sites");
  },
);

export const saveDeviceModelAction = defineAction(
  saveDeviceModel,
  (form) => ({
    ...texts(form, "id", "name", "cutoffVolts", "series", "parallel", "swapMinutes"),
    ...texts(form, "readMinutes", "silenceCostPerHour", "habitIntervalDays", "preferredId"),
    states: rows(form, "states", ["name", "currentMilliamps", "seconds"]),
    cellTypeIds: [...form.keys()]
      .filter((key) => key.startsWith("cell-"))
      .map((key) => key.slice("cell-".length)),
  }),
  () => {
    revalidatePath("/fleet", "layout");
    redirect("/fleet/models");
  },
);

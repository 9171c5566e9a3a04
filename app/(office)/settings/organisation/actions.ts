"use server";

import { revalidatePath } from "next/cache";
import { defineAction } from "@/lib/server/define-action";
import { forgetTileOrigin } from "@/lib/server/tile-origin";
import { changeOrganisation } from "@/lib/usecases/change-organisation";
import { text, weekdaysOf } from "../_parts/read-form";

export const changeOrganisationAction = defineAction(
  changeOrganisation,
  (form) => ({
    name: text(form, "name"),
    timeZone: text(form, "timeZone"),
    locale: text(form, "locale"),
    currency: text(form, "currency"),
    workingDays: weekdaysOf(form),
    crewCostPerHour: text(form, "crewCostPerHour"),
    overtimeCostPerHour: text(form, "overtimeCostPerHour"),
    travelCostPerKm: text(form, "travelCostPerKm"),
    detourFactor: text(form, "detourFactor"),
    roadSpeedKmh: text(form, "roadSpeedKmh"),
    travelTableUrl: text(form, "travelTableUrl"),
    mapTileUrl: text(form, "mapTileUrl"),
    keepPhotoPosition: form.has("keepPhotoPosition"),
  }),
  () => {
    forgetTileOrigin();
    revalidatePath("/", "layout");
  },
);

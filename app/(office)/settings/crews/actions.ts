"use server";

import { revalidatePath } from "next/cache";
import { defineAction } from "@/lib/server/define-action";
import { removeCrew } from "@/lib/usecases/remove-crew";
import { removeDepot } from "@/lib/usecases/remove-depot";
import { removeVan } from "@/lib/usecases/remove-van";
import { saveCrew } from "@/lib/usecases/save-crew";
import { saveDepot } from "@/lib/usecases/save-depot";
import { saveVan } from "@/lib/usecases/save-van";
import { text } from "../_parts/read-form";

const renew = () => revalidatePath("/settings", "layout");
const named = (form: FormData) => ({ id: text(form, "id"), name: text(form, "name") });
const byId = (form: FormData) => ({ id: text(form, "id") });

export const saveDepotAction = defineAction(
  saveDepot,
  (form) => ({
    ...named(form),
    latitude: text(form, "latitude"),
    longitude: text(form, "longitude"),
  }),
  renew,
);
export const saveCrewAction = defineAction(
  saveCrew,
  (form) => ({ ...named(form), depotId: text(form, "depotId") }),
  renew,
);
export const saveVanAction = defineAction(
  saveVan,
  (form) => ({
    ...named(form),
    crewId: text(form, "crewId"),
    cellCapacity: text(form, "cellCapacity"),
  }),
  renew,
);
export const removeDepotAction = defineAction(removeDepot, byId, renew);
export const removeCrewAction = defineAction(removeCrew, byId, renew);
export const removeVanAction = defineAction(removeVan, byId, renew);

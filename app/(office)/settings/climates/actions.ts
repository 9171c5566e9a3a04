"use server";

import { revalidatePath } from "next/cache";
import { defineAction } from "@/lib/server/define-action";
import { removeClimate } from "@/lib/usecases/remove-climate";
import { saveClimate } from "@/lib/usecases/save-climate";
import { text } from "../_parts/read-form";

const renew = () => revalidatePath("/settings/climates");

export const saveClimateAction = defineAction(
  saveClimate,
  (form) => ({
    id: text(form, "id"),
    name: text(form, "name"),
    monthlyMeanC: Array.from({ length: 12 }, (_, month) => text(form, `monthlyMeanC.${month}`)),
  }),
  renew,
);

export const removeClimateAction = defineAction(
  removeClimate,
  (form) => ({ id: text(form, "id") }),
  renew,
);

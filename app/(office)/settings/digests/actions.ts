"use server";

import { revalidatePath } from "next/cache";
import { defineAction } from "@/lib/server/define-action";
import { chooseDigest } from "@/lib/usecases/choose-digest";
import { text, weekdaysOf } from "../_parts/read-form";

export const chooseDigestAction = defineAction(
  chooseDigest,
  (form) => ({
    personId: text(form, "id"),
    weekdays: weekdaysOf(form),
    sendAt: text(form, "sendAt"),
    horizonDays: text(form, "horizonDays"),
  }),
  () => revalidatePath("/settings/digests"),
);

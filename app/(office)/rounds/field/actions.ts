"use server";

import { revalidatePath } from "next/cache";
import { defineAction } from "@/lib/server/define-action";
import { closeMatter } from "@/lib/usecases/close-matter";
import { planStopAgain } from "@/lib/usecases/plan-stop-again";
import { sendEntryAgain } from "@/lib/usecases/send-entry-again";
import { texts } from "../../fleet/_parts/form-entries";

const renew = () => revalidatePath("/rounds", "layout");

export const sendAgainAction = defineAction(sendEntryAgain, (form) => texts(form, "id"), renew);
export const planAgainAction = defineAction(
  planStopAgain,
  (form) => texts(form, "id", "returnOn"),
  renew,
);
export const closeMatterAction = defineAction(
  closeMatter,
  (form) => texts(form, "id", "reason"),
  renew,
);

"use server";

import { revalidatePath } from "next/cache";
import { defineAction } from "@/lib/server/define-action";
import { retryMail } from "@/lib/usecases/retry-mail";
import { text } from "../_parts/read-form";

export const retryMailAction = defineAction(
  retryMail,
  (form) => ({ mailId: text(form, "id") }),
  () => revalidatePath("/settings/mails"),
);

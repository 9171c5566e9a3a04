"use server";

import { revalidatePath } from "next/cache";
import { defineAction } from "@/lib/server/define-action";
import { dismissFinding, reopenFinding } from "@/lib/usecases/dismiss-finding";

const renew = () => revalidatePath("/record/findings");

export const dismissFindingAction = defineAction(
  dismissFinding,
  (form) => ({ id: String(form.get("id")), because: String(form.get("because") ?? "") }),
  renew,
);
export const reopenFindingAction = defineAction(
  reopenFinding,
  (form) => ({ id: String(form.get("id")) }),
  renew,
);

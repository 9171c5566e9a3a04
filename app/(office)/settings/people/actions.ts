"use server";

import { revalidatePath } from "next/cache";
import { defineAction } from "@/lib/server/define-action";
import { changePerson } from "@/lib/usecases/change-person";
import { inviteAgain } from "@/lib/usecases/invite-again";
import { invitePerson } from "@/lib/usecases/invite-person";
import { signOutEverywhere } from "@/lib/usecases/sign-out-everywhere";
import { switchPerson } from "@/lib/usecases/switch-person";
import { ROLES } from "@/lib/usecases/use-case";
import { text, ticked } from "../_parts/read-form";

const renew = () => revalidatePath("/settings/people", "layout");
const person = (form: FormData) => ({ personId: text(form, "id") });
const entries = (form: FormData) => ({
  name: text(form, "name"),
  email: text(form, "email"),
  roles: ticked(form, "role", ROLES),
});

export const invitePersonAction = defineAction(invitePerson, entries, renew);
export const inviteAgainAction = defineAction(inviteAgain, person, renew);
export const changePersonAction = defineAction(
  changePerson,
  (form) => ({ ...person(form), ...entries(form) }),
  renew,
);
export const switchPersonAction = defineAction(
  switchPerson,
  (form) => ({ ...person(form), active: text(form, "active") === "on" }),
  renew,
);
export const signPersonOutAction = defineAction(signOutEverywhere, person, renew);

"use server";

import { redirect } from "next/navigation";
import { signOut } from "@/lib/server/auth";
import { defineAction } from "@/lib/server/define-action";
import { signInAfterwards } from "@/lib/server/sign-in-afterwards";
import { changeOwnPassword } from "@/lib/usecases/change-own-password";
import { signOutEverywhere } from "@/lib/usecases/sign-out-everywhere";

export const changeOwnPasswordAction = defineAction(
  changeOwnPassword,
  (form) => ({
    present: String(form.get("present") ?? ""),
    password: String(form.get("password") ?? ""),
  }),
  ({ email }, form) => signInAfterwards(email, String(form.get("password")), "/account?changed=1"),
);

export const signOutEverywhereAction = defineAction(
  signOutEverywhere,
  (form) => ({ personId: String(form.get("personId") ?? "") }),
  async () => {
    await signOut({ redirect: false });
    redirect("/sign-in");
  },
);

"use server";

import { defineVisitorAction } from "@/lib/server/define-action";
import { signInAfterwards } from "@/lib/server/sign-in-afterwards";
import { acceptInvitation } from "@/lib/usecases/accept-invitation";

export const acceptInvitationAction = defineVisitorAction(
  acceptInvitation,
  (form) => ({
    token: String(form.get("token") ?? ""),
    name: String(form.get("name") ?? ""),
    password: String(form.get("password") ?? ""),
  }),
  ({ email }, form) => signInAfterwards(email, String(form.get("password"))),
);

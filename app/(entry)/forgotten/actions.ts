"use server";

import { type ActionState, defineVisitorAction } from "@/lib/server/define-action";
import { signInAfterwards } from "@/lib/server/sign-in-afterwards";
import { steadily } from "@/lib/server/steadily";
import { choosePassword } from "@/lib/usecases/choose-password";
import { requestPasswordLink } from "@/lib/usecases/request-password-link";

const request = defineVisitorAction(requestPasswordLink, (form) => ({
  email: String(form.get("email") ?? ""),
}));

/** Mails a link to a new password; takes equally long whether or not the address is known. */
export async function requestPasswordLinkAction(
  state: ActionState<{ email: string }>,
  form: FormData,
): Promise<ActionState<{ email: string }>> {
  return steadily(400, () => request(state, form));
}

export const choosePasswordAction = defineVisitorAction(
  choosePassword,
  (form) => ({
    token: String(form.get("token") ?? ""),
    password: String(form.get("password") ?? ""),
  }),
  ({ email }, form) => signInAfterwards(email, String(form.get("password"))),
);

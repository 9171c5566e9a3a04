"use server";

import { type ActionState, defineVisitorAction } from "@/lib/server/define-action";
import { steadily } from "@/lib/server/steadily";
import { requestSignInLink } from "@/lib/usecases/request-sign-in-link";

const request = defineVisitorAction(requestSignInLink, (form) => ({
  email: String(form.get("email") ?? ""),
}));

/** Mails a one-time link; takes equally long whether or not the address is known. */
export async function requestSignInLinkAction(
  state: ActionState<{ email: string }>,
  form: FormData,
): Promise<ActionState<{ email: string }>> {
  return steadily(400, () => request(state, form));
}

import { z } from "zod";
import { mailAddress } from "./person-fields";
import { requestLink } from "./request-link";
import { defineUseCase } from "./use-case";

/** Mails a link that signs in once, for 15 minutes. */
export const requestSignInLink = defineUseCase({
  name: "request-sign-in-link",
  allow: { visitor: true },
  input: z.object({ email: mailAddress }),
  run: (deps, actor, { email }) =>
    requestLink(deps, actor, "request-sign-in-link", { email, purpose: "sign_in" }),
});

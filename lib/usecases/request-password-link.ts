import { z } from "zod";
import { mailAddress } from "./person-fields";
import { requestLink } from "./request-link";
import { defineUseCase } from "./use-case";

/** Mails a link to choose a new password, for one hour. */
export const requestPasswordLink = defineUseCase({
  name: "request-password-link",
  allow: { visitor: true },
  input: z.object({ email: mailAddress }),
  run: (deps, actor, { email }) =>
    requestLink(deps, actor, "request-password-link", { email, purpose: "password" }),
});

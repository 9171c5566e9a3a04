import { z } from "zod";
import { newPassword } from "./person-fields";
import { setPasswordByLink } from "./set-password";
import { defineUseCase } from "./use-case";

/** Sets a new password with the link of a forgotten one; signs the person out everywhere. */
export const choosePassword = defineUseCase({
  name: "choose-password",
  allow: { visitor: true },
  input: z.object({ token: z.string().max(200), password: newPassword }),
  run: (deps, _actor, { token, password }) =>
    setPasswordByLink(deps, { act: "choose-password", purpose: "password", token, password }),
});

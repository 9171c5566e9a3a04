import { z } from "zod";
import { renamePerson } from "@/db/queries/people";
import { newPassword, personName } from "./person-fields";
import { setPasswordByLink } from "./set-password";
import { defineUseCase } from "./use-case";

/** Takes up an invitation: the person checks their name and chooses a password. */
export const acceptInvitation = defineUseCase({
  name: "accept-invitation",
  allow: { visitor: true },
  input: z.object({ token: z.string().max(200), name: personName, password: newPassword }),
  run: (deps, _actor, { token, name, password }) =>
    setPasswordByLink(deps, {
      act: "accept-invitation",
      purpose: "invitation",
      token,
      password,
      also: (trx, personId) => renamePerson(trx, personId, name),
    }),
});

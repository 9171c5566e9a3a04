import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { consumeToken } from "@/db/queries/one-time-tokens";
import { findCredentials, markSeen } from "@/db/queries/people";
import { AppError } from "@/lib/errors";
import { hashOfSecret } from "./one-time-secret";
import type { SignedIn } from "./sign-in-with-password";
import { defineUseCase } from "./use-case";

/**
 * Signs a person in with the one-time link from a mail.
 * @throws AppError not_signed_in when the link is unknown, used, expired, or the person switched off
 */
export const signInWithToken = defineUseCase({
  name: "sign-in-with-token",
  allow: { visitor: true },
  input: z.object({ token: z.string().max(200) }),
  run: (deps, _actor, { token }): Promise<SignedIn> =>
    deps.db.transaction().execute(async (trx) => {
      const at = deps.now();
      const personId = await consumeToken(trx, hashOfSecret(token), "sign_in", at);
      const person = personId ? await findCredentials(trx, personId) : null;
      if (!person?.active) {
        throw new AppError("not_signed_in", "This link was used already or has expired.");
      }
      const { id, name, email, sessionVersion } = person;
      await markSeen(trx, id, at);
      await appendAudit(trx, {
        at,
        personId: id,
        act: "sign-in-with-token",
        subjectKind: "person",
        subjectId: id,
      });
      return { id, name, email, sessionVersion };
    }),
});

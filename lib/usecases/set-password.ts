import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { appendAudit } from "@/db/queries/audit";
import { consumeToken, deleteOpenTokens } from "@/db/queries/one-time-tokens";
import { findCredentials, storePassword } from "@/db/queries/people";
import { clearRateBucket } from "@/db/queries/rate-events";
import { AppError, invalid } from "@/lib/errors";
import { hashOfSecret } from "./one-time-secret";
import { hashPassword } from "./passwords";
import type { Deps } from "./use-case";

export interface PasswordChoice {
  readonly act: string;
  readonly token: string;
  readonly purpose: "password" | "invitation";
  readonly password: string;
  /** Written besides, in the same transaction. */
  readonly also?: (trx: Transaction<Database>, personId: string) => Promise<void>;
}

/**
 * Sets a password by a link from a mail. Every session and every other open link of the person
 * ends with it.
 * @throws AppError not_signed_in when the link was used or has expired
 */
export async function setPasswordByLink(
  deps: Deps,
  choice: PasswordChoice,
): Promise<{ email: string }> {
  const passwordHash = await hashPassword(choice.password);
  return deps.db.transaction().execute(async (trx) => {
    const at = deps.now();
    const personId = await consumeToken(trx, hashOfSecret(choice.token), choice.purpose, at);
    const person = personId ? await findCredentials(trx, personId) : null;
    if (!person?.active) {
      throw new AppError("not_signed_in", "This link was used already or has expired.");
    }
    refuseOwnName(choice.password, person);
    await storePassword(trx, person.id, passwordHash);
    await deleteOpenTokens(trx, person.id);
    await clearRateBucket(trx, `sign-in:mail:${person.email}`);
    await choice.also?.(trx, person.id);
    await appendAudit(trx, {
      at,
      personId: person.id,
      act: choice.act,
      subjectKind: "person",
      subjectId: person.id,
    });
    return { email: person.email };
  });
}

/** @throws AppError invalid when the password is the person's own name or address */
export function refuseOwnName(password: string, person: { name: string; email: string }): void {
  const given = password.toLowerCase();
  if (given !== person.email && given !== person.name.toLowerCase()) return;
  const message = "Do not use your own name or mail address.";
  throw invalid("Some entries need mending.", [{ field: "password", message }]);
}

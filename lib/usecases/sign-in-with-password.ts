import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { findCredentialsByEmail, markSeen } from "@/db/queries/people";
import { AppError } from "@/lib/errors";
import { type AttemptLimit, countAttempt } from "./limit-attempts";
import { passwordMatches } from "./passwords";
import { type Actor, defineUseCase } from "./use-case";

/** What a session is made of. */
export interface SignedIn {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly sessionVersion: number;
}

/** Failures counted together; an office may share one address, hence more for it. */
function limitsOf(email: string, actor: Actor): AttemptLimit[] {
  const origin = actor.kind === "visitor" ? actor.origin : "signed-in";
  return [
    { bucket: `sign-in:mail:${email}`, most: 10, minutes: 15 },
    { bucket: `sign-in:origin:${origin}`, most: 50, minutes: 15 },
  ];
}

/**
 * Signs a person in with mail address and password.
 * @throws AppError not_signed_in (the same for a wrong password, an unknown address and a person
 * switched off) | too_many
 */
export const signInWithPassword = defineUseCase({
  name: "sign-in-with-password",
  allow: { visitor: true },
  // Not checked for form: a malformed address must look like an unknown one.
  input: z.object({
    email: z.string().trim().toLowerCase().max(254),
    password: z.string().max(1000),
  }),
  async run(deps, actor, { email, password }): Promise<SignedIn> {
    const limits = limitsOf(email, actor);
    const attempt = await countAttempt(deps, limits, ", or ask for a one-time link by mail");
    const person = await findCredentialsByEmail(deps.db, email);
    const matches = await passwordMatches(person?.active ? person.passwordHash : null, password);
    const at = deps.now();
    if (!person || !matches) {
      if (person) {
        // Bounded by the limit on the address; unknown addresses leave no trace to fill the audit.
        await appendAudit(deps.db, {
          ...about(person.id, at),
          personId: null,
          act: "sign-in-refused",
        });
      }
      throw new AppError("not_signed_in", "This mail address and password do not go together.");
    }
    await attempt.forgive([`sign-in:mail:${email}`]);
    await deps.db.transaction().execute(async (trx) => {
      await markSeen(trx, person.id, at);
      await appendAudit(trx, { ...about(person.id, at), act: "sign-in-with-password" });
    });
    const { id, name, sessionVersion } = person;
    return { id, name, email: person.email, sessionVersion };
  },
});

function about(personId: string, at: Date) {
  return { at, personId, subjectKind: "person", subjectId: personId };
}

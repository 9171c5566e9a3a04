import { appendAudit } from "@/db/queries/audit";
import { findCredentialsByEmail } from "@/db/queries/people";
import { countAttempt } from "./limit-attempts";
import { sendLink } from "./send-link";
import type { Actor, Deps } from "./use-case";

/**
 * Sends a link to whoever has this address, if anybody has. The answer is the same either way,
 * so that nobody learns who has an account.
 * @throws AppError too_many, also the same for known and unknown addresses
 */
export async function requestLink(
  deps: Deps,
  actor: Actor,
  act: string,
  { email, purpose }: { email: string; purpose: "sign_in" | "password" },
): Promise<{ email: string }> {
  const origin = actor.kind === "visitor" ? actor.origin : "signed-in";
  await countAttempt(
    deps,
    [
      { bucket: `link:mail:${email}`, most: 5, minutes: 60 },
      { bucket: `link:origin:${origin}`, most: 30, minutes: 60 },
    ],
    "",
  );
  const person = await findCredentialsByEmail(deps.db, email);
  if (!person?.active) return { email };
  await deps.db.transaction().execute(async (trx) => {
    await sendLink(trx, deps, person, purpose);
    await appendAudit(trx, {
      at: deps.now(),
      // Whoever asked has not shown who they are.
      personId: null,
      act,
      subjectKind: "person",
      subjectId: person.id,
    });
  });
  return { email };
}

import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import { findActivePerson } from "@/db/queries/actors";
import type { PersonActor, Role } from "@/lib/usecases/use-case";

/** What a signed session cookie says. */
export interface SessionClaim {
  readonly personId: string;
  readonly sessionVersion: number;
}

/**
 * The person behind a session as the database has them now; null when switched off, removed or
 * signed out everywhere since.
 */
export async function actorOfSession(
  db: Kysely<Database>,
  claim: SessionClaim,
): Promise<PersonActor | null> {
  const person = await findActivePerson(db, claim.personId);
  if (!person || person.sessionVersion !== claim.sessionVersion) return null;
  return {
    kind: "person",
    personId: person.id,
    name: person.name,
    email: person.email,
    roles: person.roles as Role[],
    technicianId: person.technicianId,
  };
}

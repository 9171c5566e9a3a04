import type { Kysely } from "kysely";
import type { Database } from "../client";

/** Who signs in, with what is needed to check them. The hash never leaves the use cases. */
export interface Credentials {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly active: boolean;
  readonly passwordHash: string | null;
  readonly sessionVersion: number;
}

const CREDENTIALS = ["id", "name", "email", "active", "passwordHash", "sessionVersion"] as const;

/** @param email in lower case */
export async function findCredentialsByEmail(
  db: Kysely<Database>,
  email: string,
): Promise<Credentials | null> {
  const row = await db
    .selectFrom("person")
    .select(CREDENTIALS)
    .where("email", "=", email)
    .executeTakeFirst();
  return row ?? null;
}

export async function findCredentials(
  db: Kysely<Database>,
  personId: string,
): Promise<Credentials | null> {
  const row = await db
    .selectFrom("person")
    .select(CREDENTIALS)
    .where("id", "=", personId)
    .executeTakeFirst();
  return row ?? null;
}

/** Notes that a person came in just now; the first time is when they joined. */
export async function markSeen(db: Kysely<Database>, personId: string, at: Date): Promise<void> {
  await db
    .updateTable("person")
    .set((eb) => ({ lastSeenAt: at, joinedAt: eb.fn.coalesce("joinedAt", eb.val(at)) }))
    .where("id", "=", personId)
    .execute();
}

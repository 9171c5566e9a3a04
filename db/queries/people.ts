import type { Kysely, Transaction } from "kysely";
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

/** Stores a new password hash and ends every session. */
export async function storePassword(
  trx: Transaction<Database>,
  personId: string,
  passwordHash: string,
): Promise<void> {
  await trx
    .updateTable("person")
    .set((eb) => ({ passwordHash, sessionVersion: eb("sessionVersion", "+", 1) }))
    .where("id", "=", personId)
    .execute();
}

/** Ends every session of a person. @returns false when there is no such person */
export async function endSessions(trx: Transaction<Database>, personId: string): Promise<boolean> {
  const result = await trx
    .updateTable("person")
    .set((eb) => ({ sessionVersion: eb("sessionVersion", "+", 1) }))
    .where("id", "=", personId)
    .executeTakeFirst();
  return result.numUpdatedRows > 0n;
}

export async function renamePerson(
  trx: Transaction<Database>,
  personId: string,
  name: string,
): Promise<void> {
  await trx.updateTable("person").set({ name }).where("id", "=", personId).execute();
}

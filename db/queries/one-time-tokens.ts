import type { Kysely, Transaction } from "kysely";
import type { Database } from "../client";

export type TokenPurpose = "sign_in" | "password" | "invitation";

export interface NewToken {
  readonly id: string;
  readonly personId: string;
  readonly purpose: TokenPurpose;
  readonly tokenHash: string;
  readonly expiresAt: Date;
  readonly createdAt: Date;
}

/** Stores a token and takes back the person's earlier unused ones for the same purpose. */
export async function replaceToken(trx: Transaction<Database>, token: NewToken): Promise<void> {
  await trx
    .deleteFrom("oneTimeToken")
    .where("personId", "=", token.personId)
    .where("purpose", "=", token.purpose)
    .where("usedAt", "is", null)
    .execute();
  await trx.insertInto("oneTimeToken").values(token).execute();
}

/**
 * Uses a token up in one statement, so that of two who come at once only one gets in.
 * @returns whose it was, or null when unknown, used, expired or for another purpose
 */
export async function consumeToken(
  db: Kysely<Database>,
  tokenHash: string,
  purpose: TokenPurpose,
  now: Date,
): Promise<string | null> {
  const row = await db
    .updateTable("oneTimeToken")
    .set({ usedAt: now })
    .where("tokenHash", "=", tokenHash)
    .where("purpose", "=", purpose)
    .where("usedAt", "is", null)
    .where("expiresAt", ">", now)
    .returning("personId")
    .executeTakeFirst();
  return row?.personId ?? null;
}

/** Whom a usable token belongs to, without using it. */
export async function findTokenOwner(
  db: Kysely<Database>,
  tokenHash: string,
  purpose: TokenPurpose,
  now: Date,
): Promise<{ name: string; email: string; expiresAt: Date } | null> {
  const row = await db
    .selectFrom("oneTimeToken")
    .innerJoin("person", "person.id", "oneTimeToken.personId")
    .select(["person.name", "person.email", "oneTimeToken.expiresAt"])
    .where("tokenHash", "=", tokenHash)
    .where("purpose", "=", purpose)
    .where("usedAt", "is", null)
    .where("expiresAt", ">", now)
    .where("person.active", "=", true)
    .executeTakeFirst();
  return row ?? null;
}

/** Takes back every unused link of a person. */
export async function deleteOpenTokens(
  trx: Transaction<Database>,
  personId: string,
): Promise<void> {
  await trx
    .deleteFrom("oneTimeToken")
    .where("personId", "=", personId)
    .where("usedAt", "is", null)
    .execute();
}

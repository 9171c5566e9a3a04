import type { Kysely, Transaction } from "kysely";
import type { Database } from "../client";

/** The key with this SHA-256 hash, marked as used now; null when unknown or revoked. */
export async function findUsableApiKey(db: Kysely<Database>, keyHash: string, now: Date) {
  const row = await db
    .updateTable("apiKey")
    .set({ lastUsedAt: now })
    .where("keyHash", "=", keyHash)
    .where("revokedAt", "is", null)
    .returning(["id", "scopes"])
    .executeTakeFirst();
  return row ?? null;
}

/** Every key, those in use first; never the hash. */
export async function listApiKeys(db: Kysely<Database>) {
  return db
    .selectFrom("apiKey")
    .leftJoin("person", "person.id", "apiKey.createdBy")
    .select([
      ...(["apiKey.id", "apiKey.name", "apiKey.prefix", "apiKey.scopes"] as const),
      ...(["apiKey.createdAt", "apiKey.lastUsedAt", "apiKey.revokedAt"] as const),
      "person.name as createdByName",
    ])
    .orderBy("apiKey.revokedAt", (order) => order.desc().nullsFirst())
    .orderBy("apiKey.createdAt", "desc")
    .execute();
}

export interface NewApiKey {
  readonly id: string;
  readonly name: string;
  readonly prefix: string;
  readonly keyHash: string;
  readonly scopes: readonly string[];
  readonly createdBy: string | null;
  readonly createdAt: Date;
}

export async function insertApiKey(trx: Transaction<Database>, key: NewApiKey): Promise<void> {
  await trx
    .insertInto("apiKey")
    .values({ ...key, scopes: [...key.scopes] })
    .execute();
}

/** @returns the key's name, or null when there is none that could be revoked */
export async function revokeApiKey(
  trx: Transaction<Database>,
  id: string,
  at: Date,
): Promise<string | null> {
  const row = await trx
    .updateTable("apiKey")
    .set({ revokedAt: at })
    .where("id", "=", id)
    .where("revokedAt", "is", null)
    .returning("name")
    .executeTakeFirst();
  return row?.name ?? null;
}

import type { Kysely } from "kysely";
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

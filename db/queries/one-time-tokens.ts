import type { Kysely } from "kysely";
import type { Database } from "../client";

export type TokenPurpose = "sign_in" | "password" | "invitation";

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

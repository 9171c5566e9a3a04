import type { Kysely, Transaction } from "kysely";
import type { Database } from "../client";

export interface NewSyncEntry {
  readonly id: string;
  readonly personId: string;
  readonly deviceId: string;
  readonly kind: string;
  readonly happenedAt: Date;
  readonly receivedAt: Date;
  readonly clockSkewMs: number;
  readonly body: unknown;
  readonly outcome: "applied" | "refused";
  readonly refusal: unknown | null;
}

/** The recorded outcome of an entry that was sent before. */
export async function findSyncEntry(db: Kysely<Database>, id: string) {
  return db
    .selectFrom("syncEntry")
    .select(["id", "personId", "outcome", "refusal", "kind", "body", "happenedAt", "clockSkewMs"])
    .select("receivedAt")
    .where("id", "=", id)
    .executeTakeFirst();
}

/**
 * Claims an entry's id. A second transaction with the same id waits here until the first is
 * through, then gets false: that is what makes an entry count once.
 */
export async function insertSyncEntry(
  trx: Transaction<Database>,
  entry: NewSyncEntry,
): Promise<boolean> {
  const row = await trx
    .insertInto("syncEntry")
    .values({
      ...entry,
      body: JSON.stringify(entry.body ?? null),
      refusal: entry.refusal === null ? null : JSON.stringify(entry.refusal),
    })
    .onConflict((conflict) => conflict.column("id").doNothing())
    .returning("id")
    .executeTakeFirst();
  return row !== undefined;
}

/** A refused entry that the office sent again with success. */
export async function markEntryApplied(trx: Transaction<Database>, id: string): Promise<void> {
  await trx
    .updateTable("syncEntry")
    .set({ outcome: "applied", refusal: null })
    .where("id", "=", id)
    .execute();
}

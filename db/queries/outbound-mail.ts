import type { Kysely, Transaction } from "kysely";
import type { Database } from "../client";

export interface NewOutboundMail {
  readonly id: string;
  readonly template: string;
  readonly toEmail: string;
  readonly toPersonId: string | null;
  readonly subject: string;
  readonly props: Record<string, unknown>;
  readonly idempotencyKey: string;
  readonly createdAt: Date;
}

/** @returns false when a mail with this idempotency key exists already */
export async function insertOutboundMail(
  trx: Transaction<Database>,
  mail: NewOutboundMail,
): Promise<boolean> {
  const row = await trx
    .insertInto("outboundMail")
    .values({ ...mail, props: JSON.stringify(mail.props) })
    .onConflict((conflict) => conflict.column("idempotencyKey").doNothing())
    .returning("id")
    .executeTakeFirst();
  return row !== undefined;
}

export async function findOutboundMail(db: Kysely<Database>, id: string) {
  return db.selectFrom("outboundMail").selectAll().where("id", "=", id).executeTakeFirst();
}

export async function markMailSent(
  db: Kysely<Database>,
  id: string,
  providerId: string,
  at: Date,
): Promise<void> {
  await db
    .updateTable("outboundMail")
    .set((eb) => ({
      state: "sent",
      sentAt: at,
      providerId,
      lastError: null,
      attempts: eb("attempts", "+", 1),
    }))
    .where("id", "=", id)
    .execute();
}

/** Records a failed attempt; the mail counts as failed at once when no repetition can help. */
export async function markMailFailed(
  db: Kysely<Database>,
  id: string,
  reason: string,
  willRetry: boolean,
): Promise<void> {
  await db
    .updateTable("outboundMail")
    .set((eb) => ({
      state: willRetry ? "queued" : "failed",
      lastError: reason,
      attempts: eb("attempts", "+", 1),
    }))
    .where("id", "=", id)
    .execute();
}

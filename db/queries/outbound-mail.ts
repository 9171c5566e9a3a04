import type { Transaction } from "kysely";
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

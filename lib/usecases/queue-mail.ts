import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { insertOutboundMail } from "@/db/queries/outbound-mail";
import type { Deps } from "./use-case";

export const MAIL_TEMPLATES = [
  "invitation",
  "password",
  "sign-in-link",
  "round-published",
  "round-changed",
  "round-cancelled",
  "due-digest",
  "visit-notice",
] as const;
export type MailTemplate = (typeof MAIL_TEMPLATES)[number];

export interface MailOrder {
  readonly template: MailTemplate;
  readonly toEmail: string;
  readonly toPersonId: string | null;
  readonly subject: string;
  /** Plain data for the template in emails/; the worker renders it. */
  readonly props: Record<string, unknown>;
  /** The same key is sent once, however often it is ordered. */
  readonly idempotencyKey: string;
}

/** Writes a mail and its job in the transaction of the change that causes it. */
export async function queueMail(
  trx: Transaction<Database>,
  deps: Deps,
  order: MailOrder,
): Promise<void> {
  const id = deps.newId();
  const inserted = await insertOutboundMail(trx, { ...order, id, createdAt: deps.now() });
  if (inserted) await deps.jobs.enqueue(trx, "mail", { mailId: id });
}

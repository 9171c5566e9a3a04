import { type Kysely, sql, type SqlBool, type Transaction } from "kysely";
import type { Database } from "../client";

export const MAIL_STATES = ["queued", "sent", "failed"] as const;
export type MailState = (typeof MAIL_STATES)[number];

export interface MailListing {
  readonly search: string;
  readonly state: MailState | null;
  readonly limit: number;
  readonly offset: number;
}

function matching(db: Kysely<Database>, { search, state }: Pick<MailListing, "search" | "state">) {
  const like = `%${search.replace(/[\\%_]/g, "\\$&")}%`;
  return db
    .selectFrom("outboundMail")
    .$if(search !== "", (query) =>
      query.where(sql<SqlBool>`(to_email ilike ${like} or subject ilike ${like})`),
    )
    .$if(state !== null, (query) => query.where("state", "=", state ?? ""));
}

/** One page of the mails, newest first. Their content stays out: it may hold a link. */
export async function listMails(db: Kysely<Database>, listing: MailListing) {
  const [rows, counted, states] = await Promise.all([
    matching(db, listing)
      .select([
        ...(["id", "template", "toEmail", "subject", "state"] as const),
        ...(["attempts", "lastError", "createdAt", "sentAt"] as const),
      ])
      .orderBy("createdAt", "desc")
      .orderBy("id")
      .limit(listing.limit)
      .offset(listing.offset)
      .execute(),
    matching(db, listing)
      .select((eb) => eb.fn.countAll<number>().as("total"))
      .executeTakeFirstOrThrow(),
    db
      .selectFrom("outboundMail")
      .select((eb) => ["state", eb.fn.countAll<number>().as("count")])
      .groupBy("state")
      .execute(),
  ]);
  const counts = Object.fromEntries(states.map((row) => [row.state, row.count]));
  return { rows, total: counted.total, counts };
}

/** A mail that has not gone out, locked, with when its link ends if it carries one. */
export async function lockUnsentMail(trx: Transaction<Database>, id: string) {
  return trx
    .selectFrom("outboundMail")
    .select(["id", "state", "attempts", "toEmail"])
    .select(sql<string | null>`props ->> 'expiresAt'`.as("linkEnds"))
    .where("id", "=", id)
    .where("state", "<>", "sent")
    .forUpdate()
    .executeTakeFirst();
}

export async function requeueMail(trx: Transaction<Database>, id: string): Promise<void> {
  await trx.updateTable("outboundMail").set({ state: "queued" }).where("id", "=", id).execute();
}

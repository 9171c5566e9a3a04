import { type Kysely, sql } from "kysely";

/** A link that was mailed is not kept in readable form; old attempts are found by age. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`create index rate_event_at on rate_event (at)`.execute(db);
  await sql`
    create function forget_mailed_link() returns trigger language plpgsql as $$
    begin
      new.props := new.props - 'url';
      return new;
    end $$`.execute(db);
  await sql`
    create trigger outbound_mail_forget_link before update on outbound_mail
    for each row when (
      new.state = 'sent' and new.template in ('invitation', 'password', 'sign-in-link'))
    execute function forget_mailed_link()`.execute(db);
  await sql`comment on table one_time_token is
    'Only hashes are kept; the mail that carries a link loses it when it is sent.'`.execute(db);
}

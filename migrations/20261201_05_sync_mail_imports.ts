import { type Kysely, sql } from "kysely";

/** What phones send, what mails go out, what files come in. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table sync_entry (
      id uuid primary key,
      person_id uuid not null references person,
      device_id text not null,
      kind text not null,
      happened_at timestamptz not null,
      received_at timestamptz not null,
      clock_skew_ms integer,
      body jsonb not null,
      outcome text not null check (outcome in ('applied','refused')),
      refusal jsonb,
      check ((outcome = 'refused') = (refusal is not null))
    )`.execute(db);
  await sql`comment on table sync_entry is
    'Every entry a phone sent, once: the id was made on the phone. A repeat gets the recorded outcome.'`.execute(
    db,
  );
  await sql`create index sync_entry_person on sync_entry (person_id, received_at desc)`.execute(db);
  await sql`
    create table outbound_mail (
      id uuid primary key,
      template text not null,
      to_email text not null,
      to_person_id uuid references person,
      subject text not null,
      props jsonb not null,
      idempotency_key text not null unique,
      state text not null default 'queued' check (state in ('queued','sent','failed')),
      attempts integer not null default 0,
      last_error text,
      provider_id text,
      created_at timestamptz not null,
      sent_at timestamptz,
      check ((state = 'sent') = (sent_at is not null))
    )`.execute(db);
  await sql`create index outbound_mail_state on outbound_mail (state, created_at)`.execute(db);
  await sql`
    create table import_run (
      id uuid primary key,
      kind text not null check (kind in ('assets','installs','readings','cell_types','device_models')),
      file_name text not null,
      content text not null,
      settings jsonb not null,
      state text not null default 'uploaded'
        check (state in ('uploaded','checking','checked','importing','imported','failed')),
      rows_total integer,
      rows_done integer not null default 0,
      report jsonb,
      created_by uuid not null references person,
      created_at timestamptz not null,
      finished_at timestamptz
    )`.execute(db);
  await sql`create index import_run_created on import_run (created_at desc)`.execute(db);
}

import { type Kysely, sql } from "kysely";

/** Photos from the field, and what the office must look at. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table photo (
      id uuid primary key,
      entry_id uuid not null references sync_entry on delete cascade,
      person_id uuid not null references person,
      site_id uuid not null references site,
      asset_id uuid references asset,
      stop_id uuid references stop on delete set null,
      taken_at timestamptz not null,
      received_at timestamptz not null,
      clock_skew_ms integer,
      object_key text not null unique,
      width integer not null check (width > 0),
      height integer not null check (height > 0),
      bytes integer not null check (bytes > 0)
    )`.execute(db);
  await sql`comment on table photo is
    'The id was made on the phone: sending a photo twice keeps one. The picture itself lies in object storage, without metadata.'`.execute(
    db,
  );
  await sql`comment on column photo.asset_id is 'Null: it shows the site.'`.execute(db);
  await sql`create index photo_asset on photo (asset_id, taken_at desc)`.execute(db);
  await sql`create index photo_site on photo (site_id, taken_at desc)`.execute(db);
  await sql`create index photo_entry on photo (entry_id)`.execute(db);
  await sql`
    create table field_matter (
      id uuid primary key,
      kind text not null check (kind in ('refused','conflict','shortage','cannot')),
      entry_id uuid not null unique references sync_entry on delete cascade,
      person_id uuid not null references person,
      round_id uuid references round on delete set null,
      stop_id uuid references stop on delete set null,
      asset_id uuid references asset on delete set null,
      raised_at timestamptz not null,
      detail jsonb not null default '{}',
      closed_at timestamptz,
      closed_by uuid references person,
      outcome text check (outcome in ('sent_again','mended','planned_again','closed')),
      note text not null default '',
      check ((closed_at is null) = (outcome is null))
    )`.execute(db);
  await sql`comment on table field_matter is
    'What came from a phone and needs a decision in the office; open until somebody closes it.'`.execute(
    db,
  );
  await sql`create index field_matter_open on field_matter (raised_at) where closed_at is null`.execute(
    db,
  );
  await sql`create index field_matter_closed on field_matter (closed_at desc)
    where closed_at is not null`.execute(db);
}

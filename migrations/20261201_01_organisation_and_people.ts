import { type Kysely, sql } from "kysely";

/** The organisation (exactly one per deployment), its people and how they sign in. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`create extension if not exists btree_gist`.execute(db);
  await sql`
    create function refuse_change() returns trigger language plpgsql as $$
    begin
      raise exception '% is append-only', tg_table_name using errcode = 'restrict_violation';
    end $$`.execute(db);
  await sql`
    create table organisation (
      id smallint primary key default 1 check (id = 1),
      name text not null check (name <> ''),
      time_zone text not null,
      currency char(3) not null check (currency = upper(currency)),
      locale text not null,
      working_days smallint[] not null default '{1,2,3,4,5}',
      crew_cost_minor_per_hour integer not null default 3800 check (crew_cost_minor_per_hour >= 0),
      overtime_cost_minor_per_hour integer not null default 5700 check (overtime_cost_minor_per_hour >= 0),
      travel_cost_minor_per_km integer not null default 45 check (travel_cost_minor_per_km >= 0),
      detour_factor numeric(4,2) not null default 1.30 check (detour_factor between 1 and 5),
      road_speed_kmh integer not null default 45 check (road_speed_kmh between 5 and 130),
      travel_table_url text,
      map_tile_url text,
      is_demonstration boolean not null default false,
      created_at timestamptz not null default now(),
      check (working_days <@ '{1,2,3,4,5,6,7}' and cardinality(working_days) > 0)
    )`.execute(db);
  await sql`
    create table person (
      id uuid primary key,
      name text not null check (name <> ''),
      email text not null check (email = lower(email) and position('@' in email) > 1),
      roles text[] not null,
      password_hash text,
      active boolean not null default true,
      session_version integer not null default 1,
      invited_at timestamptz,
      joined_at timestamptz,
      last_seen_at timestamptz,
      created_at timestamptz not null default now(),
      unique (email),
      check (roles <@ array['administrator','dispatcher','supervisor','technician'] and cardinality(roles) > 0)
    )`.execute(db);
  await sql`
    create table one_time_token (
      id uuid primary key,
      person_id uuid not null references person on delete cascade,
      purpose text not null check (purpose in ('sign_in','password','invitation')),
      token_hash text not null unique,
      expires_at timestamptz not null,
      used_at timestamptz,
      created_at timestamptz not null
    )`.execute(db);
  await sql`
    create table rate_event (
      id bigint generated always as identity primary key,
      bucket text not null,
      at timestamptz not null
    )`.execute(db);
  await sql`create index rate_event_bucket_at on rate_event (bucket, at)`.execute(db);
  await sql`
    create table api_key (
      id uuid primary key,
      name text not null check (name <> ''),
      prefix text not null,
      key_hash text not null unique,
      scopes text[] not null check (scopes <@ array['readings:write','register:read'] and cardinality(scopes) > 0),
      created_by uuid references person,
      created_at timestamptz not null,
      last_used_at timestamptz,
      revoked_at timestamptz
    )`.execute(db);
  await sql`
    create table audit_entry (
      id bigint generated always as identity primary key,
      at timestamptz not null,
      person_id uuid references person,
      api_key_id uuid references api_key,
      act text not null,
      subject_kind text not null,
      subject_id text,
      detail jsonb not null default '{}'
    )`.execute(db);
  await sql`create index audit_entry_subject on audit_entry (subject_kind, subject_id, at desc)`.execute(
    db,
  );
  await sql`create index audit_entry_at on audit_entry (at desc)`.execute(db);
  await sql`create trigger audit_entry_append_only before update or delete on audit_entry
    for each row execute function refuse_change()`.execute(db);
  await sql`
    create table digest_setting (
      person_id uuid primary key references person on delete cascade,
      weekdays smallint[] not null default '{1}' check (weekdays <@ '{1,2,3,4,5,6,7}'),
      send_at time not null default '07:00',
      horizon_days integer not null default 14 check (horizon_days between 1 and 180),
      last_sent_on date
    )`.execute(db);
}

import { type Kysely, sql } from "kysely";

/** Plans, rounds, stops and tasks. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table plan (
      id uuid primary key,
      name text not null check (name <> ''),
      first_day date not null,
      last_day date not null check (last_day >= first_day),
      state text not null default 'draft' check (state in ('building','draft','published','discarded','failed')),
      version integer not null default 1,
      cost jsonb,
      problem text,
      created_by uuid references person,
      created_at timestamptz not null,
      published_by uuid references person,
      published_at timestamptz,
      check ((state = 'published') = (published_at is not null))
    )`.execute(db);
  await sql`comment on column plan.version is 'Counts edits; an edit names the version it saw, so two dispatchers cannot overwrite each other.'`.execute(
    db,
  );
  await sql`create index plan_state on plan (state, first_day)`.execute(db);
  await sql`
    create table round (
      id uuid primary key,
      plan_id uuid not null references plan on delete cascade,
      technician_id uuid not null references technician,
      day date not null,
      state text not null default 'proposed'
        check (state in ('proposed','published','started','done','cancelled')),
      starts_at timestamptz not null,
      ends_at timestamptz not null check (ends_at >= starts_at),
      drive_s integer not null default 0 check (drive_s >= 0),
      work_s integer not null default 0 check (work_s >= 0),
      distance_m integer not null default 0 check (distance_m >= 0),
      ical_uid text not null unique,
      ical_sequence integer not null default 0,
      published_at timestamptz,
      started_at timestamptz,
      done_at timestamptz,
      unique (plan_id, technician_id, day)
    )`.execute(db);
  await sql`create unique index one_round_per_technician_and_day on round (technician_id, day)
    where state in ('published','started','done')`.execute(db);
  await sql`create index round_day on round (day)`.execute(db);
  await sql`
    create table stop (
      id uuid primary key,
      round_id uuid not null references round on delete cascade,
      site_id uuid not null references site,
      position smallint not null check (position >= 1),
      arrives_at timestamptz not null,
      departs_at timestamptz not null check (departs_at >= arrives_at),
      locked boolean not null default false,
      state text not null default 'planned' check (state in ('planned','done','cannot_do')),
      cannot_reason text check (cannot_reason in ('no_access','flooded','not_found','unsafe','no_cells','other')),
      cannot_note text not null default '',
      return_on date,
      done_at timestamptz,
      check ((state = 'cannot_do') = (cannot_reason is not null)),
      unique (round_id, position) deferrable initially deferred,
      unique (round_id, site_id)
    )`.execute(db);
  await sql`create index stop_site on stop (site_id)`.execute(db);
  await sql`
    create table task (
      id uuid primary key,
      stop_id uuid not null references stop on delete cascade,
      asset_id uuid not null references asset,
      pack_id uuid references pack,
      kind text not null check (kind in ('swap','read','inspect')),
      cell_type_id uuid references cell_type,
      cells smallint not null default 0 check (cells >= 0),
      state text not null default 'planned' check (state in ('planned','done','not_done')),
      done_at timestamptz,
      check ((kind = 'swap') = (cell_type_id is not null)),
      unique (stop_id, asset_id)
    )`.execute(db);
  await sql`create index task_asset on task (asset_id)`.execute(db);
  await sql`
    create table plan_left_out (
      plan_id uuid not null references plan on delete cascade,
      asset_id uuid not null references asset,
      reason text not null check (reason in
        ('cheaper_later','notice','closed','no_ticket','no_cells','no_time','too_far','excluded')),
      detail text not null default '',
      earliest_day date,
      waiting_cost_minor_per_week integer not null default 0,
      primary key (plan_id, asset_id)
    )`.execute(db);
}

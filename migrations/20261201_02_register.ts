import { type Kysely, sql } from "kysely";

/** Sites, crews, technicians, cell types, device models and assets. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table depot (
      id uuid primary key,
      name text not null unique check (name <> ''),
      latitude double precision not null check (latitude between -90 and 90),
      longitude double precision not null check (longitude between -180 and 180)
    )`.execute(db);
  await sql`
    create table crew (
      id uuid primary key,
      name text not null unique check (name <> ''),
      depot_id uuid not null references depot
    )`.execute(db);
  await sql`
    create table van (
      id uuid primary key,
      name text not null unique check (name <> ''),
      crew_id uuid not null references crew,
      cell_capacity integer check (cell_capacity > 0)
    )`.execute(db);
  await sql`
    create table technician (
      id uuid primary key,
      person_id uuid not null unique references person,
      crew_id uuid not null references crew,
      van_id uuid unique references van,
      tickets text[] not null default '{}'
        check (tickets <@ array['height','boat','confined_space','roadside','explosive_atmosphere'])
    )`.execute(db);
  await sql`
    create table shift (
      technician_id uuid not null references technician on delete cascade,
      weekday smallint not null check (weekday between 1 and 7),
      starts time not null,
      ends time not null check (ends > starts),
      primary key (technician_id, weekday)
    )`.execute(db);
  await sql`
    create table absence (
      id uuid primary key,
      technician_id uuid not null references technician on delete cascade,
      first_day date not null,
      last_day date not null check (last_day >= first_day),
      reason text not null default '',
      exclude using gist (technician_id with =, daterange(first_day, last_day, '[]') with &&)
    )`.execute(db);
  await sql`
    create table climate (
      id uuid primary key,
      name text not null unique check (name <> ''),
      monthly_mean_dc smallint[] not null check (cardinality(monthly_mean_dc) = 12)
    )`.execute(db);
  await sql`
    create table site (
      id uuid primary key,
      code text not null unique check (code <> ''),
      name text not null check (name <> ''),
      latitude double precision not null check (latitude between -90 and 90),
      longitude double precision not null check (longitude between -180 and 180),
      crew_id uuid references crew,
      climate_id uuid references climate,
      notice_days smallint not null default 0 check (notice_days between 0 and 120),
      opens time,
      closes time,
      key_code text,
      contact_name text,
      contact_email text,
      contact_phone text,
      hazards text[] not null default '{}' check (hazards <@ array[
        'water','height','confined_space','roadside','explosive_atmosphere','lone_working','livestock','soft_ground']),
      tickets text[] not null default '{}'
        check (tickets <@ array['height','boat','confined_space','roadside','explosive_atmosphere']),
      drive_up_notes text not null default '',
      updated_at timestamptz not null default now(),
      check ((opens is null) = (closes is null) and (opens is null or closes > opens))
    )`.execute(db);
  await sql`create index site_crew on site (crew_id)`.execute(db);
  await sql`
    create table site_closure (
      id uuid primary key,
      site_id uuid not null references site on delete cascade,
      first_month_day char(5) not null check (first_month_day ~ '^(0[1-9]|1[0-2])-([0-2][0-9]|3[01])$'),
      last_month_day char(5) not null check (last_month_day ~ '^(0[1-9]|1[0-2])-([0-2][0-9]|3[01])$'),
      reason text not null default ''
    )`.execute(db);
  await sql`comment on table site_closure is 'A closed season that returns every year; it may span New Year.'`.execute(
    db,
  );
  await sql`create index site_closure_site on site_closure (site_id)`.execute(db);
  await sql`
    create table cell_type (
      id uuid primary key,
      designation text not null unique check (designation <> ''),
      name text not null,
      chemistry text not null check (chemistry in
        ('alkaline','zinc-carbon','li-fes2','li-socl2','li-mno2','silver-oxide','vrla','lifepo4')),
      size text not null default '',
      nominal_mv integer not null check (nominal_mv > 0),
      rated_capacity_mah integer not null check (rated_capacity_mah > 0),
      rated_current_ua integer not null check (rated_current_ua > 0),
      rated_cutoff_mv integer not null check (rated_cutoff_mv > 0),
      rated_temperature_dc smallint not null default 200,
      self_discharge_ppm_per_year integer not null check (self_discharge_ppm_per_year between 0 and 1000000),
      resistance_mohm integer not null check (resistance_mohm > 0),
      max_pulse_ua integer check (max_pulse_ua > 0),
      mass_mg integer check (mass_mg > 0),
      shelf_life_months integer check (shelf_life_months > 0),
      unit_cost_minor integer not null default 0 check (unit_cost_minor >= 0),
      reorder_point integer not null default 0 check (reorder_point >= 0),
      lead_time_days integer not null default 7 check (lead_time_days >= 0),
      retired boolean not null default false,
      updated_at timestamptz not null default now()
    )`.execute(db);
  await sql`
    create table capacity_point (
      cell_type_id uuid not null references cell_type on delete cascade,
      current_ua integer not null check (current_ua > 0),
      cutoff_mv integer not null check (cutoff_mv > 0),
      temperature_dc smallint not null,
      capacity_mah integer not null check (capacity_mah > 0),
      source text not null default '',
      primary key (cell_type_id, current_ua, cutoff_mv, temperature_dc)
    )`.execute(db);
  await sql`
    create table device_model (
      id uuid primary key,
      name text not null unique check (name <> ''),
      cutoff_mv integer not null check (cutoff_mv > 0),
      series smallint not null check (series between 1 and 24),
      parallel smallint not null check (parallel between 1 and 12),
      swap_minutes smallint not null default 15 check (swap_minutes between 1 and 480),
      read_minutes smallint not null default 5 check (read_minutes between 1 and 480),
      silence_cost_minor_per_hour integer not null default 20 check (silence_cost_minor_per_hour >= 0),
      habit_interval_days integer check (habit_interval_days > 0),
      retired boolean not null default false,
      updated_at timestamptz not null default now()
    )`.execute(db);
  await sql`
    create table duty_state (
      device_model_id uuid not null references device_model on delete cascade,
      position smallint not null,
      name text not null check (name <> ''),
      current_ua integer not null check (current_ua >= 0),
      duration_ms integer not null check (duration_ms > 0),
      primary key (device_model_id, position),
      unique (device_model_id, name)
    )`.execute(db);
  await sql`
    create table device_model_cell_type (
      device_model_id uuid not null references device_model on delete cascade,
      cell_type_id uuid not null references cell_type,
      preferred boolean not null default false,
      primary key (device_model_id, cell_type_id)
    )`.execute(db);
  await sql`create unique index one_preferred_cell_type on device_model_cell_type (device_model_id) where preferred`.execute(
    db,
  );
  await sql`
    create table asset (
      id uuid primary key,
      tag text not null unique check (tag ~ '^[A-Za-z0-9][A-Za-z0-9._/-]{0,39}$'),
      name text not null check (name <> ''),
      site_id uuid not null references site,
      device_model_id uuid not null references device_model,
      state text not null default 'in_service' check (state in ('in_service','stored','retired')),
      silence_cost_minor_per_hour integer check (silence_cost_minor_per_hour >= 0),
      firmware text not null default '',
      note text not null default '',
      last_heard_at timestamptz,
      updated_at timestamptz not null default now()
    )`.execute(db);
  await sql`comment on column asset.silence_cost_minor_per_hour is 'Overrides the device model''s figure when set.'`.execute(
    db,
  );
  await sql`create index asset_site on asset (site_id)`.execute(db);
  await sql`create index asset_model on asset (device_model_id)`.execute(db);
  await sql`
    create table draw_measurement (
      id uuid primary key,
      asset_id uuid not null references asset,
      at timestamptz not null,
      average_ua integer not null check (average_ua > 0),
      peak_ua integer check (peak_ua > 0),
      method text not null default '',
      person_id uuid references person
    )`.execute(db);
  await sql`create index draw_measurement_asset on draw_measurement (asset_id, at desc)`.execute(
    db,
  );
  await sql`
    create table device_event (
      id uuid primary key,
      asset_id uuid not null references asset,
      at timestamptz not null,
      kind text not null check (kind in ('device_replaced','firmware_changed','reported','stopped')),
      last_heard_at timestamptz,
      note text not null default '',
      person_id uuid references person
    )`.execute(db);
  await sql`create index device_event_asset on device_event (asset_id, at desc)`.execute(db);
}

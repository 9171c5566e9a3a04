import { type Kysely, sql } from "kysely";

/** Lots and where they lie, packs in service, voltages, forecasts. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table lot (
      id uuid primary key,
      code text not null unique check (code <> ''),
      cell_type_id uuid not null references cell_type,
      made_on date,
      received_on date not null,
      supplier_reference text not null default '',
      cells_received integer not null check (cells_received > 0),
      unit_cost_minor integer not null default 0 check (unit_cost_minor >= 0),
      check (made_on is null or made_on <= received_on)
    )`.execute(db);
  await sql`create index lot_cell_type on lot (cell_type_id, made_on)`.execute(db);
  await sql`
    create table stock_place (
      id uuid primary key,
      kind text not null check (kind in ('stores','van','return_box')),
      name text not null unique,
      depot_id uuid references depot,
      van_id uuid unique references van,
      check ((kind = 'van') = (van_id is not null))
    )`.execute(db);
  await sql`
    create table lot_stock (
      lot_id uuid not null references lot,
      place_id uuid not null references stock_place,
      cells integer not null check (cells >= 0),
      primary key (lot_id, place_id)
    )`.execute(db);
  await sql`
    create table stock_move (
      id uuid primary key,
      lot_id uuid not null references lot,
      from_place_id uuid references stock_place,
      to_place_id uuid references stock_place,
      cells integer not null check (cells > 0),
      at timestamptz not null,
      reason text not null check (reason in ('received','moved','installed','returned','counted','scrapped')),
      person_id uuid references person,
      note text not null default '',
      check (from_place_id is distinct from to_place_id)
    )`.execute(db);
  await sql`create index stock_move_lot on stock_move (lot_id, at desc)`.execute(db);
  await sql`create trigger stock_move_append_only before update or delete on stock_move
    for each row execute function refuse_change()`.execute(db);
  await sql`
    create table pack (
      id uuid primary key,
      asset_id uuid not null references asset,
      cell_type_id uuid not null references cell_type,
      lot_id uuid references lot,
      series smallint not null check (series between 1 and 24),
      parallel smallint not null check (parallel between 1 and 12),
      made_on date,
      installed_at timestamptz not null,
      installed_by uuid references person,
      removed_at timestamptz check (removed_at > installed_at),
      removed_by uuid references person,
      reason_out text check (reason_out in ('due','early','found_stopped','fault','device_removed','other')),
      voltage_out_mv integer check (voltage_out_mv >= 0),
      stopped_at timestamptz,
      look_out text not null default '',
      check ((removed_at is null) = (reason_out is null)),
      constraint one_pack_at_a_time exclude using gist
        (asset_id with =, tstzrange(installed_at, removed_at) with &&)
    )`.execute(db);
  await sql`create unique index one_installed_pack on pack (asset_id) where removed_at is null`.execute(
    db,
  );
  await sql`create index pack_cell_type on pack (cell_type_id)`.execute(db);
  await sql`create index pack_lot on pack (lot_id)`.execute(db);
  await sql`create index pack_removed_at on pack (removed_at) where removed_at is not null`.execute(
    db,
  );
  await sql`
    create table reading (
      id uuid primary key,
      pack_id uuid not null references pack,
      at timestamptz not null,
      millivolts integer not null check (millivolts between 0 and 60000),
      kind text not null check (kind in ('resting','loaded')),
      load_ua integer check (load_ua > 0),
      temperature_dc smallint check (temperature_dc between -600 and 1000),
      accuracy_mv smallint check (accuracy_mv > 0),
      instrument text not null default '',
      source text not null check (source in ('form','csv','api','phone')),
      person_id uuid references person,
      api_key_id uuid references api_key,
      doubt text,
      note text not null default '',
      received_at timestamptz not null
    )`.execute(db);
  await sql`comment on column reading.id is 'Made by the client; sending one twice changes nothing.'`.execute(
    db,
  );
  await sql`comment on column reading.doubt is 'Why the value is unlikely, said when it was logged; null when it is not.'`.execute(
    db,
  );
  await sql`create index reading_pack_at on reading (pack_id, at)`.execute(db);
  await sql`create index reading_at on reading (at desc)`.execute(db);
  await sql`create trigger reading_append_only before update or delete on reading
    for each row execute function refuse_change()`.execute(db);
  await sql`
    create table reading_verdict (
      id uuid primary key,
      reading_id uuid not null references reading,
      verdict text not null check (verdict in ('confirmed','set_aside','corrected')),
      corrected_mv integer check (corrected_mv between 0 and 60000),
      note text not null default '',
      person_id uuid not null references person,
      at timestamptz not null,
      check ((verdict = 'corrected') = (corrected_mv is not null))
    )`.execute(db);
  await sql`create index reading_verdict_reading on reading_verdict (reading_id, at desc)`.execute(
    db,
  );
  await sql`create trigger reading_verdict_append_only before update or delete on reading_verdict
    for each row execute function refuse_change()`.execute(db);
  await sql`
    create table forecast (
      pack_id uuid primary key references pack on delete cascade,
      computed_at timestamptz not null,
      stale_since timestamptz,
      p05 timestamptz not null,
      p20 timestamptz not null,
      p50 timestamptz not null,
      p80 timestamptz not null,
      p95 timestamptz not null,
      cdf_days real[] not null check (cardinality(cdf_days) = 50),
      share_left_permille smallint not null check (share_left_permille between 0 and 1000),
      share_left_low_permille smallint not null check (share_left_low_permille between 0 and 1000),
      share_left_high_permille smallint not null check (share_left_high_permille between 0 and 1000),
      draw_ua real not null,
      out_now_permille smallint not null check (out_now_permille between 0 and 1000),
      waiting_cost_minor_per_week integer not null default 0,
      basis jsonb not null,
      weights jsonb not null default '[]',
      check (p05 <= p20 and p20 <= p50 and p50 <= p80 and p80 <= p95)
    )`.execute(db);
  await sql`create index forecast_p50 on forecast (p50)`.execute(db);
  await sql`create index forecast_waiting on forecast (waiting_cost_minor_per_week desc)`.execute(
    db,
  );
  await sql`create index forecast_stale on forecast (stale_since) where stale_since is not null`.execute(
    db,
  );
  await sql`
    create table forecast_outcome (
      pack_id uuid primary key references pack on delete cascade,
      recorded_at timestamptz not null,
      forecast_at timestamptz not null,
      p05 timestamptz not null,
      p20 timestamptz not null,
      p50 timestamptz not null,
      p80 timestamptz not null,
      p95 timestamptz not null,
      share_left_permille smallint not null,
      censored boolean not null,
      ended_at timestamptz not null
    )`.execute(db);
  await sql`comment on table forecast_outcome is
    'The forecast that stood when a pack came out, beside what happened; censored when it came out alive.'`.execute(
    db,
  );
}

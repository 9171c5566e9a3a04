import { type Kysely, sql } from "kysely";

/** The organisation's own roads, and the legs that a travel service has answered. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`create table road (
    id text primary key check (id <> ''),
    line jsonb not null check (jsonb_array_length(line) >= 2),
    speed_kmh integer not null check (speed_kmh between 1 and 130)
  )`.execute(db);
  await sql`comment on table road is
    'Edges of the organisation''s own road graph; line is [[longitude, latitude], …] from end to end, roads meet where ends are equal.'`.execute(
    db,
  );
  await sql`alter table organisation add column roads_set_at timestamptz`.execute(db);
  await sql`comment on column organisation.roads_set_at is
    'When the own roads were last replaced; null: there are none.'`.execute(db);
  await sql`create table travel_leg (
    source_url text not null,
    from_point text not null,
    to_point text not null,
    seconds integer not null check (seconds >= 0),
    metres integer not null check (metres >= 0),
    fetched_at timestamptz not null,
    primary key (source_url, from_point, to_point)
  )`.execute(db);
}

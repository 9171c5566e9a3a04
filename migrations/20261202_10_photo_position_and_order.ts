import { type Kysely, sql } from "kysely";

/** Where a photo was taken, when the organisation wants it; an order the office has replaced. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`alter table organisation
    add column keep_photo_position boolean not null default false`.execute(db);
  await sql`comment on column organisation.keep_photo_position is
    'Whether photos from phones keep where they were taken; off, neither phone nor server keeps it.'`.execute(
    db,
  );
  await sql`alter table photo
    add column latitude double precision check (latitude between -90 and 90),
    add column longitude double precision check (longitude between -180 and 180),
    add constraint photo_position_whole check ((latitude is null) = (longitude is null))`.execute(
    db,
  );
  await sql`comment on column photo.latitude is
    'WGS 84, as the camera wrote it; null: not known or not to be kept.'`.execute(db);
  await sql`alter table round
    add column order_received_at timestamptz,
    add column order_replaced_at timestamptz`.execute(db);
  await sql`comment on column round.order_received_at is
    'When the technician''s own order reached us, which may be long after it was given.'`.execute(
    db,
  );
  await sql`comment on column round.order_replaced_at is
    'When the office put the stops in another order than the technician had given them.'`.execute(
    db,
  );
}

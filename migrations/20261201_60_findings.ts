import { type Kysely, sql } from "kysely";

/** What the nightly look at the fleet found: lots that die early, models whose draw shifted. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table finding (
      id uuid primary key,
      kind text not null check (kind in ('bad-lot','draw-shift')),
      lot_id uuid unique references lot on delete cascade,
      device_model_id uuid unique references device_model on delete cascade,
      since date,
      factor real not null check (factor > 0),
      chance real not null check (chance between 0 and 1),
      packs_behind integer not null check (packs_behind > 0),
      found_at timestamptz not null,
      seen_at timestamptz not null,
      dismissed_at timestamptz,
      dismissed_by uuid references person,
      dismissed_because text,
      check ((kind = 'bad-lot') = (lot_id is not null)),
      check ((kind = 'draw-shift') = (device_model_id is not null)),
      check ((kind = 'draw-shift') = (since is not null)),
      check ((dismissed_at is null) = (dismissed_because is null))
    )`.execute(db);
  await sql`comment on column finding.factor is
    'Life of the lot''s packs against the others'', or draw after against before.'`.execute(db);
  await sql`comment on column finding.packs_behind is 'Packs whose evidence it rests on.'`.execute(
    db,
  );
}

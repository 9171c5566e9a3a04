import { type Kysely, sql } from "kysely";

/**
 * A search can be told to stop: the best plan found until then becomes the draft. A found shift of
 * the draw says how well its factor is known, since forecasts rest on it.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`alter table plan add column stop_asked_at timestamptz`.execute(db);
  await sql`comment on column plan.stop_asked_at is
    'Somebody asked the search under way to stop and keep the best so far; null: nobody did.'`.execute(
    db,
  );
  await sql`alter table finding add column relative_sd real check (relative_sd > 0)`.execute(db);
  await sql`comment on column finding.relative_sd is
    'Draw shifts: one standard deviation of the factor, as a share; null: from before it was kept.'`.execute(
    db,
  );
}

import { type Kysely, sql } from "kysely";

/** A search can be told to stop: the best plan found until then becomes the draft. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`alter table plan add column stop_asked_at timestamptz`.execute(db);
  await sql`comment on column plan.stop_asked_at is
    'Somebody asked the search under way to stop and keep the best so far; null: nobody did.'`.execute(
    db,
  );
}

import { type Kysely, sql } from "kysely";

/** What the data sheet alone promised of each finished pack: the fleet learns from the ratio. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`alter table forecast_outcome add column promised_days real check (promised_days > 0)`.execute(
    db,
  );
  await sql`comment on column forecast_outcome.promised_days is
    'Median life forecast at installation without any reading or fleet knowledge; null: not worked out yet.'`.execute(
    db,
  );
}

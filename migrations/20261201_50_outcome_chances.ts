import { type Kysely, sql } from "kysely";

/** What a forecast said of the day its pack came out, so that windows can be judged. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    alter table forecast_outcome
      add column chance_stopped_permille smallint not null default 0
        check (chance_stopped_permille between 0 and 1000),
      add column in_hindsight boolean not null default false`.execute(db);
  await sql`comment on column forecast_outcome.chance_stopped_permille is
    'Chance, by that forecast, of stopping by ended_at: uniform from 0 to 1000 over many packs if the forecasts are sound, censored ones counted as such.'`.execute(
    db,
  );
  await sql`comment on column forecast_outcome.in_hindsight is
    'Worked out afterwards from nothing but what was known before the visit (imported history).'`.execute(
    db,
  );
  await sql`create index forecast_outcome_ended on forecast_outcome (ended_at)`.execute(db);
}

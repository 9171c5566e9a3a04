import { type Kysely, sql } from "kysely";

/**
 * What was said of every pack in service on the first day of each quarter. Removals alone cannot
 * judge forecasts: a pack that stops always comes out, one that goes on does not.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table forecast_claim (
      pack_id uuid not null references pack on delete cascade,
      quarter date not null check (extract(day from quarter) = 1
        and extract(month from quarter) in (1, 4, 7, 10)),
      made_at timestamptz not null,
      kept_at timestamptz not null,
      cdf_days real[] not null check (cardinality(cdf_days) = 50),
      primary key (pack_id, quarter)
    )`.execute(db);
  await sql`create index forecast_claim_quarter on forecast_claim (quarter)`.execute(db);
  await sql`comment on table forecast_claim is
    'Forecasts as they stood at the start of a quarter, of packs whose devices ran then: nothing later was known to them.'`.execute(
    db,
  );
  await sql`comment on column forecast_claim.made_at is 'Start of the quarter in the organisation''s time zone.'`.execute(
    db,
  );
  await sql`comment on column forecast_claim.kept_at is
    'When it was worked out; long after made_at: from imported history.'`.execute(db);
  await sql`comment on column forecast_outcome.chance_stopped_permille is
    'Chance, by that forecast, of stopping by ended_at. Not uniform over removals even where forecasts are sound: whether a pack is among them depends on how it ended.'`.execute(
    db,
  );
}

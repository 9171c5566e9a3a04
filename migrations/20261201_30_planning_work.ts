import { type Kysely, sql } from "kysely";

/** What a plan covers, how its build goes, its undo steps, and who has been told of a visit. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    alter table plan
      add column crew_ids uuid[] not null default '{}',
      add column progress jsonb`.execute(db);
  await sql`comment on column plan.crew_ids is 'The crews whose technicians the plan sends out; empty: all crews.'`.execute(
    db,
  );
  await sql`comment on column plan.progress is 'How the build goes, while the state is building or draft.'`.execute(
    db,
  );
  await sql`alter table round add column overtime_s integer not null default 0 check (overtime_s >= 0)`.execute(
    db,
  );
  await sql`alter table stop add column contact_told_at timestamptz`.execute(db);
  await sql`
    create table plan_step (
      plan_id uuid not null references plan on delete cascade,
      version integer not null,
      act text not null,
      words text not null,
      content jsonb not null,
      taken_at timestamptz not null,
      taken_by uuid references person,
      primary key (plan_id, version)
    )`.execute(db);
  await sql`comment on table plan_step is
    'The draft as it was before an edit (version: the one the edit saw), so that the edit can be undone.'`.execute(
    db,
  );
}

import { type Kysely, sql } from "kysely";

/** The break of a shift: work and driving stand still, wherever the technician is. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`alter table shift
    add column break_starts time,
    add column break_ends time,
    add constraint shift_break_within check (
      (break_starts is null) = (break_ends is null)
      and (break_starts is null or (starts <= break_starts and break_starts < break_ends and break_ends <= ends))
    )`.execute(db);
}

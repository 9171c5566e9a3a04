import { type Kysely, sql } from "kysely";

/** Cells that came out of devices, until recycling takes them; whose order a round has. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table returned_cells (
      pack_id uuid primary key references pack on delete cascade,
      cell_type_id uuid not null references cell_type,
      lot_id uuid references lot,
      cells smallint not null check (cells > 0),
      look text not null default 'sound'
        check (look in ('sound','leaking','swollen','corroded','damaged')),
      at timestamptz not null,
      person_id uuid references person,
      collected_at timestamptz,
      collected_by uuid references person,
      check (collected_at is not null or collected_by is null)
    )`.execute(db);
  await sql`comment on table returned_cells is
    'The return box: cells of a pack that was taken out, until they go to recycling.'`.execute(db);
  await sql`create index returned_cells_waiting on returned_cells (cell_type_id)
    where collected_at is null`.execute(db);
  await sql`alter table round add column reordered_at timestamptz`.execute(db);
  await sql`comment on column round.reordered_at is
    'When the technician put the stops in an order of their own; null: the planned one holds.'`.execute(
    db,
  );
}

import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "../client";

export interface RoadRecord {
  readonly id: string;
  /** [longitude, latitude] from end to end. */
  readonly line: readonly (readonly [number, number])[];
  readonly speedKmh: number;
}

/** The organisation's own roads, in a steady order. */
export async function listRoads(db: Kysely<Database>): Promise<RoadRecord[]> {
  const rows = await db.selectFrom("road").selectAll().orderBy("id").execute();
  return rows.map((row) => ({ ...row, line: row.line as unknown as RoadRecord["line"] }));
}

/** Puts these roads in place of all others. */
export async function replaceRoads(
  trx: Transaction<Database>,
  roads: readonly RoadRecord[],
  at: Date,
): Promise<void> {
  await trx.deleteFrom("road").execute();
  const rows = JSON.stringify(roads.map(({ id, line, speedKmh }) => ({ id, line, speedKmh })));
  await sql`insert into road (id, line, speed_kmh)
    select r.id, r.line, r."speedKmh"
    from jsonb_to_recordset(${rows}::jsonb) as r(id text, line jsonb, "speedKmh" integer)`.execute(
    trx,
  );
  await trx
    .updateTable("organisation")
    .set({ roadsSetAt: roads.length > 0 ? at : null })
    .execute();
}

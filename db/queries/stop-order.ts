import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "../client";

export interface StopPlace {
  readonly id: string;
  readonly position: number;
  readonly arrivesAt: string;
  readonly departsAt: string;
  /** Where its site is, WGS 84 degrees. */
  readonly latitude: number;
  readonly longitude: number;
}

/** A round's stops as they stand, in order, locked. */
export async function lockStopOrder(
  trx: Transaction<Database>,
  roundId: string,
): Promise<StopPlace[]> {
  const rows = await trx
    .selectFrom("stop")
    .innerJoin("site", "site.id", "stop.siteId")
    .select(["stop.id", "stop.position", "stop.arrivesAt", "stop.departsAt"])
    .select(["site.latitude", "site.longitude"])
    .where("stop.roundId", "=", roundId)
    .orderBy("stop.position")
    .forUpdate("stop")
    .execute();
  return rows.map((row) => ({
    ...row,
    arrivesAt: row.arrivesAt.toISOString(),
    departsAt: row.departsAt.toISOString(),
  }));
}

/** Writes the technician's order; positions may meet on the way, since they are checked at the end. */
export async function saveStopOrder(
  trx: Transaction<Database>,
  roundId: string,
  stops: readonly StopPlace[],
  at: Date,
): Promise<void> {
  for (const { id, position, arrivesAt, departsAt } of stops) {
    await trx
      .updateTable("stop")
      .set({ position, arrivesAt: new Date(arrivesAt), departsAt: new Date(departsAt) })
      .where("id", "=", id)
      .execute();
  }
  const newest = sql<Date>`greatest(reordered_at, ${at}::timestamptz)`;
  await trx.updateTable("round").set({ reorderedAt: newest }).where("id", "=", roundId).execute();
}

/** Which of these rounds stand in their technician's own order. */
export async function listReordered(
  db: Kysely<Database>,
  roundIds: readonly string[],
): Promise<string[]> {
  if (roundIds.length === 0) return [];
  const rows = await db
    .selectFrom("round")
    .select("id")
    .where("id", "in", roundIds)
    .where("reorderedAt", "is not", null)
    .execute();
  return rows.map((row) => row.id);
}

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
  at: { readonly given: Date; readonly received: Date },
): Promise<void> {
  for (const { id, position, arrivesAt, departsAt } of stops) {
    await trx
      .updateTable("stop")
      .set({ position, arrivesAt: new Date(arrivesAt), departsAt: new Date(departsAt) })
      .where("id", "=", id)
      .execute();
  }
  const newest = sql<Date>`greatest(reordered_at, ${at.given}::timestamptz)`;
  await trx
    .updateTable("round")
    .set({ reorderedAt: newest, orderReceivedAt: at.received, orderReplacedAt: null })
    .where("id", "=", roundId)
    .execute();
}

/** Holds the stops of all binding rounds of these days until the transaction ends. */
export async function lockStopsOfDays(
  trx: Transaction<Database>,
  firstDay: string,
  lastDay: string,
): Promise<void> {
  await trx
    .selectFrom("stop")
    .innerJoin("round", "round.id", "stop.roundId")
    .select("stop.id")
    .where("round.state", "=", "published")
    .where("round.day", ">=", firstDay)
    .where("round.day", "<=", lastDay)
    .orderBy("stop.roundId")
    .orderBy("stop.position")
    .forUpdate("stop")
    .execute();
}

/** When the technician's own order of each of these rounds reached us; others are left out. */
export async function loadOwnOrders(
  db: Kysely<Database>,
  roundIds: readonly string[],
): Promise<Map<string, Date>> {
  if (roundIds.length === 0) return new Map();
  const rows = await db
    .selectFrom("round")
    .select((eb) => ["id", eb.fn.coalesce("orderReceivedAt", "reorderedAt").as("at")])
    .where("id", "in", roundIds)
    .where("reorderedAt", "is not", null)
    .execute();
  return new Map(rows.flatMap(({ id, at }) => (at ? [[id, at]] : [])));
}

/** Notes that the office's order holds now, and no longer the technician's own. */
export async function noteOrderReplaced(
  trx: Transaction<Database>,
  roundId: string,
  at: Date,
): Promise<void> {
  const order = { reorderedAt: null, orderReplacedAt: at };
  await trx.updateTable("round").set(order).where("id", "=", roundId).execute();
}

/** Which of these rounds stand in their technician's own order. */
export async function listReordered(
  db: Kysely<Database>,
  roundIds: readonly string[],
): Promise<string[]> {
  return [...(await loadOwnOrders(db, roundIds)).keys()];
}

import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "../client";

const BINDING = ["published", "started", "done"] as const;

/** A stop of a published round, locked, with whose round it is. */
export async function lockStop(trx: Transaction<Database>, stopId: string) {
  return trx
    .selectFrom("stop")
    .innerJoin("round", "round.id", "stop.roundId")
    .select([
      "stop.id",
      "stop.state",
      "round.id as roundId",
      "round.technicianId",
      "round.state as roundState",
    ])
    .where("stop.id", "=", stopId)
    .where("round.state", "in", BINDING)
    .forUpdate(["stop"])
    .executeTakeFirst();
}

export async function lockRound(trx: Transaction<Database>, roundId: string) {
  return trx
    .selectFrom("round")
    .select(["id", "technicianId", "state"])
    .where("id", "=", roundId)
    .where("state", "in", BINDING)
    .forUpdate()
    .executeTakeFirst();
}

/** A stop that could not be done keeps its reason; its open tasks count as not done. */
export async function markStopCannot(
  trx: Transaction<Database>,
  stopId: string,
  given: { reason: string; note: string; returnOn: string | null },
): Promise<void> {
  await trx
    .updateTable("stop")
    .set({
      state: "cannot_do",
      cannotReason: given.reason,
      cannotNote: given.note,
      returnOn: given.returnOn,
    })
    .where("id", "=", stopId)
    .execute();
  await trx
    .updateTable("task")
    .set({ state: "not_done" })
    .where("stopId", "=", stopId)
    .where("state", "=", "planned")
    .execute();
}

export async function markStopDone(
  trx: Transaction<Database>,
  stopId: string,
  at: Date,
): Promise<void> {
  await trx
    .updateTable("stop")
    .set({ state: "done", doneAt: at, cannotReason: null })
    .where("id", "=", stopId)
    .execute();
}

/** A first act starts the round; the end is the technician's word. */
export async function markRound(
  trx: Transaction<Database>,
  roundId: string,
  act: "started" | "done",
  at: Date,
): Promise<void> {
  await trx
    .updateTable("round")
    .set((eb) => ({
      state: act,
      startedAt: eb.fn.coalesce("startedAt", sql<Date>`${at}::timestamptz`),
      ...(act === "done" ? { doneAt: at } : {}),
    }))
    .where("id", "=", roundId)
    .where("state", "in", act === "started" ? ["published"] : ["published", "started"])
    .execute();
}

/**
 * Ticks off this technician's planned task at an asset on a day, and the stop when that was
 * its last. Work that was not planned ticks off nothing.
 */
export async function tickTask(
  trx: Transaction<Database>,
  given: { technicianId: string; assetId: string; day: string; kinds: readonly string[]; at: Date },
): Promise<void> {
  const task = await trx
    .selectFrom("task")
    .innerJoin("stop", "stop.id", "task.stopId")
    .innerJoin("round", "round.id", "stop.roundId")
    .select(["task.id", "task.stopId", "round.id as roundId"])
    .where("round.technicianId", "=", given.technicianId)
    .where("round.day", "=", given.day)
    .where("round.state", "in", BINDING)
    .where("task.assetId", "=", given.assetId)
    .where("task.kind", "in", given.kinds)
    .where("task.state", "!=", "done")
    .executeTakeFirst();
  if (!task) return;
  await trx
    .updateTable("task")
    .set({ state: "done", doneAt: given.at })
    .where("id", "=", task.id)
    .execute();
  await markRound(trx, task.roundId, "started", given.at);
  const open = await trx
    .selectFrom("task")
    .select("id")
    .where("stopId", "=", task.stopId)
    .where("state", "=", "planned")
    .executeTakeFirst();
  if (!open) await markStopDone(trx, task.stopId, given.at);
}

/** The crew's van as a stock place, for a technician's phone. */
export async function vanPlaceOf(db: Kysely<Database>, technicianId: string) {
  return db
    .selectFrom("technician")
    .innerJoin("stockPlace", "stockPlace.vanId", "technician.vanId")
    .select("stockPlace.id")
    .where("technician.id", "=", technicianId)
    .executeTakeFirst();
}

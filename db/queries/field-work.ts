import { sql, type Transaction } from "kysely";
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

/** Its open tasks count as not done; a reason it had for not being done no longer holds. */
export async function markStopDone(
  trx: Transaction<Database>,
  stopId: string,
  at: Date,
): Promise<void> {
  await trx
    .updateTable("stop")
    .set({ state: "done", doneAt: at, cannotReason: null, cannotNote: "", returnOn: null })
    .where("id", "=", stopId)
    .where("state", "!=", "done")
    .execute();
  await trx
    .updateTable("task")
    .set({ state: "not_done" })
    .where("stopId", "=", stopId)
    .where("state", "=", "planned")
    .execute();
}

/** The day from which a stop that could not be done is to be planned again. */
export async function setReturnDay(
  trx: Transaction<Database>,
  stopId: string,
  returnOn: string | null,
): Promise<void> {
  await trx
    .updateTable("stop")
    .set({ returnOn })
    .where("id", "=", stopId)
    .where("state", "=", "cannot_do")
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

export interface Tick {
  readonly technicianId: string;
  readonly assetId: string;
  /** The stop it was done at; null: whichever of that day's holds the asset. */
  readonly stopId: string | null;
  readonly day: string;
  readonly kinds: readonly string[];
  readonly at: Date;
}

/**
 * Ticks off this technician's open task at an asset, and the stop when that was its last. Work
 * that was not planned, or is somebody else's now, ticks off nothing. The stop is locked first:
 * of two tasks ticked at once, the later sees the earlier.
 */
export async function tickTask(trx: Transaction<Database>, tick: Tick): Promise<void> {
  const { stopId } = tick;
  const task = await trx
    .selectFrom("task")
    .innerJoin("stop", "stop.id", "task.stopId")
    .innerJoin("round", "round.id", "stop.roundId")
    .select(["task.id", "task.stopId", "round.id as roundId"])
    .where("round.technicianId", "=", tick.technicianId)
    .where("round.state", "in", BINDING)
    .where("task.assetId", "=", tick.assetId)
    .where("task.kind", "in", tick.kinds)
    .where("task.state", "!=", "done")
    .$if(stopId !== null, (query) => query.where("stop.id", "=", stopId ?? ""))
    .$if(stopId === null, (query) => query.where("round.day", "=", tick.day))
    .forUpdate(["stop"])
    .executeTakeFirst();
  if (!task) return;
  await trx
    .updateTable("task")
    .set({ state: "done", doneAt: tick.at })
    .where("id", "=", task.id)
    .execute();
  const open = await trx
    .selectFrom("task")
    .select("id")
    .where("stopId", "=", task.stopId)
    .where("state", "=", "planned")
    .executeTakeFirst();
  if (!open) await markStopDone(trx, task.stopId, tick.at);
  await markRound(trx, task.roundId, "started", tick.at);
}

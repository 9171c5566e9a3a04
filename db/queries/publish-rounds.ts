import type { Transaction } from "kysely";
import type { Database } from "../client";
import type { StoredRound, StoredTask } from "./plan-rounds";

/** Makes a draft's round binding. */
export async function bindRound(
  trx: Transaction<Database>,
  roundId: string,
  at: Date,
): Promise<void> {
  await trx
    .updateTable("round")
    .set({ state: "published", publishedAt: at })
    .where("id", "=", roundId)
    .execute();
}

/** Takes a binding round back; its calendar entry is cancelled by the raised sequence. */
export async function cancelRound(trx: Transaction<Database>, roundId: string): Promise<number> {
  const row = await trx
    .updateTable("round")
    .set((eb) => ({ state: "cancelled", icalSequence: eb("icalSequence", "+", 1) }))
    .where("id", "=", roundId)
    .returning("icalSequence")
    .executeTakeFirstOrThrow();
  return row.icalSequence;
}

/** Lets a binding round belong to another plan, otherwise untouched, and drops the draft's copy. */
export async function adoptRound(
  trx: Transaction<Database>,
  before: StoredRound,
  draft: StoredRound,
): Promise<void> {
  await trx.deleteFrom("round").where("id", "=", draft.id).execute();
  await trx
    .updateTable("round")
    .set({ planId: draft.planId })
    .where("id", "=", before.id)
    .execute();
}

/**
 * Carries a draft's changes into the binding round. The round and the stops that stay keep their
 * ids, because phones may hold them; the calendar's sequence grows.
 * @returns the new sequence
 */
export async function changeBindingRound(
  trx: Transaction<Database>,
  before: StoredRound,
  draft: StoredRound,
  at: Date,
): Promise<number> {
  const old = new Map(before.stops.map((stop) => [stop.siteId, stop]));
  const stays = new Set(draft.stops.map((stop) => stop.siteId));
  const gone = before.stops.filter((stop) => !stays.has(stop.siteId)).map((stop) => stop.id);
  if (gone.length > 0) await trx.deleteFrom("stop").where("id", "in", gone).execute();
  for (const stop of draft.stops) {
    const was = old.get(stop.siteId);
    if (!was) {
      const { position, arrivesAt, departsAt } = stop;
      const moved = { roundId: before.id, position, arrivesAt, departsAt };
      await trx.updateTable("stop").set(moved).where("id", "=", stop.id).execute();
      continue;
    }
    const { position, arrivesAt, departsAt, locked } = stop;
    await trx
      .updateTable("stop")
      .set({ position, arrivesAt, departsAt, locked })
      .where("id", "=", was.id)
      .execute();
    await changeTasks(trx, was.id, was.tasks, stop.tasks);
  }
  await trx.deleteFrom("round").where("id", "=", draft.id).execute();
  const { planId, startsAt, endsAt, driveS, workS, distanceM, overtimeS } = draft;
  const row = await trx
    .updateTable("round")
    .set((eb) => ({
      ...{ planId, startsAt, endsAt, driveS, workS, distanceM, overtimeS },
      publishedAt: at,
      icalSequence: eb("icalSequence", "+", 1),
    }))
    .where("id", "=", before.id)
    .returning("icalSequence")
    .executeTakeFirstOrThrow();
  return row.icalSequence;
}

async function changeTasks(
  trx: Transaction<Database>,
  stopId: string,
  was: readonly StoredTask[],
  is: readonly StoredTask[],
): Promise<void> {
  const same = (a: StoredTask, b: StoredTask) =>
    a.assetId === b.assetId && a.kind === b.kind && a.cellTypeId === b.cellTypeId;
  const gone = was.filter((task) => !is.some((other) => same(task, other)));
  const fresh = is.filter((task) => !was.some((other) => same(task, other)));
  if (gone.length > 0) {
    const ids = gone.map((task) => task.id);
    await trx.deleteFrom("task").where("id", "in", ids).execute();
  }
  if (fresh.length > 0) {
    const ids = fresh.map((task) => task.id);
    await trx.updateTable("task").set({ stopId }).where("id", "in", ids).execute();
  }
}

/** Tags of assets whose pack is no longer the one that these tasks were planned for. */
export async function swappedMeanwhile(
  trx: Transaction<Database>,
  packIds: readonly string[],
): Promise<string[]> {
  if (packIds.length === 0) return [];
  const rows = await trx
    .selectFrom("pack")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .select("asset.tag")
    .where("pack.id", "in", packIds)
    .where("pack.removedAt", "is not", null)
    .orderBy("asset.tag")
    .execute();
  return rows.map((row) => row.tag);
}

import type { Kysely, Transaction } from "kysely";
import type { Database } from "../client";

export interface StoredTask {
  readonly id: string;
  readonly kind: "swap" | "read" | "inspect";
  readonly assetId: string;
  readonly packId: string | null;
  readonly cellTypeId: string | null;
  readonly cells: number;
}

export interface StoredStop {
  readonly id: string;
  readonly siteId: string;
  readonly position: number;
  readonly arrivesAt: Date;
  readonly departsAt: Date;
  readonly locked: boolean;
  readonly tasks: readonly StoredTask[];
}

export interface StoredRound {
  readonly id: string;
  readonly planId: string;
  readonly technicianId: string;
  readonly day: string;
  readonly state: "proposed" | "published" | "started" | "done" | "cancelled";
  readonly startsAt: Date;
  readonly endsAt: Date;
  readonly driveS: number;
  readonly workS: number;
  readonly distanceM: number;
  readonly overtimeS: number;
  readonly icalUid: string;
  readonly icalSequence: number;
  readonly stops: readonly StoredStop[];
}

async function withStops(
  db: Kysely<Database>,
  rounds: readonly Omit<StoredRound, "stops">[],
): Promise<StoredRound[]> {
  if (rounds.length === 0) return [];
  const ids = rounds.map((round) => round.id);
  const stops = await db
    .selectFrom("stop")
    .select(["id", "roundId", "siteId", "position", "arrivesAt", "departsAt", "locked"])
    .where("roundId", "in", ids)
    .orderBy("position")
    .execute();
  const tasks = await db
    .selectFrom("task")
    .innerJoin("stop", "stop.id", "task.stopId")
    .select(["task.id", "task.stopId", "task.kind", "task.assetId", "task.packId"])
    .select(["task.cellTypeId", "task.cells"])
    .where("stop.roundId", "in", ids)
    .orderBy("task.kind", "desc")
    .orderBy("task.id")
    .execute();
  const tasksOf = grouped(tasks, (task) => task.stopId);
  const stopsOf = grouped(stops, (stop) => stop.roundId);
  return rounds.map((round) => ({
    ...round,
    stops: (stopsOf.get(round.id) ?? []).map(({ roundId: _, ...stop }) => ({
      ...stop,
      tasks: (tasksOf.get(stop.id) ?? []).map(({ stopId: __, ...task }) => ({
        ...task,
        kind: task.kind as StoredTask["kind"],
      })),
    })),
  }));
}

function grouped<Row>(rows: readonly Row[], key: (row: Row) => string): Map<string, Row[]> {
  const groups = new Map<string, Row[]>();
  for (const row of rows) {
    const group = groups.get(key(row));
    if (group) group.push(row);
    else groups.set(key(row), [row]);
  }
  return groups;
}

const COLUMNS = [
  "id",
  "planId",
  "technicianId",
  "day",
  "state",
  "startsAt",
  "endsAt",
  "driveS",
  "workS",
  "distanceM",
  "overtimeS",
  "icalUid",
  "icalSequence",
] as const;

/** The rounds of a plan with stops and tasks, by day and technician. */
export async function loadPlanRounds(db: Kysely<Database>, planId: string): Promise<StoredRound[]> {
  const rounds = await db
    .selectFrom("round")
    .select(COLUMNS)
    .where("planId", "=", planId)
    .where("state", "!=", "cancelled")
    .orderBy("day")
    .orderBy("technicianId")
    .execute();
  return withStops(db, rounds as Omit<StoredRound, "stops">[]);
}

/** One round, whatever its state, or null. */
export async function findRound(db: Kysely<Database>, id: string): Promise<StoredRound | null> {
  const rounds = await db.selectFrom("round").select(COLUMNS).where("id", "=", id).execute();
  return (await withStops(db, rounds as Omit<StoredRound, "stops">[]))[0] ?? null;
}

/** Rounds that bind these technicians (all when null) on these days. */
export async function loadBindingRounds(
  db: Kysely<Database>,
  technicianIds: readonly string[] | null,
  firstDay: string,
  lastDay: string,
): Promise<StoredRound[]> {
  if (technicianIds?.length === 0) return [];
  const rounds = await db
    .selectFrom("round")
    .select(COLUMNS)
    .where("state", "in", ["published", "started", "done"])
    .where("day", ">=", firstDay)
    .where("day", "<=", lastDay)
    .$if(technicianIds !== null, (q) => q.where("technicianId", "in", technicianIds ?? []))
    .orderBy("day")
    .orderBy("technicianId")
    .execute();
  return withStops(db, rounds as Omit<StoredRound, "stops">[]);
}

/** Assets with a planned swap in a round that binds, from a day on, with that round. */
export async function bookedSwaps(db: Kysely<Database>, fromDay: string) {
  return db
    .selectFrom("task")
    .innerJoin("stop", "stop.id", "task.stopId")
    .innerJoin("round", "round.id", "stop.roundId")
    .select(["task.assetId", "task.cellTypeId", "task.cells", "round.id as roundId"])
    .select(["round.day", "round.technicianId", "round.state"])
    .where("task.kind", "=", "swap")
    .where("task.state", "=", "planned")
    .where("stop.state", "=", "planned")
    .where("round.state", "in", ["published", "started"])
    .where("round.day", ">=", fromDay)
    .execute();
}

/** Writes the rounds of a draft anew: what the plan held before is gone. */
export async function replaceRounds(
  trx: Transaction<Database>,
  planId: string,
  rounds: readonly StoredRound[],
): Promise<void> {
  await trx
    .deleteFrom("round")
    .where("planId", "=", planId)
    .where("state", "=", "proposed")
    .execute();
  if (rounds.length === 0) return;
  await trx
    .insertInto("round")
    .values(rounds.map(({ stops: _, ...round }) => ({ ...round, planId })))
    .execute();
  const stops = rounds.flatMap((round) =>
    round.stops.map(({ tasks: _, ...stop }) => ({ ...stop, roundId: round.id })),
  );
  if (stops.length > 0) await trx.insertInto("stop").values(stops).execute();
  const tasks = rounds.flatMap((round) =>
    round.stops.flatMap((stop) => stop.tasks.map((task) => ({ ...task, stopId: stop.id }))),
  );
  if (tasks.length > 0) await trx.insertInto("task").values(tasks).execute();
}

/** @returns false when the plan has no stop at this site */
export async function setStopLock(
  trx: Transaction<Database>,
  planId: string,
  siteId: string,
  locked: boolean,
): Promise<boolean> {
  const result = await trx
    .updateTable("stop")
    .set({ locked })
    .where("siteId", "=", siteId)
    .where("roundId", "in", (q) => q.selectFrom("round").select("id").where("planId", "=", planId))
    .executeTakeFirst();
  return result.numUpdatedRows > 0n;
}

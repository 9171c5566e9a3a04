import type { Kysely, Transaction } from "kysely";
import type { Database } from "../client";

export type PlanState = "building" | "draft" | "published" | "discarded" | "failed";

export interface PlanRow {
  readonly id: string;
  readonly name: string;
  readonly firstDay: string;
  readonly lastDay: string;
  readonly state: PlanState;
  readonly version: number;
  readonly crewIds: readonly string[];
  readonly cost: unknown;
  readonly progress: unknown;
  readonly problem: string | null;
  /** When somebody asked the search under way to stop and keep the best. */
  readonly stopAskedAt: Date | null;
  readonly createdBy: string | null;
  readonly createdAt: Date;
  readonly publishedAt: Date | null;
}

const COLUMNS = [
  "id",
  "name",
  "firstDay",
  "lastDay",
  "state",
  "version",
  "crewIds",
  "cost",
  "progress",
  "problem",
  "stopAskedAt",
  "createdBy",
  "createdAt",
  "publishedAt",
] as const;

export async function findPlan(db: Kysely<Database>, id: string): Promise<PlanRow | null> {
  const row = await db.selectFrom("plan").select(COLUMNS).where("id", "=", id).executeTakeFirst();
  return (row as PlanRow | undefined) ?? null;
}

/** The plan, held until the transaction ends: edits of one plan happen one after another. */
export async function lockPlan(trx: Transaction<Database>, id: string): Promise<PlanRow | null> {
  const row = await trx
    .selectFrom("plan")
    .select(COLUMNS)
    .where("id", "=", id)
    .forUpdate()
    .executeTakeFirst();
  return (row as PlanRow | undefined) ?? null;
}

/** Plans that touch the days, newest first; discarded and failed ones left out. */
export async function plansWithin(
  db: Kysely<Database>,
  firstDay: string,
  lastDay: string,
): Promise<PlanRow[]> {
  const rows = await db
    .selectFrom("plan")
    .select(COLUMNS)
    .where("firstDay", "<=", lastDay)
    .where("lastDay", ">=", firstDay)
    .where("state", "in", ["building", "draft", "published"])
    .orderBy("createdAt", "desc")
    .execute();
  return rows as PlanRow[];
}

export interface NewPlan {
  readonly id: string;
  readonly name: string;
  readonly firstDay: string;
  readonly lastDay: string;
  readonly crewIds: readonly string[];
  readonly state: PlanState;
  readonly createdBy: string | null;
  readonly createdAt: Date;
}

export async function insertPlan(trx: Transaction<Database>, plan: NewPlan): Promise<void> {
  await trx
    .insertInto("plan")
    .values({ ...plan, crewIds: [...plan.crewIds] })
    .execute();
}

export interface PlanChange {
  readonly state?: PlanState;
  readonly cost?: unknown;
  readonly progress?: unknown;
  readonly problem?: string | null;
  readonly stopAskedAt?: Date | null;
  readonly publishedAt?: Date;
  readonly publishedBy?: string | null;
  readonly crewIds?: readonly string[];
}

/** Changes a plan and counts the version on. @returns the new version */
export async function changePlan(
  trx: Transaction<Database>,
  id: string,
  { cost, progress, crewIds, ...rest }: PlanChange,
): Promise<number> {
  const row = await trx
    .updateTable("plan")
    .set((eb) => ({
      ...rest,
      version: eb("version", "+", 1),
      ...(cost !== undefined && { cost: JSON.stringify(cost) }),
      ...(progress !== undefined && { progress: JSON.stringify(progress) }),
      ...(crewIds !== undefined && { crewIds: [...crewIds] }),
    }))
    .where("id", "=", id)
    .returning("version")
    .executeTakeFirstOrThrow();
  return row.version;
}

/** Notes how a build goes; no edit, so the version stays. */
export async function noteProgress(
  db: Kysely<Database>,
  id: string,
  progress: unknown,
): Promise<void> {
  await db
    .updateTable("plan")
    .set({ progress: JSON.stringify(progress) })
    .where("id", "=", id)
    .execute();
}

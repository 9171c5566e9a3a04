import type { Kysely, Transaction } from "kysely";
import type { Database } from "../client";

/** A draft as it was before an edit. */
export interface PlanStep {
  readonly planId: string;
  readonly version: number;
  readonly act: string;
  /** What was done, for the undo button. */
  readonly words: string;
  readonly content: unknown;
  readonly takenAt: Date;
  readonly takenBy: string | null;
}

export async function insertPlanStep(trx: Transaction<Database>, step: PlanStep): Promise<void> {
  await trx
    .insertInto("planStep")
    .values({ ...step, content: JSON.stringify(step.content) })
    .execute();
}

/** The newest step that can be undone, or null. */
export async function lastPlanStep(db: Kysely<Database>, planId: string): Promise<PlanStep | null> {
  const row = await db
    .selectFrom("planStep")
    .selectAll()
    .where("planId", "=", planId)
    .orderBy("version", "desc")
    .limit(1)
    .executeTakeFirst();
  return row ?? null;
}

export async function deletePlanStep(
  trx: Transaction<Database>,
  planId: string,
  version: number,
): Promise<void> {
  await trx
    .deleteFrom("planStep")
    .where("planId", "=", planId)
    .where("version", "=", version)
    .execute();
}

/** Edits that were undone or overtaken by a new build cannot be undone any more. */
export async function deletePlanSteps(trx: Transaction<Database>, planId: string): Promise<void> {
  await trx.deleteFrom("planStep").where("planId", "=", planId).execute();
}

import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "../client";

export type ImportState = "uploaded" | "checking" | "checked" | "importing" | "imported" | "failed";

/** How the file is read; the columns by field key. */
export interface ImportSettings {
  readonly delimiter: "," | ";" | "\t";
  readonly decimal: "." | ",";
  readonly dayOrder: "year-first" | "day-first" | "month-first";
  readonly columns: Readonly<
    Record<string, { readonly column: number; readonly unit: string | null }>
  >;
  readonly closePrevious: boolean;
}

export interface ImportReport {
  readonly counts: {
    readonly new: number;
    readonly changed: number;
    readonly same: number;
    readonly refused: number;
  };
  /** One sign a data row, from row 2: n new, c changed, s same, x refused, "." empty. */
  readonly outcomes: string;
  /** What changes, or a mark, by row; the first some hundreds. */
  readonly notes: Readonly<Record<string, string>>;
  readonly faults: readonly {
    readonly row: number;
    readonly column: string;
    readonly message: string;
  }[];
  readonly faultsTotal: number;
  /** Why the whole file could not be read or written. */
  readonly trouble: string | null;
}

export interface NewImportRun {
  readonly id: string;
  readonly kind: string;
  readonly fileName: string;
  readonly content: string;
  readonly settings: ImportSettings;
  readonly createdBy: string;
  readonly createdAt: Date;
}

export async function insertImportRun(
  trx: Transaction<Database>,
  run: NewImportRun,
): Promise<void> {
  await trx
    .insertInto("importRun")
    .values({ ...run, settings: JSON.stringify(run.settings) })
    .onConflict((conflict) => conflict.column("id").doNothing())
    .execute();
}

/** A run with its file; null when there is none. */
export async function findImportRun(db: Kysely<Database>, id: string) {
  const row = await db
    .selectFrom("importRun")
    .innerJoin("person", "person.id", "importRun.createdBy")
    .selectAll("importRun")
    .select("person.name as createdByName")
    .where("importRun.id", "=", id)
    .executeTakeFirst();
  if (!row) return null;
  return {
    ...row,
    state: row.state as ImportState,
    settings: row.settings as unknown as ImportSettings,
    report: row.report as unknown as ImportReport | null,
  };
}

export type ImportRun = NonNullable<Awaited<ReturnType<typeof findImportRun>>>;

/** State and progress alone: what a waiting page asks every second. */
export async function findImportProgress(db: Kysely<Database>, id: string) {
  const row = await db
    .selectFrom("importRun")
    .select(["state", "rowsTotal", "rowsDone"])
    .where("id", "=", id)
    .executeTakeFirst();
  return row ? { ...row, state: row.state as ImportState } : null;
}

/** The latest runs, newest first, without their files. */
export async function listImportRuns(db: Kysely<Database>, limit: number) {
  return db
    .selectFrom("importRun")
    .innerJoin("person", "person.id", "importRun.createdBy")
    .select([
      "importRun.id",
      "importRun.kind",
      "importRun.fileName",
      "importRun.state",
      "importRun.rowsTotal",
      "importRun.createdAt",
      "person.name as createdByName",
      sql<ImportReport["counts"] | null>`import_run.report -> 'counts'`.as("counts"),
    ])
    .orderBy("importRun.createdAt", "desc")
    .limit(limit)
    .execute();
}

export interface ImportRunChange {
  readonly state?: ImportState;
  readonly settings?: ImportSettings;
  readonly report?: ImportReport | null;
  readonly rowsTotal?: number | null;
  readonly rowsDone?: number;
  readonly finishedAt?: Date | null;
}

/**
 * Changes a run that is in one of these states.
 * @returns false when it is in another
 */
export async function changeImportRun(
  db: Kysely<Database>,
  id: string,
  from: readonly ImportState[],
  { settings, report, ...rest }: ImportRunChange,
): Promise<boolean> {
  const row = await db
    .updateTable("importRun")
    .set({
      ...rest,
      ...(settings && { settings: JSON.stringify(settings) }),
      ...(report !== undefined && { report: report && JSON.stringify(report) }),
    })
    .where("id", "=", id)
    .where("state", "in", from)
    .returning("id")
    .executeTakeFirst();
  return row !== undefined;
}

/** One run is worked on by one worker at a time, for as long as the transaction lasts. */
export async function holdImportRun(trx: Transaction<Database>, id: string): Promise<void> {
  await sql`select pg_advisory_xact_lock(hashtextextended(${id}, 7))`.execute(trx);
}

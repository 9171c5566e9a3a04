import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import type { CellFault, CellValue, ImportRecord } from "@/lib/csv/read-records";
import type { Deps } from "./use-case";

/** What a row does, or would do. */
export type RowOutcome = "new" | "changed" | "same";

/** What the planner of one kind of file works with. */
export interface ImportContext {
  readonly trx: Transaction<Database>;
  readonly deps: Deps;
  readonly records: readonly ImportRecord[];
  readonly timeZone: string;
  readonly decimal: "." | ",";
  readonly personId: string | null;
  /** False: find out only; nothing needs to be written. */
  readonly write: boolean;
  /** Installs: the next install ends a pack whose removal is not given. */
  readonly closePrevious: boolean;
  /** The head of the column that a field is read from. */
  readonly headOf: (key: string) => string;
  /** Says how many rows are done. */
  readonly progress: (rows: number) => Promise<void>;
}

/** Gathers what each row does and what is wrong with it. */
export class ImportOutcome {
  readonly rows = new Map<number, RowOutcome>();
  readonly notes = new Map<number, string>();
  readonly faults: CellFault[] = [];
  private readonly refusedRows = new Set<number>();

  constructor(private readonly context: Pick<ImportContext, "headOf">) {}

  refuse(row: number, key: string, message: string): void {
    this.faults.push({ row, column: this.context.headOf(key), message });
    this.refusedRows.add(row);
    this.rows.delete(row);
  }

  isRefused(row: number): boolean {
    return this.refusedRows.has(row);
  }

  settle(row: number, outcome: RowOutcome, note = ""): void {
    if (this.isRefused(row)) return;
    this.rows.set(row, outcome);
    if (note !== "") this.notes.set(row, note);
  }
}

/** Values with the empty ones left out: an empty cell leaves what is there as it is. */
export function given(record: ImportRecord): Record<string, Exclude<CellValue, null>> {
  const entries = Object.entries(record.values).filter(
    (e): e is [string, Exclude<CellValue, null>] => e[1] !== null && e[1] !== undefined,
  );
  return Object.fromEntries(entries);
}

/** Lays new values over old ones and says what that changes, "notice: 5 → 10". */
export function overlay<T extends object>(
  before: T,
  changes: Partial<T>,
): { readonly after: T; readonly changed: string[] } {
  const changed: string[] = [];
  for (const [key, value] of Object.entries(changes)) {
    const old: unknown = before[key as keyof T];
    if (value === undefined || asText(old) === asText(value)) continue;
    changed.push(`${key}: ${asText(old) || "empty"} → ${asText(value)}`);
  }
  return { after: { ...before, ...changes }, changed };
}

function asText(value: unknown): string {
  if (value === null || value === undefined) return "";
  if (value instanceof Date) return value.toISOString();
  return Array.isArray(value) ? [...value].sort().join(", ") : String(value);
}

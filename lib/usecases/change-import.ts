import { z } from "zod";
import { changeImportRun, findImportRun, type ImportState } from "@/db/queries/import-runs";
import { IMPORT_FIELDS, type ImportKind } from "@/lib/csv/import-kinds";
import { unitsOf } from "@/lib/csv/match-columns";
import { DELIMITERS } from "@/lib/csv/read-table";
import { type AppError, conflict, type Fault, invalid, notFound } from "@/lib/errors";
import { defineUseCase } from "./use-case";

const allow = { roles: ["administrator", "dispatcher"] as const };
const IDLE: readonly ImportState[] = ["uploaded", "checked", "failed"];

/** Says how the file is written and which column is which, then asks for the dry run. */
export const checkImport = defineUseCase({
  name: "check-import",
  allow,
  input: z.object({
    importId: z.uuid(),
    delimiter: z.enum(DELIMITERS, "Choose the sign between fields."),
    decimal: z.enum([".", ","], "Choose the decimal sign."),
    dayOrder: z.enum(["year-first", "day-first", "month-first"], "Choose the order of dates."),
    closePrevious: z.boolean().default(false),
    columns: z.record(
      z.string(),
      z.object({ column: z.int().min(0).max(500), unit: z.string().nullable() }),
    ),
  }),
  run: async (deps, _actor, { importId, columns, ...format }) => {
    const run = await findImportRun(deps.db, importId);
    if (!run) throw notFound("The import");
    const settings = { ...format, columns: soundColumns(run.kind as ImportKind, columns) };
    await deps.db.transaction().execute(async (trx) => {
      const change = { settings, state: "checking", report: null, rowsDone: 0 } as const;
      if (!(await changeImportRun(trx, importId, IDLE, change))) throw busy();
      await deps.jobs.enqueue(trx, "import-check", { importId }, { singletonKey: importId });
    });
    return { importId };
  },
});

type Columns = Record<string, { column: number; unit: string | null }>;

/** @throws AppError invalid when a needed field has no column or two fields share one */
function soundColumns(kind: ImportKind, columns: Columns): Columns {
  const faults: Fault[] = [];
  const kept: Columns = {};
  const takenBy = new Map<number, string>();
  for (const field of IMPORT_FIELDS[kind]) {
    const match = columns[field.key];
    if (!match) {
      if (field.required) {
        faults.push({ field: field.key, message: `Choose the column with ${field.label}.` });
      }
      continue;
    }
    const other = takenBy.get(match.column);
    if (other) faults.push({ field: field.key, message: `This column is taken by ${other}.` });
    takenBy.set(match.column, field.label);
    const units = unitsOf(field);
    const unit = units.find((u) => u.name === match.unit) ?? units[0];
    kept[field.key] = { column: match.column, unit: unit?.name ?? null };
  }
  if (faults.length > 0) throw invalid("Some columns need choosing.", faults);
  return kept;
}

/** Asks for the import of every sound row of a checked file. */
export const applyImport = defineUseCase({
  name: "apply-import",
  allow,
  input: z.object({ importId: z.uuid() }),
  run: async (deps, _actor, { importId }) => {
    await deps.db.transaction().execute(async (trx) => {
      const change = { state: "importing", rowsDone: 0 } as const;
      if (!(await changeImportRun(trx, importId, ["checked"], change))) throw busy();
      await deps.jobs.enqueue(trx, "import-apply", { importId }, { singletonKey: importId });
    });
    return { importId };
  },
});

function busy(): AppError {
  return conflict("This file is being worked on, or is imported already. Open it again.");
}

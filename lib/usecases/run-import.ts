import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import {
  changeImportRun,
  findImportRun,
  holdImportRun,
  type ImportReport,
  type ImportRun,
} from "@/db/queries/import-runs";
import { getOrganisation } from "@/db/queries/organisation";
import { IMPORT_FIELDS, type ImportKind } from "@/lib/csv/import-kinds";
import { readRecords } from "@/lib/csv/read-records";
import { readTable } from "@/lib/csv/read-table";
import { isAppError } from "@/lib/errors";
import { mapDatabaseFault } from "./database-faults";
import { importAssets } from "./import-assets";
import { importCellTypes } from "./import-cell-types";
import { importDeviceModels } from "./import-device-models";
import { importInstalls } from "./import-installs";
import type { ImportContext, ImportOutcome } from "./import-outcome";
import { importReadings } from "./import-readings";
import { makeReport, troubleReport } from "./import-report";
import { type Deps, defineUseCase } from "./use-case";

const IMPORTERS: Readonly<Record<ImportKind, (context: ImportContext) => Promise<ImportOutcome>>> =
  {
    cell_types: importCellTypes,
    device_models: importDeviceModels,
    assets: importAssets,
    installs: importInstalls,
    readings: importReadings,
  };

const input = z.object({ importId: z.uuid() });

/** The job `import-check`: what each row would do, and what is wrong. Writes nothing else. */
export const runImportCheck = defineUseCase({
  name: "run-import-check",
  allow: { system: true },
  input,
  run: async (deps, _actor, { importId }) => {
    const run = await findImportRun(deps.db, importId);
    if (run?.state !== "checking") return { state: run?.state ?? null };
    const report = await guarded(deps, run, false);
    const state = report.trouble ? "failed" : "checked";
    await changeImportRun(deps.db, importId, ["checking"], { state, report });
    return { state };
  },
});

/**
 * The job `import-apply`: every sound row in one transaction; refused rows are left out.
 * Run twice it finds its work done.
 */
export const runImportApply = defineUseCase({
  name: "run-import-apply",
  allow: { system: true },
  input,
  run: async (deps, _actor, { importId }) => {
    const run = await findImportRun(deps.db, importId);
    if (run?.state !== "importing") return { state: run?.state ?? null };
    const report = await guarded(deps, run, true);
    if (report.trouble) {
      const failed = { state: "failed", report, rowsDone: 0, finishedAt: deps.now() } as const;
      await changeImportRun(deps.db, importId, ["importing"], failed);
    }
    return { state: report.trouble ? "failed" : "imported" };
  },
});

/** Expected trouble becomes a report; what is a defect is reported and thrown on. */
async function guarded(deps: Deps, run: ImportRun, write: boolean): Promise<ImportReport> {
  try {
    return await mapDatabaseFault(() => carryOut(deps, run, write));
  } catch (error) {
    if (isAppError(error)) return troubleReport(error.message);
    const failed = {
      state: "failed",
      report: troubleReport("Something went wrong on our side. Nothing was written."),
      rowsDone: 0,
    } as const;
    await changeImportRun(deps.db, run.id, ["checking", "importing"], failed);
    throw error;
  }
}

async function carryOut(deps: Deps, run: ImportRun, write: boolean): Promise<ImportReport> {
  const table = readTable(run.content, run.settings.delimiter);
  if (table.trouble) {
    return troubleReport(`Row ${table.trouble.row}: ${table.trouble.message}`);
  }
  const { timeZone } = await getOrganisation(deps.db);
  const kind = run.kind as ImportKind;
  const fields = IMPORT_FIELDS[kind];
  const { columns } = run.settings;
  const reading = readRecords(table, fields, columns, { format: run.settings, timeZone });
  const working = ["checking", "importing"] as const;
  await changeImportRun(deps.db, run.id, working, { rowsTotal: table.rows.length, rowsDone: 0 });
  const context: Omit<ImportContext, "trx"> = {
    ...{ deps, timeZone, write, records: reading.records, personId: run.createdBy },
    ...{ decimal: run.settings.decimal, closePrevious: run.settings.closePrevious },
    headOf: (key) =>
      table.head[columns[key]?.column ?? -1] ?? fields.find((f) => f.key === key)?.label ?? key,
    // On its own connection: the transaction's work is not seen before it ends.
    progress: async (rows) => {
      await changeImportRun(deps.db, run.id, working, { rowsDone: rows });
    },
  };
  return deps.db.transaction().execute(async (trx) => {
    await holdImportRun(trx, run.id);
    const done = await findImportRun(trx, run.id);
    // Another worker was quicker: its report stands.
    if (done?.state !== run.state) return done?.report ?? troubleReport("This import is over.");
    const outcome = await IMPORTERS[kind]({ ...context, trx });
    const report = makeReport(table, reading, outcome);
    if (write) await finish({ ...context, trx }, run, report);
    return report;
  });
}

async function finish(
  { trx, deps }: Pick<ImportContext, "trx" | "deps">,
  run: ImportRun,
  report: ImportReport,
): Promise<void> {
  const at = deps.now();
  await changeImportRun(trx, run.id, ["importing"], { state: "imported", report, finishedAt: at });
  await appendAudit(trx, {
    ...{ at, personId: run.createdBy, act: "import", subjectKind: "import", subjectId: run.id },
    detail: { kind: run.kind, fileName: run.fileName, ...report.counts },
  });
}

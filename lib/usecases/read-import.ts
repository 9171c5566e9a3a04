import { z } from "zod";
import { findImportProgress, findImportRun, listImportRuns } from "@/db/queries/import-runs";
import { getOrganisation } from "@/db/queries/organisation";
import { guessColumns, unitsOf } from "@/lib/csv/match-columns";
import { IMPORT_FIELDS, type ImportKind } from "@/lib/csv/import-kinds";
import { DELIMITERS, readTable } from "@/lib/csv/read-table";
import { notFound } from "@/lib/errors";
import { listEntries, PAGE_SIZE } from "./list-entries";
import { defineUseCase } from "./use-case";

const allow = { roles: ["administrator", "dispatcher"] as const };
const SIGNS = { n: "new", c: "changed", s: "same", x: "refused" } as const;
export type ShownOutcome = (typeof SIGNS)[keyof typeof SIGNS];

/** A file with its columns, the guesses, its report and one page of its rows. */
export const readImport = defineUseCase({
  name: "read-import",
  allow,
  input: z.object({
    importId: z.uuid("No such import."),
    /** Read with another sign between fields than the one kept. */
    delimiter: z.enum(DELIMITERS).nullable().catch(null),
    show: z.enum(["new", "changed", "same", "refused"]).nullable().catch(null),
    page: listEntries.page,
  }),
  run: async (deps, _actor, { importId, delimiter, show, page }) => {
    const run = await findImportRun(deps.db, importId);
    if (!run) throw notFound("The import");
    const kind = run.kind as ImportKind;
    const table = readTable(run.content, delimiter ?? run.settings.delimiter);
    const columns =
      delimiter && delimiter !== run.settings.delimiter
        ? guessColumns(table.head, IMPORT_FIELDS[kind])
        : run.settings.columns;
    const outcomes = run.report?.outcomes ?? "";
    const rows = table.rows.flatMap((r) => {
      const outcome = SIGNS[(outcomes[r.row - 2] ?? "") as keyof typeof SIGNS] ?? null;
      return show && outcome !== show ? [] : [{ ...r, outcome }];
    });
    const { content: _, ...rest } = run;
    return {
      run: { ...rest, kind, settings: { ...run.settings, columns } },
      organisation: await getOrganisation(deps.db),
      fields: IMPORT_FIELDS[kind].map((field) => ({
        ...{ key: field.key, label: field.label, required: field.required ?? false },
        units: unitsOf(field).map((unit) => unit.name),
      })),
      head: table.head,
      trouble: table.trouble,
      samples: table.rows.slice(0, 3).map((r) => r.cells),
      delimiter: delimiter ?? run.settings.delimiter,
      rows: rows.slice((page - 1) * PAGE_SIZE, page * PAGE_SIZE),
      ...{ rowsShown: rows.length, show, page, pageSize: PAGE_SIZE },
    };
  },
});

export type ImportView = Awaited<ReturnType<typeof readImport>>;

/** State and progress of a run, for a waiting page. */
export const readImportProgress = defineUseCase({
  name: "read-import-progress",
  allow,
  input: z.object({ importId: z.uuid("No such import.") }),
  run: async (deps, _actor, { importId }) => {
    const progress = await findImportProgress(deps.db, importId);
    if (!progress) throw notFound("The import");
    return progress;
  },
});

/** The latest imports. */
export const listImports = defineUseCase({
  name: "list-imports",
  allow,
  input: z.object({}),
  run: async (deps) => ({
    organisation: await getOrganisation(deps.db),
    runs: await listImportRuns(deps.db, 50),
    now: deps.now(),
  }),
});

export type ImportListView = Awaited<ReturnType<typeof listImports>>;

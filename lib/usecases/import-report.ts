import type { ImportReport } from "@/db/queries/import-runs";
import type { Reading } from "@/lib/csv/read-records";
import type { Table } from "@/lib/csv/read-table";
import type { ImportOutcome } from "./import-outcome";

/** More than a person reads; the counts tell of all. */
const MOST_FAULTS = 2000;
const MOST_NOTES = 2000;
const SIGNS = { new: "n", changed: "c", same: "s", refused: "x" } as const;

/** What the file as a whole and each of its rows does. */
export function makeReport(table: Table, reading: Reading, outcome: ImportOutcome): ImportReport {
  const faults = [...reading.faults, ...outcome.faults].sort((a, b) => a.row - b.row);
  const refused = new Set(faults.map((f) => f.row));
  const counts = { new: 0, changed: 0, same: 0, refused: 0 };
  const last = table.rows.at(-1)?.row ?? 1;
  const signs = Array.from({ length: last - 1 }, () => ".");
  for (const { row } of table.rows) {
    const does = refused.has(row) ? "refused" : (outcome.rows.get(row) ?? "same");
    counts[does] += 1;
    signs[row - 2] = SIGNS[does];
  }
  return {
    counts,
    outcomes: signs.join(""),
    notes: Object.fromEntries([...outcome.notes].slice(0, MOST_NOTES)),
    faults: faults.slice(0, MOST_FAULTS),
    faultsTotal: faults.length,
    trouble: null,
  };
}

export function troubleReport(trouble: string): ImportReport {
  const counts = { new: 0, changed: 0, same: 0, refused: 0 };
  return { counts, outcomes: "", notes: {}, faults: [], faultsTotal: 0, trouble };
}

import { CsvError, parse } from "csv-parse/sync";

export const DELIMITERS = [",", ";", "\t"] as const;
export type Delimiter = (typeof DELIMITERS)[number];

/** One record of a file. `row` is the one a spreadsheet shows: the head is row 1. */
export interface TableRow {
  readonly row: number;
  readonly cells: readonly string[];
}

export interface Table {
  readonly head: readonly string[];
  /** Without the records that are wholly empty. */
  readonly rows: readonly TableRow[];
  /** Why the file could not be read to its end; null when it could. */
  readonly trouble: { readonly row: number; readonly message: string } | null;
}

/**
 * Reads a file by RFC 4180: quoted fields may hold the delimiter, line breaks and doubled
 * quotes; lines end in CRLF, LF or CR; a byte-order mark is passed over.
 */
export function readTable(text: string, delimiter: Delimiter): Table {
  try {
    const records: string[][] = parse(text, { bom: true, delimiter, relax_column_count: true });
    const [head = [], ...rest] = records;
    const rows = rest
      .map((cells, n) => ({ row: n + 2, cells }))
      .filter(({ cells }) => cells.some((cell) => cell.trim() !== ""));
    return { head: head.map((name) => name.trim()), rows, trouble: null };
  } catch (error) {
    if (!(error instanceof CsvError)) throw error;
    const row = typeof error.records === "number" ? error.records + 1 : 1;
    return { head: [], rows: [], trouble: { row, message: inWords(error.code) } };
  }
}

function inWords(code: string): string {
  switch (code) {
    case "CSV_QUOTE_NOT_CLOSED":
      return "A quoted field that begins near here is never closed.";
    case "INVALID_OPENING_QUOTE":
    case "CSV_INVALID_OPENING_QUOTE":
      return 'A quote stands inside a field: put the field in quotes and double it ("").';
    case "CSV_INVALID_CLOSING_QUOTE":
      return "Something follows a closing quote: is the delimiter the right one?";
    default:
      return "This row cannot be read as CSV.";
  }
}

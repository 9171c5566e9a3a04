import { stringify } from "csv-stringify/sync";
import type { Delimiter } from "./read-table";

/** A number as `{ value, digits }`: an integer of the finer unit, written with its decimals. */
export type OutCell =
  | string
  | null
  | { readonly value: number; readonly digits: number }
  | { readonly at: Date; readonly timeZone: string };

export interface OutFormat {
  readonly delimiter: Delimiter;
  readonly decimal: "." | ",";
}

/** Spreadsheets run text that begins so; an apostrophe makes them show it instead. */
const RUNS = /^'*[=+\-@\t\r]/;

/**
 * A file by RFC 4180 with a byte-order mark, so that spreadsheets read it as UTF-8. Text that
 * a spreadsheet would run is put behind an apostrophe; numbers stay numbers.
 */
export function writeTable(
  head: readonly string[],
  rows: readonly (readonly OutCell[])[],
  format: OutFormat,
): string {
  const records = [head.map(safeText), ...rows.map((row) => row.map((c) => write(c, format)))];
  return stringify(records, {
    bom: true,
    delimiter: format.delimiter,
    record_delimiter: "windows",
    quoted_match: /^\s|\s$/,
  });
}

/** The signs that go with a locale: where numbers have a comma, files have semicolons. */
export function formatFor(locale: string): OutFormat {
  const comma = new Intl.NumberFormat(locale).format(1.5).includes(",");
  return comma ? { delimiter: ";", decimal: "," } : { delimiter: ",", decimal: "." };
}

function write(cell: OutCell, { decimal }: OutFormat): string {
  if (cell === null) return "";
  if (typeof cell === "string") return safeText(cell);
  if ("at" in cell) return localTime(cell.at, cell.timeZone);
  return writeScaled(cell.value, cell.digits, decimal);
}

function safeText(text: string): string {
  return RUNS.test(text) ? `'${text}` : text;
}

/** An integer of a finer unit as a decimal, without trailing zeros: 3480 with 3 is "3.48". */
export function writeScaled(value: number, digits: number, decimal: "." | ","): string {
  const sign = value < 0 ? "-" : "";
  const all = String(Math.abs(value)).padStart(digits + 1, "0");
  const whole = all.slice(0, all.length - digits);
  const fraction = all.slice(all.length - digits).replace(/0+$/, "");
  return fraction === "" ? `${sign}${whole}` : `${sign}${whole}${decimal}${fraction}`;
}

const clocks = new Map<string, Intl.DateTimeFormat>();

/** "2026-12-01T09:30:00+00:00": local time with its offset, which no reader can mistake. */
function localTime(at: Date, timeZone: string): string {
  let clock = clocks.get(timeZone);
  if (!clock) {
    clock = new Intl.DateTimeFormat("sv-SE", {
      ...{ timeZone, hourCycle: "h23", year: "numeric", month: "2-digit", day: "2-digit" },
      ...{ hour: "2-digit", minute: "2-digit", second: "2-digit", timeZoneName: "longOffset" },
    });
    clocks.set(timeZone, clock);
  }
  const part = Object.fromEntries(clock.formatToParts(at).map((p) => [p.type, p.value]));
  const offset = (part.timeZoneName ?? "").replace(/^(GMT|UTC)/, "").replace("\u2212", "-");
  const day = `${part.year}-${part.month}-${part.day}`;
  return `${day}T${part.hour}:${part.minute}:${part.second}${offset || "+00:00"}`;
}

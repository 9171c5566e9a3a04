/**
 * The CSV form of a forecast's input: lines `name,value` that describe the pack, then a table of
 * readings with a header. Read into the shape of the JSON form; `forecast-file.ts` checks both.
 */
import { parse } from "csv-parse/sync";
import { invalid } from "../lib/errors";

/** Where each named line lies in the JSON form; what must be text stands in TEXT. */
const LINES = {
  chemistry: "pack.cell.chemistry",
  nominalMv: "pack.cell.nominalMv",
  ratedCapacityMah: "pack.cell.rated.capacityMah",
  ratedCurrentUa: "pack.cell.rated.currentUa",
  ratedCutoffMv: "pack.cell.rated.cutoffMv",
  ratedTemperatureDc: "pack.cell.rated.temperatureDc",
  selfDischargePpmPerYear: "pack.cell.selfDischargePpmPerYear",
  resistanceMohm: "pack.cell.resistanceMohm",
  series: "pack.series",
  parallel: "pack.parallel",
  cutoffMv: "pack.cutoffMv",
  averageUa: "pack.duty.currentUa",
  peakUa: "pack.duty.currentUa",
  temperatureDc: "pack.monthlyMeanDc",
  madeAt: "pack.madeAt",
  installedAt: "pack.installedAt",
  now: "now",
} as const;
type LineName = keyof typeof LINES;
const NAMES = Object.keys(LINES) as readonly LineName[];
const TEXT: readonly string[] = ["chemistry", "madeAt", "installedAt", "now"];

const COLUMNS = [
  "at",
  "millivolts",
  "kind",
  "loadUa",
  "temperatureDc",
  "accuracyMv",
  "id",
] as const;
const TEXT_COLUMNS: readonly string[] = ["at", "kind", "id"];

/** The name meant, whatever its case; unknown ones stay as they are. */
function meant(names: readonly string[], text: string): string {
  return names.find((name) => name.toLowerCase() === text.trim().toLowerCase()) ?? text;
}

/** The name of the line that holds a field of the JSON form. */
export function lineOf(field: string): string {
  const full = field === "now" || field.startsWith("readings") ? field : `pack.${field}`;
  return NAMES.find((name) => LINES[name] === field || LINES[name] === full) ?? field;
}

/** Whatever parts the table's header: comma, semicolon or tab. */
function delimiterOf(text: string): string {
  const header = text
    .split(/\r\n|\r|\n/)
    .find((one) => /(^|[,;\t])\s*"?at"?\s*([,;\t]|$)/i.test(one));
  const count = (mark: string): number => (header ?? "").split(mark).length;
  return [",", ";", "\t"].reduce((a, b) => (count(b) > count(a) ? b : a));
}

function parseRows(text: string, delimiter: string): string[][] {
  try {
    return parse(text, {
      bom: true,
      delimiter,
      relax_column_count: true,
      trim: true,
      // a line of nothing but separators is an empty line
      skip_records_with_empty_values: true,
    });
  } catch (error) {
    const why = error instanceof Error ? error.message : String(error);
    throw invalid("The file is not CSV.", [{ field: "file", message: why }]);
  }
}

/** A number as written; where commas do not part columns one may mark the decimals. */
function numberOf(text: string, delimiter: string): number | string {
  const plain = delimiter === "," ? text : text.replace(",", ".");
  const value = Number(plain);
  return text === "" || Number.isNaN(value) ? text : value;
}

/** The input in the shape of the JSON form, unchecked. Throws `invalid` without a table. */
export function fromCsv(text: string): unknown {
  const delimiter = delimiterOf(text);
  const rows = parseRows(text, delimiter);
  const start = rows.findIndex((row) => row.some((cell) => meant(COLUMNS, cell) === "at"));
  const header = (rows[start] ?? []).map((cell) => meant(COLUMNS, cell));
  for (const needed of ["at", "millivolts"]) {
    if (header.includes(needed)) continue;
    const message = "Begin the table of readings with a header: at,millivolts,kind,...";
    throw invalid("The file holds no readings.", [{ field: needed, message }]);
  }
  const lines = linesOf(rows.slice(0, start), delimiter);
  const readings = rows.slice(start + 1).map((row) =>
    Object.fromEntries(
      header.flatMap((name, i) => {
        const value = row[i] ?? "";
        if (value === "") return [];
        return [[name, TEXT_COLUMNS.includes(name) ? value : numberOf(value, delimiter)]];
      }),
    ),
  );
  return { pack: packOf(lines), readings, now: lines.get("now") };
}

type Lines = ReadonlyMap<string, string | number>;

/** Lines of other names are passed over, as other columns are. */
function linesOf(rows: readonly string[][], delimiter: string): Lines {
  const lines = new Map<string, string | number>();
  for (const [written = "", value = ""] of rows) {
    const name = meant(NAMES, written);
    if (value !== "") lines.set(name, TEXT.includes(name) ? value : numberOf(value, delimiter));
  }
  return lines;
}

/** The pack's lines as they lie in the JSON form. */
function packOf(lines: Lines): unknown {
  const averageUa = lines.get("averageUa");
  return {
    cell: {
      chemistry: lines.get("chemistry"),
      nominalMv: lines.get("nominalMv"),
      rated: {
        currentUa: lines.get("ratedCurrentUa"),
        cutoffMv: lines.get("ratedCutoffMv"),
        temperatureDc: lines.get("ratedTemperatureDc"),
        capacityMah: lines.get("ratedCapacityMah"),
      },
      selfDischargePpmPerYear: lines.get("selfDischargePpmPerYear"),
      resistanceMohm: lines.get("resistanceMohm"),
    },
    series: lines.get("series"),
    monthlyMeanDc: yearOf(lines.get("temperatureDc")),
    madeAt: lines.get("madeAt"),
    parallel: lines.get("parallel"),
    cutoffMv: lines.get("cutoffMv"),
    // a pulse too short to change the average
    duty: [
      { name: "average", currentUa: averageUa, durationMs: 1e9 },
      { name: "peak", currentUa: lines.get("peakUa") ?? averageUa, durationMs: 1 },
    ],
    installedAt: lines.get("installedAt"),
  };
}

/** One temperature all the year; left out, the file's default holds. */
const yearOf = (dc: unknown): unknown =>
  dc === undefined ? undefined : Array.from({ length: 12 }, () => dc);

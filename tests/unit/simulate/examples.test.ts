import { readFileSync } from "node:fs";
import { parse } from "csv-parse/sync";
import { describe, expect, it } from "vitest";
import { decodeText } from "@/lib/csv/decode-text";
import { guessFormat } from "@/lib/csv/guess-format";
import { IMPORT_FIELDS, type ImportKind } from "@/lib/csv/import-kinds";
import { guessColumns } from "@/lib/csv/match-columns";
import { readRecords } from "@/lib/csv/read-records";
import { readTable } from "@/lib/csv/read-table";

const bytes = (name: string): Buffer =>
  readFileSync(new URL(`../../../examples/${name}`, import.meta.url));

const FILES: readonly (readonly [ImportKind, string])[] = [
  ["cell_types", "cell-types.csv"],
  ["device_models", "device-models.csv"],
  ["assets", "assets-with-sites.csv"],
  ["installs", "installs.csv"],
  ["readings", "readings.csv"],
];

/** The example files are the real input a stranger begins with: the reader must take them whole. */
describe.each(FILES)("%s example %s", (kind, name) => {
  const text = decodeText(bytes(name)).text ?? "";
  const format = guessFormat(text);
  const table = readTable(text, format.delimiter);
  const columns = guessColumns(table.head, IMPORT_FIELDS[kind]);

  it("is read without one fault, every column recognised", () => {
    const { faults, records } = readRecords(table, IMPORT_FIELDS[kind], columns, {
      format,
      timeZone: "Europe/London",
    });
    expect(table.trouble).toBeNull();
    expect(faults).toEqual([]);
    expect(records.length).toBe(table.rows.length);
    const matched = new Set(Object.values(columns).map((c) => c.column));
    expect(table.head.filter((_, i) => !matched.has(i))).toEqual([]);
  });

  it("names required fields in every row", () => {
    for (const field of IMPORT_FIELDS[kind].filter((f) => f.required)) {
      expect(columns[field.key], field.label).toBeDefined();
    }
  });
});

describe("the ways of writing", () => {
  // RFC 4180, section 2: records end in CRLF and have the same number of fields throughout.
  it("keeps to RFC 4180 and holds a byte-order mark, a semicolon and a decimal comma somewhere", () => {
    for (const [, name] of FILES) {
      const raw = bytes(name).toString("utf8");
      expect(raw.replaceAll("\r\n", "")).not.toMatch(/[\r\n]/);
      const delimiter = name === "readings.csv" ? ";" : ",";
      expect(() => parse(raw, { bom: true, delimiter, relax_column_count: false })).not.toThrow();
    }
    expect([...bytes("assets-with-sites.csv").subarray(0, 3)]).toEqual([0xef, 0xbb, 0xbf]);
    expect(bytes("readings.csv").toString("utf8")).toMatch(/;\d+,\d+;resting;/);
  });

  it("refers only to what the other files hold", () => {
    const column = (name: string, delimiter: string, head: string): string[] =>
      (parse(bytes(name), { bom: true, delimiter, columns: true }) as Record<string, string>[]).map(
        (row) => row[head] ?? "",
      );
    const tags = new Set(column("assets-with-sites.csv", ",", "tag"));
    const models = new Set(column("device-models.csv", ",", "name"));
    const cells = new Set(column("cell-types.csv", ",", "designation"));
    for (const tag of column("installs.csv", ",", "tag")) expect(tags).toContain(tag);
    for (const tag of column("readings.csv", ";", "tag")) expect(tags).toContain(tag);
    for (const model of column("assets-with-sites.csv", ",", "device model"))
      expect(models).toContain(model);
    for (const cell of column("installs.csv", ",", "cell type")) expect(cells).toContain(cell);
    expect(tags.size).toBeGreaterThanOrEqual(140);
  });
});

/**
 * Format: RFC 4180 (https://www.rfc-editor.org/rfc/rfc4180): quoting, doubled quotes, CRLF.
 * The expected tables are written out by hand from its rules; the round trip is a property.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { decodeText } from "@/lib/csv/decode-text";
import { guessFormat } from "@/lib/csv/guess-format";
import { DELIMITERS, readTable } from "@/lib/csv/read-table";
import { formatFor, writeTable } from "@/lib/csv/write-table";

describe("reading by RFC 4180", () => {
  it("takes the examples of its section 2", () => {
    // Rule 5 to 7: quotes around fields, line breaks and commas in them, doubled quotes.
    const text = 'aaa,bbb,ccc\r\n"b\r\nb","x,y","b""bb"\r\nzzz,yyy,xxx';
    const { head, rows, trouble } = readTable(text, ",");
    expect(trouble).toBeNull();
    expect(head).toEqual(["aaa", "bbb", "ccc"]);
    expect(rows).toEqual([
      { row: 2, cells: ["b\r\nb", "x,y", 'b"bb'] },
      { row: 3, cells: ["zzz", "yyy", "xxx"] },
    ]);
  });

  it("numbers rows as a spreadsheet does, empty ones included", () => {
    expect(readTable("a;b\n\n1;2\n;\n3;4\n", ";").rows.map((r) => r.row)).toEqual([3, 5]);
  });

  it("says which row a broken quote begins in", () => {
    expect(readTable('a,b\n1,2\n3,"4\n', ",").trouble).toMatchObject({ row: 3 });
    expect(readTable('a,b\n1,x"2\n', ",").trouble?.message).toContain("quote");
  });

  it("reads UTF-8 with and without a byte-order mark and refuses what is neither", () => {
    const bytes = new TextEncoder().encode("\ufefftag,name\n1,Mühle\n");
    const { text } = decodeText(bytes);
    expect(readTable(text ?? "", ",").head).toEqual(["tag", "name"]);
    expect(decodeText(new Uint8Array([0x54, 0xfc, 0x72])).trouble).toContain("UTF-8");
    expect(decodeText(new Uint8Array([0xff, 0xfe, 0x74, 0x00])).trouble).toContain("UTF-16");
  });

  it("guesses the delimiter, the decimal sign and the order of dates", () => {
    const german = "Kennung;Spannung;Tag\nA-1;3,48;31.12.2025\nA-2;3,5;01.02.2026\n";
    expect(guessFormat(german)).toEqual({ delimiter: ";", decimal: ",", dayOrder: "day-first" });
    const english = 'tag,volts,note\nA-1,3.48,"well; really"\nA-2,3.5,\n';
    expect(guessFormat(english)).toMatchObject({ delimiter: ",", decimal: "." });
    const american = "tag,day\nA,12/31/2025\n";
    expect(guessFormat(american).dayOrder).toBe("month-first");
  });
});

describe("what is written is read back", () => {
  const cell = fc.string({ unit: "grapheme", maxLength: 12 });
  const table = fc
    .integer({ min: 1, max: 5 })
    .chain((width) =>
      fc.array(fc.array(cell, { minLength: width, maxLength: width }), { minLength: 1 }),
    );

  it("for any text, delimiter and line break", () => {
    fc.assert(
      fc.property(table, fc.constantFrom(...DELIMITERS), (rows, delimiter) => {
        const head = (rows[0] ?? []).map((_, n) => `c${n}`);
        const text = writeTable(head, rows, { delimiter, decimal: "." });
        const back = readTable(text, delimiter);
        expect(back.trouble).toBeNull();
        expect(back.head).toEqual(head);
        const kept = new Map(back.rows.map((r) => [r.row, r.cells]));
        rows.forEach((cells, n) => {
          // Text a spreadsheet would run stands behind one apostrophe (checked below).
          const plain = (kept.get(n + 2) ?? cells.map(() => "")).map((c) =>
            /^'+[=+\-@\t\r]/.test(c) ? c.slice(1) : c,
          );
          const wanted = cells.every((c) => c.trim() === "") ? cells.map(() => "") : cells;
          expect(plain).toEqual(wanted);
        });
      }),
    );
  });

  it("never throws on text that is no CSV", () => {
    fc.assert(
      fc.property(fc.string(), fc.constantFrom(...DELIMITERS), (text, delimiter) => {
        expect(() => readTable(text, delimiter)).not.toThrow();
        expect(() => guessFormat(text)).not.toThrow();
      }),
    );
  });

  it("keeps a spreadsheet from running text, and numbers as numbers", () => {
    // OWASP, "CSV Injection": fields that begin with = + - @ tab or carriage return.
    const runs = ["=1+1", "+1", "-1", "@SUM(A1)", "\tx"];
    const text = writeTable(
      ["a", "b"],
      runs.map((r) => [r, { value: -3480, digits: 3 }]),
      {
        delimiter: ";",
        decimal: ",",
      },
    );
    for (const { cells } of readTable(text, ";").rows) {
      expect(cells[0]?.startsWith("'")).toBe(true);
      expect(cells[1]).toBe("-3,48");
    }
  });

  it("goes with the locale: a decimal comma takes semicolons", () => {
    expect(formatFor("de-DE")).toEqual({ delimiter: ";", decimal: "," });
    expect(formatFor("en-GB")).toEqual({ delimiter: ",", decimal: "." });
  });
});

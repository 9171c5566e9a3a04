/**
 * Clock changes: the European Union's and the United Kingdom's rule, last Sundays of March and
 * October at 01:00 UTC (Directive 2000/84/EC; the Summer Time Order 2002): 29 March and
 * 25 October 2026. Numbers: arithmetic.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { readDuty, writeDuty } from "@/lib/csv/read-duty";
import { readDay, readInstant } from "@/lib/csv/read-instant";
import { readScaled } from "@/lib/csv/read-scaled";
import { writeScaled } from "@/lib/csv/write-table";
import { guessColumns } from "@/lib/csv/match-columns";
import { IMPORT_FIELDS } from "@/lib/csv/import-kinds";

describe("numbers", () => {
  it.each([
    ["3.48", ".", 3, 3480],
    ["3,48", ",", 3, 3480],
    ["3.4805", ".", 3, 3481],
    ["-0,5", ",", 1, -5],
    ["\u22124.5", ".", 1, -45],
    ["1,284", ".", 0, 1284],
    ["1.284,5", ",", 1, 12845],
    ["1 284", ".", 0, 1284],
    ["1e-3", ".", 3, 1],
    ["12", "either", 3, 12000],
    ["0,1", "either", 3, 100],
  ] as const)("%s with %s and %i digits", (text, sign, digits, value) => {
    expect(readScaled(text, sign, digits)).toBe(value);
  });

  it.each(["", "abc", "1,2,3", "3.4.5", "1,5.2", "--3", "9".repeat(30)])("refuses %s", (text) => {
    expect(readScaled(text, ",", 3)).toBeNull();
  });

  it("reads back every number it writes, with either sign", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: -1e12, max: 1e12 }),
        fc.integer({ min: 0, max: 7 }),
        fc.constantFrom("." as const, "," as const),
        (value, digits, sign) => {
          expect(readScaled(writeScaled(value, digits, sign), sign, digits)).toBe(value);
        },
      ),
    );
  });
});

describe("moments", () => {
  const at = (text: string) => readInstant(text, "Europe/London", "day-first").at?.toISOString();

  it("reads local time in summer and in winter", () => {
    expect(at("2026-07-01 10:00")).toBe("2026-07-01T09:00:00.000Z");
    expect(at("01/12/2026 09:30")).toBe("2026-12-01T09:30:00.000Z");
    expect(at("2026-07-01T10:00:00+02:00")).toBe("2026-07-01T08:00:00.000Z");
  });

  it("refuses the hour that the spring change skips", () => {
    expect(at("2026-03-29 00:59")).toBe("2026-03-29T00:59:00.000Z");
    expect(readInstant("2026-03-29 01:30", "Europe/London", "day-first").trouble).toContain(
      "does not exist",
    );
    expect(at("2026-03-29 02:00")).toBe("2026-03-29T01:00:00.000Z");
  });

  it("takes the first of the hour that comes twice in autumn", () => {
    expect(at("2026-10-25 01:30")).toBe("2026-10-25T00:30:00.000Z");
    expect(at("2026-10-25 02:00")).toBe("2026-10-25T02:00:00.000Z");
  });

  it("agrees with the platform's own calendar for every moment of a year", () => {
    const clock = new Intl.DateTimeFormat("sv-SE", {
      ...{ timeZone: "Europe/London", hourCycle: "h23", dateStyle: "short", timeStyle: "medium" },
    });
    const year = { min: new Date("2026-01-01T00:00:00Z"), max: new Date("2026-12-31T23:59:59Z") };
    fc.assert(
      fc.property(fc.date({ ...year, noInvalidDate: true }), (date) => {
        const local = clock.format(date);
        const back = readInstant(local, "Europe/London", "year-first").at;
        expect(back && clock.format(back)).toBe(local);
      }),
    );
  });

  it("knows which days exist", () => {
    expect(readDay("29.02.2024", "day-first")).toBe("2024-02-29");
    for (const text of ["29.02.2026", "31/04/2026", "00/01/2026", "2026-13-01", "hello"]) {
      expect(readDay(text, "day-first")).toBeNull();
    }
  });
});

describe("duty cycles and heads", () => {
  it("reads states and writes them so that they are read again", () => {
    const states = readDuty(
      "sleep 12 µA 3598 s | sample 8,5 mA 1,5 s | transmit 0,12 A 500 ms",
      ",",
    );
    expect(states).toEqual([
      { name: "sleep", currentUa: 12, durationMs: 3_598_000 },
      { name: "sample", currentUa: 8500, durationMs: 1500 },
      { name: "transmit", currentUa: 120_000, durationMs: 500 },
    ]);
    if (typeof states === "string") throw new Error(states);
    expect(readDuty(writeDuty(states, "."), ".")).toEqual(states);
    expect(readDuty("sleep twelve", ".")).toContain("no state");
  });

  it("knows columns by their heads and the units in them", () => {
    const head = ["Asset tag", "Read at", "Voltage (mV)", "load_ma", "Temp °C", "what"];
    const found = guessColumns(head, IMPORT_FIELDS.readings);
    expect(found.tag).toEqual({ column: 0, unit: null });
    expect(found.voltage).toEqual({ column: 2, unit: "mV" });
    expect(found.load).toEqual({ column: 3, unit: "mA" });
    expect(found.temperature).toEqual({ column: 4, unit: "°C" });
    expect(found.kind).toBeUndefined();
  });

  it("finds every column of every kind under its own label", () => {
    for (const fields of Object.values(IMPORT_FIELDS)) {
      const found = guessColumns(
        fields.map((f) => f.label),
        fields,
      );
      fields.forEach((field, column) => expect(found[field.key]?.column).toBe(column));
    }
  });
});

import { readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { forecastPack } from "../../../lib/battery/forecast";
import { isAppError } from "../../../lib/errors";
import { readForecastFile } from "../../../scripts/forecast-file";

const example = (name: string): string =>
  readFileSync(new URL(`./examples/${name}`, import.meta.url), "utf8");

function faultsOf(text: string, name: string) {
  try {
    readForecastFile(text, name);
  } catch (error) {
    if (isAppError(error)) return error.faults;
    throw error;
  }
  return [];
}

test("the same pack as CSV and as JSON gives the same forecast", () => {
  const csv = readForecastFile(example("pack.csv"), "pack.csv");
  const json = readForecastFile(example("pack.json"), "pack.json");
  expect(csv.readings).toHaveLength(4);
  expect(forecastPack(csv)).toEqual(forecastPack(json));
});

test("bad entries are named by field and row", () => {
  const bad = example("pack.csv").replace("alkaline", "alkalyne").replace("2026-06-01", "June");
  expect(faultsOf(bad, "pack.csv")).toEqual([
    expect.objectContaining({ field: "pack.cell.chemistry" }),
    expect.objectContaining({ field: "readings.at", row: 2 }),
  ]);
});

test("a missing figure is asked for, not made up", () => {
  const bad = example("pack.csv").replace("resistanceMohm,150\n", "");
  expect(faultsOf(bad, "pack.csv")[0]!.field).toBe("pack.cell.resistanceMohm");
});

test("what is not JSON and what has no readings is said so", () => {
  expect(faultsOf("{", "pack.json")[0]!.field).toBe("file");
  expect(faultsOf("chemistry,alkaline\n", "pack.csv")[0]!.field).toBe("at");
});

/** A steady discharge of some hours, every reading under load. */
const HOURS = [
  "chemistry;li-fes2",
  "nominalMv;1500",
  "ratedCapacityMah;3000",
  "ratedCurrentUa;100000",
  "ratedCutoffMv;900",
  "selfDischargePpmPerYear;7000",
  "resistanceMohm;120",
  "series;1",
  "cutoffMv;1000",
  "averageUa;445000",
  "temperatureDc;210",
  "installedAt;2026-03-01 08:00",
  "",
  "Remark;At;Millivolts;Kind",
  "a;2026-03-01 08:41;1413;loaded",
  "b;2026-03-01 10:02;1393;loaded",
  "c;2026-03-01T12:43+01:00;1354;loaded",
].join("\n");

// FR6 at 3 ohm: 3037 mAh at 445 mA is 6.8 h; voltages at 10, 30 and 50 % of it (log of an FR6,
// BatteryProject). Half way, the windows must be hours wide and hold the end.
test("a discharge of hours: other columns, semicolons, capitals and zones do not matter", () => {
  const input = readForecastFile(HOURS, "fr6.csv");
  expect(input.readings).toHaveLength(3);
  expect((input.readings[2]!.at - input.readings[1]!.at) * 24 * 60).toBeCloseTo(101, 6);
  expect(new Set(input.readings.map((r) => r.id)).size).toBe(3);
  expect(input.pack.monthlyMeanDc).toEqual(Array.from({ length: 12 }, () => 210));
  const { p05, p50, p95 } = forecastPack(input).quantiles;
  const hours = (at: number): number => (at - input.pack.installedAt) * 24;
  expect(hours(p05)).toBeLessThan(6.8);
  expect(hours(p95)).toBeGreaterThan(6.8);
  expect(Math.abs(hours(p50) - 6.8)).toBeLessThan(1);
});

test("a voltage above the cut-off under the device's load says that it ran", () => {
  const input = readForecastFile(HOURS, "fr6.csv");
  expect(input.events).toEqual([{ at: input.readings[2]!.at, kind: "reporting" }]);
  expect(forecastPack(input).cdfDays[0]).toBeGreaterThanOrEqual(input.readings[2]!.at);
});

test("days that do not exist and a table without voltages are refused by field", () => {
  expect(faultsOf(HOURS.replace("2026-03-01 10:02", "2026-02-30 10:02"), "a.csv")).toEqual([
    expect.objectContaining({ field: "readings.at", row: 2 }),
  ]);
  expect(faultsOf(HOURS.replace("Millivolts", "Volts"), "a.csv")[0]!.field).toBe("millivolts");
  expect(faultsOf(HOURS.replace("1393", "1.393 V"), "a.csv")[0]).toMatchObject({
    field: "readings.millivolts",
    row: 2,
  });
});

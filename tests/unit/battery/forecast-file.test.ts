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

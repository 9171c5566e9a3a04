import { readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { forecastPack } from "../../../lib/battery/forecast";
import { isAppError } from "../../../lib/errors";
import { readForecastFile, timeText } from "../../../scripts/forecast-file";
import { reportJson, reportLines } from "../../../scripts/forecast-report";

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
    expect.objectContaining({ field: "chemistry" }),
    expect.objectContaining({ field: "readings.at", row: 2 }),
  ]);
});

test("a missing figure is asked for, not made up", () => {
  const bad = example("pack.csv").replace("resistanceMohm,150\n", "");
  expect(faultsOf(bad, "pack.csv")[0]!.field).toBe("resistanceMohm");
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

// the same log as other programs write it
test.each([
  ["a byte order mark and Windows line ends", `\uFEFF${HOURS.replaceAll("\n", "\r\n")}`, "a.csv"],
  ["decimal commas", HOURS.replace("3000", "3000,0").replace("1393", "1393,0"), "a.csv"],
  ["rows in another order", HOURS.replace(/(a;.*)\n(b;.*)/, "$2\n$1"), "a.csv"],
  ["empty rows at the end", `${HOURS}\n\n;;;\n`, "a.csv"],
  ["another ending of the name", HOURS, "log.txt"],
  ["names and words in capitals", HOURS.replace("chemistry;li-fes2", "CHEMISTRY;Li-FeS2"), "A.CSV"],
  ["a zone by name or without its colon", HOURS.replace("+01:00", "+0100"), "a.csv"],
])("%s change nothing", (_, text, name) => {
  const plain = forecastPack(readForecastFile(HOURS, "a.csv"));
  expect(forecastPack(readForecastFile(text, name)).cdfDays).toEqual(plain.cdfDays);
});

test("JSON: what may be left out may also be null, and a byte order mark does not matter", () => {
  const { readings, ...rest } = JSON.parse(example("pack.json"));
  const nulls = readings.map((r: object) => ({
    temperatureDc: null,
    loadUa: null,
    id: null,
    ...r,
  }));
  const text = `\uFEFF${JSON.stringify({ ...rest, events: null, readings: nulls })}`;
  const plain = readForecastFile(example("pack.json"), "pack.json");
  expect(forecastPack(readForecastFile(text, "pack.json"))).toEqual(forecastPack(plain));
  expect(readForecastFile(JSON.stringify({ pack: rest.pack }), "pack.json").readings).toEqual([]);
});

test("volts for millivolts, a negative voltage and a device without draw are refused", () => {
  expect(faultsOf(HOURS.replace(";1393;", ";1.393;"), "a.csv")).toEqual([
    expect.objectContaining({ field: "readings.millivolts", row: 2 }),
  ]);
  expect(faultsOf(HOURS.replace(";1393;", ";-1393;"), "a.csv")[0]).toMatchObject({ row: 2 });
  expect(faultsOf(HOURS.replace("445000", "0"), "a.csv")[0]!.field).toBe("averageUa");
  expect(faultsOf(HOURS.replace("3000", "-3"), "a.csv")[0]!.field).toBe("ratedCapacityMah");
  expect(faultsOf("[]", "a.json")[0]!.field).toBe("file");
});

test("readings of one moment keep names of their own", () => {
  const text = HOURS.replace(/b;.*/, "b;2026-03-01 08:41;1412;loaded");
  const { readings } = readForecastFile(text, "a.csv");
  expect(new Set(readings.map((r) => r.id)).size).toBe(3);
});

test("a log that goes on below the cut-off says between which readings it stopped", () => {
  const text = `${HOURS}\nd;2026-03-01 14:40;980;loaded\ne;2026-03-01 14:50;700;loaded`;
  const input = readForecastFile(text, "a.csv");
  expect(input.events.map((e) => e.kind)).toEqual(["reporting", "stopped"]);
  const { cdfDays, outNow } = forecastPack(input);
  expect(outNow).toBe(1);
  expect(cdfDays[0]).toBeGreaterThanOrEqual(input.readings[2]!.at);
  expect(cdfDays.at(-1)).toBeLessThanOrEqual(input.readings[3]!.at);
  // one low voltage alone may be a slip of the meter
  const once = readForecastFile(text.replace(/\ne;.*/, ""), "a.csv");
  expect(once.events.map((e) => e.kind)).toEqual(["reporting"]);
});

test("windows are told as finely as they deserve, and whole as JSON", () => {
  const hours = forecastPack(readForecastFile(HOURS, "a.csv"));
  expect(reportLines(hours, null)[0]).toMatch(/\d{4}-\d{2}-\d{2} \d{2}:\d{2}$/);
  const months = forecastPack(readForecastFile(example("pack.csv"), "pack.csv"));
  expect(reportLines(months, null)[0]).toMatch(/ \d{4}-\d{2}-\d{2}$/);
  expect(timeText(20_500.123, "second")).toBe("2026-02-16 02:57:07");
  const told = JSON.parse(JSON.stringify(reportJson(hours, null)));
  expect(told.cdf).toHaveLength(50);
  expect(Date.parse(told.quantiles.p50) / 86_400_000).toBeCloseTo(hours.quantiles.p50, 6);
  expect(told.coldSnap).toBeNull();
});

test("a logger's ten thousand readings are weighed in seconds and not taken for as many witnesses", () => {
  const head = HOURS.slice(0, HOURS.indexOf("\na;") + 1);
  const minutes = (k: number): number => (k * 200) / 10_000;
  const at = (k: number): string =>
    new Date(Date.parse("2026-03-01T08:00Z") + minutes(k) * 60_000).toISOString();
  const log = (count: number): string =>
    head +
    Array.from({ length: count }, (_, k) => (k * 10_000) / count + 1)
      .map((k) => `x;${at(k)};${Math.round(1420 - 0.33 * minutes(k))};loaded`)
      .join("\n");
  const began = performance.now();
  const many = forecastPack(readForecastFile(log(10_000), "a.csv")).quantiles;
  expect(performance.now() - began).toBeLessThan(15_000);
  const few = forecastPack(readForecastFile(log(20), "a.csv")).quantiles;
  const ratio = (many.p95 - many.p05) / (few.p95 - few.p05);
  expect(ratio).toBeGreaterThan(0.7);
  expect(ratio).toBeLessThan(1.4);
});

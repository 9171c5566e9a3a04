import fc from "fast-check";
import { expect, test } from "vitest";
import { forecastFaults, forecastPack } from "../../../lib/battery";
import { ageing } from "../../../lib/battery/self-discharge";
import { siteTemperatures } from "../../../lib/battery/site-temperature";
import { isAppError } from "../../../lib/errors";
import { readForecastFile } from "../../../scripts/forecast-file";
import { ER34615, MILD, input, pack } from "./cells";

const daily = (from: number, days: number, dc: (day: number) => number) =>
  Array.from({ length: days + 1 }, (_, d) => ({ at: from + d, temperatureDc: dc(d) }));

test("without a log the climate holds", () => {
  const site = siteTemperatures(MILD);
  expect(site.at(19_000)).toBe(MILD[0]);
  expect(site.lowest(19_000, 19_100)).toBeNull();
  expect(site.ageing.between(19_000, 19_400)).toBe(ageing(MILD).between(19_000, 19_400));
});

// Computed by hand: (2^-2 + 2^2)/2, the figure of two half-years at 0 and 40 °C.
test("half the days at 0 °C and half at 40 °C age 2.125 times as fast, wherever the climate lies", () => {
  const log = [...daily(19_000, 100, () => 0), ...daily(19_100.0001, 100, () => 400)];
  const aged = siteTemperatures(MILD, log).ageing.between(19_000, 19_200);
  expect(aged / 200).toBeCloseTo(2.125, 3);
});

// Closed form: the mean of 2^(x/10) over a line from 0 to 10 K is (2 - 1)/ln 2.
test("between two logged temperatures the rule is integrated over a straight line", () => {
  const log = [
    { at: 19_002, temperatureDc: 300 },
    { at: 19_000, temperatureDc: 200 },
  ];
  const { ageing: aged, at } = siteTemperatures(MILD, log);
  expect(aged.between(19_000, 19_002)).toBeCloseTo(2 / Math.LN2, 9);
  expect(at(19_001)).toBe(250);
});

test("over a long gap the climate holds, and the sum adds up over any division", () => {
  const log = [...daily(19_000, 10, () => 300), ...daily(19_060, 10, () => -50)];
  const site = siteTemperatures(MILD, log);
  expect(site.at(19_030)).toBe(MILD[1]);
  expect(site.logged(19_030)).toBeNull();
  expect(site.lowest(19_058, 19_064)).toBe(-50);
  expect(site.ageing.between(19_010, 19_060)).toBeCloseTo(ageing(MILD).between(19_010, 19_060), 9);
  const day = fc.double({ min: 18_950, max: 19_120, noNaN: true });
  fc.assert(
    fc.property(day, day, day, (a, b, c) => {
      const { between } = site.ageing;
      expect(between(a, b) + between(b, c)).toBeCloseTo(between(a, c), 8);
    }),
  );
});

test("a site logged hotter than its climate loses more charge by itself", () => {
  const spec = pack({
    cell: ER34615,
    series: 1,
    cutoffMv: 3000,
    duty: [{ name: "sleep", currentUa: 100, durationMs: 1 }],
  });
  const base = input({ pack: spec, now: 19_700 });
  const hot = daily(19_000, 700, () => 450);
  const cool = forecastPack(base).shareLeft.p50;
  const { shareLeft } = forecastPack({ ...base, temperatures: hot });
  expect(shareLeft.p50).toBeLessThan(cool - 0.005);
  expect(forecastPack({ ...base, temperatures: [] })).toEqual(forecastPack(base));
});

test("a low loaded voltage is explained by a logged frost", () => {
  const loaded = {
    ...{ id: "a", at: 19_200, millivolts: 3300, kind: "loaded" as const },
    ...{ loadUa: 300_000, temperatureDc: null, accuracyMv: null },
  };
  const base = input({ now: 19_200, readings: [loaded] });
  const frost = daily(19_190, 20, () => -150);
  const without = forecastPack(base).quantiles.p50;
  expect(forecastPack({ ...base, temperatures: frost }).quantiles.p50).toBeGreaterThan(without);
});

test("a device that ran through a logged frost has more left than one that ran in the mild", () => {
  const duty = [
    { name: "sleep", currentUa: 200, durationMs: 1e6 },
    { name: "send", currentUa: 300_000, durationMs: 1 },
  ];
  const base = input({
    pack: pack({ duty }),
    now: 19_260,
    events: [{ kind: "reporting", at: 19_260 }],
  });
  const left = (dc: number): number =>
    forecastPack({ ...base, temperatures: daily(19_250, 10, () => dc) }).shareLeft.p50;
  expect(left(-200)).toBeGreaterThan(left(150));
});

test("temperatures that cannot be are refused by row", () => {
  const temperatures = [
    { at: 19_000, temperatureDc: 50 },
    { at: 19_001, temperatureDc: 5000 },
  ];
  expect(forecastFaults(input({ temperatures }))).toEqual([
    expect.objectContaining({ field: "temperatures.temperatureDc", row: 2 }),
  ]);
});

test("a file may hold them as dated entries", () => {
  const { now, ...rest } = input();
  const file = { ...rest, pack: { ...rest.pack, installedAt: "2022-01-08" } };
  const text = (at: string) =>
    JSON.stringify({ ...file, temperatures: [{ at, temperatureDc: -50 }] });
  expect(now).toBe(19_000);
  expect(readForecastFile(text("2022-01-08 06:00"), "a.json").temperatures).toEqual([
    { at: 19_000.25, temperatureDc: -50 },
  ]);
  try {
    readForecastFile(text("yesterday"), "a.json");
    expect.unreachable();
  } catch (error) {
    if (!isAppError(error)) throw error;
    expect(error.faults[0]).toMatchObject({ field: "temperatures.at", row: 1 });
  }
});

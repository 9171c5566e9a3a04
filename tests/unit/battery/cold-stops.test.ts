import { expect, test } from "vitest";
import { forecastPack } from "../../../lib/battery";
import { coldStops } from "../../../lib/battery/cold-stops";
import { crowds } from "../../../lib/battery/crowding";
import { learnEnds, spent } from "../../../lib/battery/end-lesson";
import { packModel } from "../../../lib/battery/pack-model";
import type { TimeLeft } from "../../../lib/battery/time-left";
import type { PackReading } from "../../../lib/battery/pack";
import { interpolate } from "../../../lib/stats/interpolate";
import { input, pack } from "./cells";

const day = (iso: string): number => Date.parse(`${iso}T00:00:00Z`) / 86_400_000;
const START = day("2026-05-01");

/** All mass at so many days left. */
function timeLeft(days: number): TimeLeft {
  const mass = new Float64Array(240);
  mass[120] = 1;
  return { mass, from: days - 120 * 10, step: 10, ratePerDay: 1e-3, drawPerDay: 1e-3 };
}

/** Ends at 0.9 all the year, but in a January whose hour is severe, as one in `oneIn` is, at 0. */
function januaries(oneIn: number) {
  const months = Array.from({ length: 12 }, (_, m) => [0.9, m === 0 ? 0 : 0.9]);
  return { severities: [1 - 1 / oneIn, 1 / oneIn], resistances: [{ weight: 1, months }] };
}

const course = (until: number) => ({
  ...{ from: START, until, daysPerDepth: 1000, warm: 0.9 },
  progress: (date: number) => date - START,
});

// The geometric law: a thing that each winter ends with chance 1/n lasts k winters with (1 - 1/n)^k.
test.each([2, 4])("a frost that one January in %i brings stops by the geometric law", (oneIn) => {
  // more days left than are looked at, and less than the 900 days that a severe hour takes away
  const { days, chances } = coldStops(timeLeft(880), januaries(oneIn), course(START + 870));
  [2027, 2028].forEach((year, k) => {
    const by = (iso: string): number => interpolate(days, chances, day(iso));
    expect(by(`${year}-02-02`)).toBeCloseTo(1 - (1 - 1 / oneIn) ** (k + 1), 2);
    expect(by(`${year}-12-30`)).toBeCloseTo(by(`${year}-02-02`), 2);
  });
});

test("without frosts the pack stops when its time left is used up", () => {
  const calm = Array.from({ length: 12 }, () => [0.9]);
  const nodes = { severities: [1], resistances: [{ weight: 1, months: calm }] };
  const { days, chances } = coldStops(timeLeft(500), nodes, course(START + 900));
  expect(Math.abs(interpolate(chances, days, 0.5) - (START + 500))).toBeLessThan(8);
});

test("with no mass that could still run nothing is claimed", () => {
  const { chances } = coldStops(timeLeft(-100), januaries(2), course(START + 100));
  expect(chances.every((c) => c === 0)).toBe(true);
});

const FROSTY = pack({
  cutoffMv: 3300,
  monthlyMeanDc: [0, 0, 40, 90, 130, 170, 190, 180, 140, 100, 50, 10],
  duty: [
    { name: "sleep", currentUa: 120, durationMs: 600_000 },
    { name: "send", currentUa: 250_000, durationMs: 60 },
  ],
});

test("what is left is the share that will be used, not what a frost leaves in the cells", () => {
  const now = FROSTY.installedAt + 700;
  const given = input({ pack: FROSTY, now, events: [{ kind: "reporting", at: now - 30 }] });
  const { shareLeft, quantiles } = forecastPack(given);
  // by definition: (time to the likely stop) over (life to the likely stop), the draw being even
  const used = (quantiles.p50 - now) / (quantiles.p50 - FROSTY.installedAt);
  expect(shareLeft.p50).toBeCloseTo(used, 1);
});

// The truth is the test's own: packs that a hard January stopped at a third of their charge, all on
// sheet draw, say that frost stops such devices, not that they draw three times as much.
test("packs that stopped in a frost do not pass for thirsty", () => {
  const stopped = Array.from({ length: 12 }, (_, i) =>
    spent({ ...FROSTY, installedAt: day("2026-03-01") + i * 20 }, day("2028-01-14") + i / 2),
  );
  const mild = Array.from({ length: 12 }, (_, i) =>
    spent({ ...FROSTY, installedAt: day("2026-03-01") + i * 20 }, day("2028-07-14") + i * 9),
  );
  const [frost, summer] = [stopped, mild].map((c) => learnEnds(new Map([["c", c]])).get("c")!);
  expect(frost).toBeGreaterThan(summer!);
});

const reading = (at: number, millivolts: number): PackReading => ({
  ...{ id: `${at}/${millivolts}`, at, millivolts, kind: "resting" },
  ...{ loadUa: null, temperatureDc: 200, accuracyMv: null },
});

test("readings far apart are witnesses of their own; n at one moment share one weight", () => {
  const model = packModel(pack(), null);
  const items = [19_100, 19_300, 19_300, 19_300].map((at) => ({ at, reading: reading(at, 4200) }));
  const found = crowds(model, items);
  expect(items.map(({ reading: r }) => found.get(r))).toEqual([1, 3, 3, 3]);
});

test("a meter read ten times says no more than read once", () => {
  const at = 19_200;
  const once = input({ now: at, readings: [reading(at, 4150)] });
  const often = {
    ...once,
    readings: Array.from({ length: 10 }, (_, k) => ({ ...once.readings[0]!, id: `${k}` })),
  };
  const width = (given: typeof once): number => {
    const { p05, p95 } = forecastPack(given).quantiles;
    return p95 - p05;
  };
  expect(width(often) / width(once)).toBeGreaterThan(0.9);
  expect(width(often) / width(once)).toBeLessThan(1.1);
});

test("where no reading fits, the curve is doubted and not every reading", () => {
  const off = [0, 1, 2, 3, 4, 5].map((k) => reading(19_060 + 60 * k, 4700 - 40 * k));
  const given = input({ now: 19_370, readings: off });
  const { basis } = forecastPack(given);
  expect(basis.doubtfulReadings).toBeLessThanOrEqual(1);
  // one slip among readings that fit stays the reading's fault
  const fitting = [0, 1, 2, 3, 4].map((k) => reading(19_060 + 60 * k, 4400 - 45 * k));
  const slip = forecastPack({ ...given, readings: [...fitting, reading(19_365, 2500)] });
  expect(slip.basis.doubtfulReadings).toBe(1);
});

import { expect, test } from "vitest";
import { drawShifts, forecastFaults, forecastPack, withDrawShift } from "../../../lib/battery";
import { filterPack } from "../../../lib/battery/filter";
import { rateMarginal } from "../../../lib/battery/grid";
import type { ForecastInput } from "../../../lib/battery";
import { input, pack } from "./cells";

const START = 19_000;
const shift = (factor: number, relativeSd = 0.05, at = START + 100) => ({ at, factor, relativeSd });

/** Mean and standard deviation of ln(rate) after all that is known. */
function lnRate(given: ForecastInput): { mean: number; sd: number } {
  const { grid } = filterPack(given);
  const mass = rateMarginal(grid);
  const total = mass.reduce((a, b) => a + b, 0);
  const moment = (power: number, from = 0): number =>
    mass.reduce((s, m, r) => s + m * (grid.lnRate[r]! - from) ** power, 0) / total;
  const mean = moment(1);
  return { mean, sd: Math.sqrt(moment(2, mean)) };
}

// A sum of independent normals: means add, variances add.
test.each([1.5, 1.2, 0.7])(
  "a shift by %s moves ln(rate) by its logarithm, variances adding",
  (f) => {
    const given = input({ now: START + 101 });
    const before = lnRate(given);
    const after = lnRate(withDrawShift(given, shift(f)));
    expect(after.mean - before.mean).toBeCloseTo(Math.log(f), 1);
    expect(after.sd).toBeGreaterThan(before.sd);
    // the shift's own spread is its error and the devices' (0.1), beside the grid's coarseness
    expect(after.sd).toBeLessThan(1.25 * Math.hypot(before.sd, 0.05, 0.1));
  },
);

test("what was drawn before the shift stays drawn; from then on the end comes sooner", () => {
  const given = input({ now: START + 300 });
  const late = forecastPack(withDrawShift(given, shift(1.5, 0.05, START + 299)));
  const early = forecastPack(withDrawShift(given, shift(1.5, 0.05, START + 20)));
  const plain = forecastPack(given);
  expect(late.shareLeft.p50).toBeCloseTo(plain.shareLeft.p50, 1);
  expect(early.shareLeft.p50).toBeLessThan(plain.shareLeft.p50 - 0.02);
  expect(late.quantiles.p50).toBeLessThan(plain.quantiles.p50);
  // (time left) is divided by the factor, by the definition of a rate
  const left = (f: typeof plain): number => f.quantiles.p50 - given.now;
  expect(left(late) / left(plain)).toBeGreaterThan(1 / 1.5 - 0.08);
  expect(left(late) / left(plain)).toBeLessThan(1 / 1.5 + 0.12);
});

test("a pack put in since the shift starts with it; a later one waits", () => {
  const given = input({ now: START + 10 });
  const since = forecastPack(withDrawShift(given, shift(1.5, 0.05, START - 50)));
  expect(since.quantiles.p50).toBeLessThan(forecastPack(given).quantiles.p50);
  const coming = withDrawShift(given, shift(1.5, 0.05, START + 50));
  const spread = (f: ForecastInput): number => lnRate(f).mean;
  expect(spread(coming)).toBeCloseTo(spread(given), 2);
});

test("a draw measured since then stands; one measured before does not", () => {
  const given = input({
    pack: pack({ measuredDraw: { averageUa: 200, relativeSd: 0.05 } }),
    now: START + 200,
  });
  expect(withDrawShift(given, shift(1.5), START + 150)).toBe(given);
  expect(withDrawShift(given, shift(1.5), START + 50).drawShifts).toHaveLength(1);
});

test("a registered change shortly before is its cause", () => {
  const given = input({ now: START + 300, events: [{ at: START + 60, kind: "draw-changed" }] });
  expect(withDrawShift(given, shift(1.5)).drawShifts![0]!.at).toBe(START + 60);
  expect(withDrawShift(given, shift(1.5, 0.05, START + 290)).drawShifts![0]!.at).toBe(START + 290);
});

test("a finding goes straight in, with the error that its packs leave", () => {
  const observations = Array.from({ length: 60 }, (_, k) => ({
    ...{ packKey: `p${k}`, model: "m", at: START + 5 * k, sd: 0.1 },
    lnFactor: (k < 30 ? 0 : Math.log(1.4)) + (k % 2 === 0 ? 0.1 : -0.1),
  }));
  const [found] = drawShifts(observations);
  // two means of 30 with a spread of 0.1 each: 0.1 √(2/30) = 0.0258
  expect(found!.relativeSd).toBeGreaterThan(0.02);
  expect(found!.relativeSd).toBeLessThan(0.032);
  const moved = withDrawShift(input({ now: START + 290 }), found!);
  expect(moved.drawShifts![0]).toMatchObject({ at: found!.at, factor: found!.factor });
  expect(forecastPack(moved).quantiles.p50).toBeLessThan(
    forecastPack(input({ now: START + 290 })).quantiles.p50,
  );
});

test("factors that cannot be are refused by row", () => {
  expect(forecastFaults(input({ drawShifts: [shift(1.2), shift(-1)] }))).toEqual([
    expect.objectContaining({ field: "drawShifts.factor", row: 2 }),
  ]);
});

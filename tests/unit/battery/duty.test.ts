import { expect, test } from "vitest";
import {
  averageUa,
  holdUpCapacitorUf,
  packAverageUa,
  packPeakUa,
  peakUa,
  periodChargeUah,
} from "../../../lib/battery/duty";
import { pack } from "./cells";

const phase = (ma: number, ms: number) => ({ name: "", currentUa: ma * 1000, durationMs: ms });

// Public note "Battery Life Estimation" (52160872490): six phases of a radio node. The page
// prints 0.03747 uAh and 2.25 uA; its own phases sum to 0.5 % more, which is checked here.
const NODE = [
  phase(0.0015, 59_988),
  phase(5, 0.5),
  phase(1.8, 3),
  phase(8.5, 3.6),
  phase(4.2, 1.5),
  phase(2, 0.4),
];

test("weighted average current of a radio node", () => {
  expect(averageUa(NODE)).toBeCloseTo(2.259813, 3);
  expect(periodChargeUah(NODE)).toBeCloseTo(0.0376617, 6);
  expect(Math.abs(averageUa(NODE) / 2.25 - 1)).toBeLessThan(0.006);
});

test("peak is the highest state that lasts", () => {
  expect(peakUa(NODE)).toBeCloseTo(8500, 6);
  expect(peakUa([phase(50, 0), phase(1, 1)])).toBe(1000);
});

test("an empty cycle draws nothing", () => {
  expect(averageUa([])).toBe(0);
  expect(peakUa([])).toBe(0);
});

test("a measured draw overrides the cycle's average and bounds its peak", () => {
  const measured = { averageUa: 118, relativeSd: 0.05 };
  expect(packAverageUa(pack({ measuredDraw: measured }))).toBe(118);
  expect(packPeakUa(pack({ measuredDraw: measured, duty: [] }))).toBe(118);
});

// C = I dt/dV (worked example in a public forum, 2012): 30 mA, 20 ms, 0.3 V need 2 mF.
test("hold-up capacitor", () => {
  expect(holdUpCapacitorUf(30_000, 20, 300)).toBeCloseTo(2000, 9);
});

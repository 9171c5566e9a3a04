import { describe, expect, test } from "vitest";
import {
  capacityPoints,
  dischargeHours,
  grossCapacity,
  usableCapacity,
} from "../../../lib/battery/capacity";
import type { CellSpec } from "../../../lib/battery/pack";
import { peukertExponent, peukertHours } from "../../../lib/battery/peukert";
import { selfDischargeUa } from "../../../lib/battery/self-discharge";
import { ER34615, LR6, point } from "./cells";

const LINDEN = "Linden & Reddy, Linden's Handbook of Batteries 4e, 2011, Fig. 14.17, p. 14.30";

describe(LINDEN, () => {
  test.each([
    [35, 7],
    [20, 13.5],
    [4, 19],
    [2, 18.8],
    [1, 18.4],
    [0.2, 17],
  ])("%f mA gives %f Ah", (ma, ah) => {
    expect(usableCapacity(ER34615, ma * 1000, 2000, 250) / 1000).toBeCloseTo(ah, 1);
  });

  test("between measured currents the capacity lies between theirs, halfway in log current", () => {
    const middle = Math.sqrt(20_000 * 4000);
    expect(usableCapacity(ER34615, middle, 2000, 250)).toBeCloseTo((13_500 + 19_000) / 2, 6);
  });

  test("outside the table nothing is extrapolated", () => {
    expect(usableCapacity(ER34615, 1, 2000, 250)).toBe(17_000);
    expect(usableCapacity(ER34615, 1e9, 2000, 250)).toBe(7000);
  });

  // Computed from the figure: C(I) = Q0/(1 + s/I) with Q0 = 19 Ah at 0.2 mA.
  test("the fall at low current is self-discharge: 23.5 uA, 1.09 % a year", () => {
    const leak = 200 * (19 / 17 - 1);
    expect(leak).toBeCloseTo(23.529, 2);
    expect(selfDischargeUa(19_000, 10_860)).toBeCloseTo(leak, 1);
    expect(grossCapacity(ER34615, 200, 2000, 250)).toBeCloseTo(19_000, -1.5);
  });

  test.each([
    [35, 20, 7, 13.5, 2.1736],
    [20, 4, 13.5, 19, 1.2123],
    [4, 2, 19, 18.8, 0.9847],
    [2, 1, 18.8, 18.4, 0.969],
    [1, 0.2, 18.4, 17, 0.9508],
  ])("Peukert's exponent is no constant: %f to %f mA", (a, b, ca, cb, k) => {
    expect(peukertExponent(a, ca, b, cb)).toBeCloseTo(k, 3);
  });
});

// Newton1026/BatteryProject logs of an FR6 at 15 and 3 ohm to 0.9 V, dhennessy's at 5.5 ohm.
describe("FR6, measured", () => {
  test("Peukert's exponent from 97 to 445 mA", () => {
    expect(peukertExponent(96.54, 3073.9, 445.31, 2988.9)).toBeCloseTo(1.01834, 3);
  });

  test("the table between its ends holds the third log", () => {
    const fr6: CellSpec = {
      ...LR6,
      chemistry: "li-fes2",
      rated: point(96_540, 3073.9, 900),
      capacityTable: [point(445_310, 2988.9, 900)],
    };
    // 5.5 ohm at a mean of 1.4 V: 255 mA, 3036.9 mAh
    expect(Math.abs(usableCapacity(fr6, 255_000, 900, 200) - 3036.9)).toBeLessThan(20);
  });
});

// Common practice, no source: a cell rated 1 Ah in the range of 50-100 mA.
describe("common practice, no source", () => {
  const cell: CellSpec = {
    ...LR6,
    rated: point(100_000, 1000),
    capacityTable: [point(10_000, 1350), point(50_000, 1000), point(1_000_000, 750)],
    selfDischargePpmPerYear: 20_000,
  };
  test.each([
    [50, 19, 21],
    [100, 9.5, 10.5],
    [75, 13, 15],
    [1000, 0.7, 0.8],
    [10, 120, 150],
  ])("%f mA lasts between %f and %f hours", (ma, low, high) => {
    const hours = dischargeHours(cell, ma * 1000, 800, 200);
    expect(hours).toBeGreaterThanOrEqual(low);
    expect(hours).toBeLessThanOrEqual(high);
  });

  test("a cell known by its rating alone is not credited with more at low current", () => {
    expect(usableCapacity(LR6, 10, 800, 200)).toBe(2800);
  });

  test("a higher cut-off in the table gives less", () => {
    const two = { ...LR6, capacityTable: [point(25_000, 2300, 1100)] };
    expect(usableCapacity(two, 25_000, 1100, 200)).toBe(2300);
    expect(usableCapacity(two, 25_000, 950, 200)).toBeCloseTo(2550, 6);
    expect(usableCapacity(two, 25_000, 1200, 200)).toBe(2300);
  });
});

// Public note 52160872490, judged as rough: LR6 .80/.60/.40 at 0/-10/-20 °C.
test.each([
  [0, 0.8],
  [-100, 0.6],
  [-200, 0.4],
])("LR6 at %f tenths of a degree", (dc, share) => {
  expect(usableCapacity(LR6, 25_000, 800, dc) / 2800).toBeCloseTo(share, 6);
});

test("a table with several temperatures is interpolated, not derated twice", () => {
  const cell = { ...LR6, capacityTable: [point(25_000, 1400, 800, 0)] };
  expect(usableCapacity(cell, 25_000, 800, 100)).toBeCloseTo(2100, 6);
  expect(usableCapacity(cell, 25_000, 800, -300)).toBe(1400);
});

test("every point of the table counts, the rated one too", () => {
  expect(capacityPoints(ER34615)).toHaveLength(6);
});

// PRO ELEC PSG90906: CR2032, 3 kilo-ohm to 2.0 V, 200 h new and 196 h after a year.
test("CR2032 shelf loss of 2 % a year", () => {
  const afterYear = 200 * (1 - (selfDischargeUa(235, 20_000) * 8766) / 1000 / 235);
  expect(afterYear).toBeCloseTo(196, 9);
});

// The formula's own identity: at the rated current the rated hours come out.
test("Peukert's law at the rated current", () => {
  expect(peukertHours(100, 5, 20, 1.2)).toBeCloseTo(20, 9);
  expect(peukertHours(100, 10, 20, 1.2)).toBeCloseTo(10 * 0.5 ** 0.2, 9);
});

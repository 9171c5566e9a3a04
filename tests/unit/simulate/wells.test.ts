import { describe, expect, it } from "vitest";
import { drain, fullWells, leak, nearLevel, type WellConstants } from "@/scripts/simulate/wells";

/** Repeats loads of so many units of time each until the near well is empty; time to the third digit. */
function lifetime(
  capacity: number,
  k: WellConstants,
  loads: readonly (readonly [number, number])[],
) {
  let wells = fullWells(capacity, k.share);
  let time = 0;
  for (let i = 0; i < 1_000_000; i++) {
    const [current, span] = loads[i % loads.length] as readonly [number, number];
    const after = drain(wells, k, current, span);
    if (after.near <= 0) {
      let [low, high] = [0, span];
      for (let n = 0; n < 40; n++) {
        const middle = (low + high) / 2;
        if (drain(wells, k, current, middle).near > 0) low = middle;
        else high = middle;
      }
      return time + low;
    }
    wells = after;
    time += span;
  }
  throw new Error("never empty");
}

/**
 * Lifetimes in minutes of Jongerden, Haverkort, Bohnenkamp, Katoen, "Maximizing system lifetime
 * by battery scheduling", DSN 2009 (values from memory; the model is exact, so they are checked
 * to their last digit). Capacities in A·min, k' per minute.
 */
describe("two wells against the published kinetic model", () => {
  const k = { share: 0.166, ratePerHour: 0.122 };
  const on = (a: number, b = 0): [number, number][] => [
    [a, 1],
    ...(b ? [[b, 1] as [number, number]] : []),
  ];
  const cases: [string, [number, number][], number, number][] = [
    ["CL250", on(0.25), 4.53, 12.16],
    ["CL500", on(0.5), 2.02, 4.53],
    [
      "ILs250",
      [
        [0.25, 1],
        [0, 1],
      ],
      10.8,
      44.78,
    ],
    [
      "ILs500",
      [
        [0.5, 1],
        [0, 1],
      ],
      4.3,
      10.8,
    ],
    [
      "ILsalt",
      [
        [0.5, 1],
        [0, 1],
        [0.25, 1],
        [0, 1],
      ],
      4.8,
      16.93,
    ],
    [
      "ILl500",
      [
        [0.5, 1],
        [0, 2],
      ],
      6.53,
      21.86,
    ],
  ];
  it.each(cases)("%s", (_, loads, small, large) => {
    expect(lifetime(5.5, k, loads)).toBeCloseTo(small, 2);
    expect(lifetime(11, k, loads)).toBeCloseTo(large, 2);
  });

  // Cloth, Jongerden, Haverkort, DSN 2007 (c = 0.625, k = 4.5e-5/s, 7200 A·s, 0.96 A; from memory).
  it("gives 91 minutes without a break and 203 at one hertz, half on and half off", () => {
    const share = 0.625;
    const perSecond = { share, ratePerHour: 4.5e-5 / (share * (1 - share)) };
    expect(lifetime(7200, perSecond, [[0.96, 60]]) / 60).toBeCloseTo(91.1, 0);
    const pulsed =
      lifetime(7200, perSecond, [
        [0.96, 0.5],
        [0, 0.5],
      ]) / 60;
    expect(Math.abs(pulsed - 202.94)).toBeLessThan(0.2);
  });
});

describe("conservation", () => {
  // Charge out equals current times time: the balance of the model's two equations.
  it("takes out of the wells exactly what the load drew", () => {
    const wells = fullWells(1000, 0.4);
    const after = drain(wells, { share: 0.4, ratePerHour: 0.2 }, 7, 13);
    expect(after.near + after.far).toBeCloseTo(1000 - 7 * 13, 9);
  });

  it("keeps the heights equal while nothing is drawn", () => {
    const rested = drain(fullWells(500, 0.3), { share: 0.3, ratePerHour: 1 }, 0, 100);
    expect(nearLevel(rested, 500, 0.3)).toBeCloseTo(1, 12);
    expect(nearLevel(leak(rested, 0.1), 500, 0.3)).toBeCloseTo(0.9, 12);
  });
});

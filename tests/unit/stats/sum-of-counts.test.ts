import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { poissonBinomial } from "@/lib/stats/poisson-binomial";
import { type CountLaw, sumOfCounts } from "@/lib/stats/sum-of-counts";

const chance = fc.double({ min: 0, max: 1, noNaN: true });

describe("sum of counts", () => {
  it("with steps of one and two outcomes is the Poisson-binomial law", () => {
    fc.assert(
      fc.property(fc.array(chance, { minLength: 1, maxLength: 30 }), (chances) => {
        const { unit, mass } = sumOfCounts(chances.map((p) => ({ step: 1, chances: [1 - p, p] })));
        expect(unit).toBe(1);
        const reference = poissonBinomial(chances);
        reference.forEach((p, k) => expect(mass[k] ?? 0).toBeCloseTo(p, 9));
      }),
    );
  });

  it("two dice by hand: 2 to 12 in 36ths (as counts 0 to 5 each)", () => {
    const die: CountLaw = { step: 1, chances: Array.from({ length: 6 }, () => 1 / 6) };
    const { mass } = sumOfCounts([die, die]);
    [1, 2, 3, 4, 5, 6, 5, 4, 3, 2, 1].forEach((ways, k) =>
      expect(mass[k]).toBeCloseTo(ways / 36, 12),
    );
  });

  it("counts packs of 2 and of 4 cells in pairs", () => {
    const { unit, mass } = sumOfCounts([
      { step: 2, chances: [0.5, 0.5] },
      { step: 4, chances: [0.75, 0.25] },
    ]);
    expect(unit).toBe(2);
    expect([...mass]).toEqual([0.375, 0.375, 0.125, 0.125]);
  });

  it("has the mean and variance that independent sums have", () => {
    const law = fc
      .record({ step: fc.integer({ min: 1, max: 6 }), p: chance, q: chance })
      .map(({ step, p, q }): CountLaw => ({ step, chances: [1 - p, p * (1 - q), p * q] }));
    fc.assert(
      fc.property(fc.array(law, { maxLength: 20 }), (laws) => {
        const { unit, mass } = sumOfCounts(laws);
        const moment = (weigh: (n: number) => number) =>
          mass.reduce((sum, p, k) => sum + p * weigh(k * unit), 0);
        const mean = moment((n) => n);
        const own = laws.map(({ step, chances }) => {
          const m = chances.reduce((sum, p, k) => sum + p * k * step, 0);
          const square = chances.reduce((sum, p, k) => sum + p * (k * step) ** 2, 0);
          return { mean: m, variance: square - m * m };
        });
        expect(mean).toBeCloseTo(
          own.reduce((sum, o) => sum + o.mean, 0),
          6,
        );
        const variance = moment((n) => (n - mean) ** 2);
        expect(variance).toBeCloseTo(
          own.reduce((sum, o) => sum + o.variance, 0),
          5,
        );
      }),
    );
  });

  it("of nothing is certainly nothing; refuses laws that are none", () => {
    expect([...sumOfCounts([]).mass]).toEqual([1]);
    expect(() => sumOfCounts([{ step: 1, chances: [0.5, 0.2] }])).toThrow("sum to 1");
    expect(() => sumOfCounts([{ step: 0, chances: [1] }])).toThrow("step 0");
  });
});

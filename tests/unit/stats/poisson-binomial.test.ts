import fc from "fast-check";
import { binomialDistribution } from "simple-statistics";
import { describe, expect, it } from "vitest";
import { countQuantile, poissonBinomial } from "@/lib/stats/poisson-binomial";

describe("Poisson-binomial", () => {
  it("equals the binomial law when all chances are equal (reference: simple-statistics)", () => {
    const mass = poissonBinomial(Array.from({ length: 12 }, () => 0.3));
    const reference = binomialDistribution(12, 0.3) ?? [];
    expect(reference.length).toBeGreaterThan(6);
    reference.forEach((probability, k) => expect(mass[k]).toBeCloseTo(probability, 12));
  });

  it("two unequal coins by hand: 0.2 and 0.5 give 0.4, 0.5, 0.1", () => {
    expect([...poissonBinomial([0.2, 0.5])]).toEqual([0.4, 0.5, 0.1]);
  });

  it("sums to one and has mean Σp, whatever the chances", () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { maxLength: 60 }), (p) => {
        const mass = poissonBinomial(p);
        const total = mass.reduce((sum, m) => sum + m, 0);
        const mean = mass.reduce((sum, m, k) => sum + k * m, 0);
        expect(total).toBeCloseTo(1, 9);
        expect(mean).toBeCloseTo(
          p.reduce((sum, chance) => sum + chance, 0),
          8,
        );
      }),
    );
  });

  it("with many small chances its 95 % quantile is the Poisson reorder point for mean 6: 10", () => {
    // Poisson quantile: cdf(10; 6) = 0.957379, cdf(9; 6) = 0.916076 (standard tables).
    const mass = poissonBinomial(Array.from({ length: 6000 }, () => 0.001));
    expect(countQuantile(mass, 0.95)).toBe(10);
  });

  it("refuses a chance that is none", () => {
    expect(() => poissonBinomial([1.2])).toThrow("chance 0 is 1.2");
  });
});

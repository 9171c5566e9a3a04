import { describe, expect, it } from "vitest";
import { expectedEnds, reliabilityCurve } from "@/lib/stats/reliability";

/** The "aml, maintained" arm on a scale of 0..1; R 4.2.2 survival 3.5-3 prints the estimates. */
const months = [9, 13, 13, 18, 23, 28, 31, 34, 45, 48, 161];
const ended = [1, 1, 0, 1, 1, 0, 1, 1, 0, 1, 0];
const aml = months.map((month, i) => ({ chance: month / 200, ended: ended[i] === 1 }));

describe("reliability of stated end dates", () => {
  it("is one less Kaplan-Meier on the scale of the stated chance (R's aml estimates)", () => {
    const points = reliabilityCurve(aml, [23 / 200, 34 / 200]);
    // Printed by R: S(23) = .613636, S(34) = .368182.
    expect(points[0]?.observed).toBeCloseTo(1 - 0.613636, 5);
    expect(points[1]?.observed).toBeCloseTo(1 - 0.368182, 5);
    expect(points[0]?.low).toBeLessThan(points[0]?.observed ?? 0);
  });

  it("lies on the diagonal for evenly spread ends, alive ones or not", () => {
    const even = Array.from({ length: 1000 }, (_, i) => ({
      chance: (i + 0.5) / 1000,
      ended: true,
    }));
    // Every pack once more, taken out alive at a time that has nothing to do with its end.
    const censored = even.map(({ chance }, i) => {
      const out = ((i * 617) % 1000) / 1000;
      return out < chance ? { chance: out, ended: false } : { chance, ended: true };
    });
    for (const stated of [even, censored]) {
      for (const point of reliabilityCurve(stated)) {
        expect(point.observed).toBeGreaterThan(point.forecast - 0.05);
        expect(point.observed).toBeLessThan(point.forecast + 0.05);
      }
    }
  });

  it("expects as many ends as there are when u is uniform: the mean of -ln(1-u) is 1", () => {
    const even = Array.from({ length: 400 }, (_, i) => ({ chance: (i + 0.5) / 400, ended: true }));
    const { mean, spread } = expectedEnds(even);
    expect(Math.abs(mean - 400)).toBeLessThan(spread);
  });

  it("says nothing where nothing has been seen", () => {
    expect(reliabilityCurve([])).toEqual([]);
  });
});

import { describe, expect, it } from "vitest";
import { brierScore, reliabilityBins } from "@/lib/stats/reliability";

const stated = (chance: number, hits: number, count: number) =>
  Array.from({ length: count }, (_, i) => ({ chance, cameTrue: i < hits }));

describe("reliability", () => {
  it("lays the share that came true beside the mean stated chance, with Wilson's interval", () => {
    // Wilson 95 % for 86 of 100: .778628 to .914737 (computed from the formula);
    // the 90 % interval must lie inside it and around 0.86.
    const [bin] = reliabilityBins(stated(0.85, 86, 100));
    expect(bin).toMatchObject({ observed: 0.86, count: 100 });
    expect(bin?.forecast).toBeCloseTo(0.85, 12);
    expect(bin?.low).toBeGreaterThan(0.778628);
    expect(bin?.high).toBeLessThan(0.914737);
  });

  it("puts an edge in the upper bin, and certainty in the last", () => {
    const bins = reliabilityBins([...stated(0.5, 1, 2), ...stated(1, 2, 2)], [0, 0.5, 1]);
    expect(bins).toHaveLength(1);
    expect(bins[0]?.count).toBe(4);
  });

  it("Brier's score by hand: 0.7 rain and rain, 0.3 and none: 0.09", () => {
    expect(
      brierScore([
        { chance: 0.7, cameTrue: true },
        { chance: 0.3, cameTrue: false },
      ]),
    ).toBeCloseTo(0.09, 12);
  });
});

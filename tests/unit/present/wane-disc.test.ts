import { describe, expect, it } from "vitest";
import { packTone, SOON_DAYS } from "@/lib/present/tone";
import { DISC_RADIUS, waneDisc } from "@/lib/present/wane-disc";
import { areaWithin, pointsAlong } from "../../support/svg-path";

const disc = (share: number | null, isOut = false) =>
  waneDisc({ share, isOut, tone: "order", locale: "en-GB" });

describe("waneDisc", () => {
  const whole = Math.PI * DISC_RADIUS ** 2;
  it("lights exactly the share of the disc's area, measured along the path it draws", () => {
    for (let percent = 1; percent <= 100; percent += 1) {
      const lit = areaWithin(pointsAlong(disc(percent / 100).litPath ?? ""));
      // Within 1 % of the disc, and for thin crescents within 1 % of themselves.
      expect(Math.abs(lit / whole - percent / 100), `${percent} %`).toBeLessThan(
        0.01 * (percent / 100),
      );
    }
  });
  it("wanes: the light stays at the left, and its right edge draws back", () => {
    const edge = (share: number) => {
      const middle = pointsAlong(disc(share).litPath ?? "").filter((p) => Math.abs(p.y) < 0.05);
      return Math.max(...middle.map((p) => p.x));
    };
    expect(Math.min(...pointsAlong(disc(0.1).litPath ?? "").map((p) => p.x))).toBeCloseTo(-10, 3);
    expect(edge(0.9)).toBeGreaterThan(edge(0.6));
    expect(edge(0.6)).toBeGreaterThan(0);
    expect(edge(0.4)).toBeLessThan(0);
    expect(edge(0.1)).toBeLessThan(edge(0.4));
  });
  it("draws a cross when out and claims nothing when nothing is known", () => {
    expect(disc(0.2, true)).toMatchObject({
      state: "out",
      tone: "out",
      label: "out",
      litPath: null,
    });
    expect(disc(null)).toMatchObject({ state: "unknown", tone: "quiet", label: "not known" });
    expect(disc(0)).toMatchObject({ state: "lit", litPath: null });
  });
});

describe("packTone", () => {
  it("is one tone by when the pack is likely to reach cut-off", () => {
    expect(packTone({ isOut: true, daysToLikely: 90 })).toBe("out");
    expect(packTone({ isOut: false, daysToLikely: 0 })).toBe("out");
    expect(packTone({ isOut: false, daysToLikely: SOON_DAYS })).toBe("soon");
    expect(packTone({ isOut: false, daysToLikely: SOON_DAYS + 1 })).toBe("order");
    expect(packTone({ isOut: false, daysToLikely: null })).toBe("quiet");
  });
});

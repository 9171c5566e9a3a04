/** Causes of surprises, and the plot of said against found; expected values by hand. */
import { describe, expect, test } from "vitest";
import { predictionPlot } from "@/lib/present/prediction-plot";
import { surpriseCause, type SurpriseInput } from "@/lib/present/surprise-cause";

const FEN = [35, 38, 60, 85, 120, 150, 170, 168, 140, 105, 65, 42];
const pack: SurpriseInput = {
  ...{ stopped: true, endedOn: "2026-06-10", reasonOut: "found_stopped", readings: 4 },
  ...{ monthlyMeanDc: FEN, weakLot: null, drawShiftSince: null, drawFactor: null },
};
const cause = (changed: Partial<SurpriseInput>) => surpriseCause({ ...pack, ...changed }, "en-GB");

describe("why a pack surprised", () => {
  const shift = { drawShiftSince: "2026-08-06", drawFactor: 1.34 };
  test.each([
    [{ weakLot: "LR6-010" }, "its lot LR6-010 is weak"],
    [shift, "its model draws more since about 6 Aug 2026"],
    [{ ...shift, endedOn: "2025-06-10" }, "not explained"],
    [{ ...shift, stopped: false }, "draws less, or holds more, than its sheets say"],
    [{ endedOn: "2026-01-20" }, "stopped in the coldest months"],
    [{ endedOn: "2026-01-20", monthlyMeanDc: FEN.map((dc) => dc + 200) }, "not explained"],
    [{ readings: 0 }, "no voltage was taken: only the data sheet spoke"],
    [{ reasonOut: "fault", weakLot: "L" }, "came out for a fault: perhaps not the cells"],
    [{}, "not explained"],
  ])("%o", (changed, words) => expect(cause(changed)).toBe(words));
});

describe("said against found", () => {
  const dot = (saidDays: number, foundDays: number, stopped = true) => ({
    ...{ key: `${saidDays}-${foundDays}`, saidDays, foundDays, stopped },
  });
  const model = predictionPlot([dot(365, 365), dot(91, 365), dot(30, 7, false)], "en-GB");
  const { left, right, top, bottom } = model.plot;

  test("what came true lies on the diagonal, what lasted longer above it", () => {
    const [sound, longer] = model.dots;
    const share = (sound!.x - left) / (right - left);
    expect((bottom - sound!.y) / (bottom - top)).toBeCloseTo(share, 2);
    expect(longer!.y).toBe(sound!.y);
    expect(longer!.x).toBeLessThan(sound!.x);
  });

  test("counts those that stopped within half to twice the days said", () => {
    expect(model.description.replaceAll("\u00a0", " ")).toBe(
      "2 packs had stopped; 50 % of them after half to twice the days said",
    );
    expect(predictionPlot([], "en-GB").description).toBe("no pack has stopped yet");
  });

  test("stays within its frame, and draws a bounded number", () => {
    const many = Array.from({ length: 5000 }, (_, i) => dot(i - 100, i * 3));
    const { dots } = predictionPlot(many, "en-GB");
    expect(dots.length).toBeLessThanOrEqual(601);
    for (const { x, y } of dots) {
      expect(x >= left && x <= right && y >= top && y <= bottom).toBe(true);
    }
  });
});

import { describe, expect, it } from "vitest";
import type { BenchAsset } from "@/scripts/bench/policy/fleet";
import { bestInspections, bestIntervals, type TrainingLife } from "@/scripts/bench/policy/training";
import { DEVICE_MODELS } from "@/scripts/simulate/scenario/device-models";

const asset = { model: DEVICE_MODELS[0], tag: "LG2-001" } as BenchAsset;

function life(days: number, more: Partial<TrainingLife> = {}): TrainingLife {
  return { asset, days, restingMv: [], plannedMinor: 1, failedMinor: 5, lookMinor: 0, ...more };
}

describe("the simple policies' settings", () => {
  it("find the published age of replacement from a sample of lives", () => {
    // Source: documentation of the Python package `reliability`, "Optimal replacement time": Weibull
    // shape 2.5, scale 1000, costs 1 and 5; exact optimum 493.047. 2,000 evenly spread quantiles.
    const lives = Array.from({ length: 2000 }, (_, i) =>
      life(1000 * (-Math.log(1 - (i + 0.5) / 2000)) ** (1 / 2.5)),
    );
    const best = bestIntervals(lives).get(asset.model.code)!;
    expect(Math.abs(best - 493.047)).toBeLessThan(10);
  });

  it("never renew by age where a failure costs no more", () => {
    // Barlow & Proschan 1965: a planned renewal pays only when it is cheaper than a failure.
    const lives = [200, 300, 400, 500].map((days) => life(days, { failedMinor: 1 }));
    expect(bestIntervals(lives).get(asset.model.code)).toBe(Infinity);
  });

  it("swap below the voltage that comes before every stop, where looks are free", () => {
    // By hand: lives of 100, 200 and 300 days fall by 10 mV a week, from 10 mV a week left.
    const lives = [98, 196, 294].map((days) =>
      life(days, {
        failedMinor: 1000,
        restingMv: Array.from({ length: days / 7 + 1 }, (_, week) => (days / 7 - week) * 10),
      }),
    );
    const rule = bestInspections(lives).get(asset.model.code)!;
    expect(rule.everyDays).toBe(28);
    expect(rule.belowMv).toBeGreaterThan(10);
    expect(rule.belowMv).toBeLessThan(120);
  });
});

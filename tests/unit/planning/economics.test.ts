import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { bestAge } from "@/lib/planning/age-replacement";
import { bestInterval, shiftPenalty, worthGrouping } from "@/lib/planning/grouping";
import { chanceOutBy, meanLife } from "@/lib/planning/life";
import { longRunPremium } from "@/lib/planning/long-run";
import { waitingPack } from "@/lib/planning/outlook";
import {
  costOfFailure,
  costOfStopping,
  priceVisit,
  waitingCostPerWeek,
} from "@/lib/planning/waiting-cost";
import { PRICES } from "./district";

describe("age replacement (Barlow & Proschan 1965)", () => {
  // Source: documentation of the Python package `reliability`, "Optimal replacement time", after a
  // ReliaWiki example: Weibull shape 2.5, scale 1000, costs 1 and 5. It prints 493.19 and 0.0035
  // from a grid; the exact minimum is 493.047 at 0.00346204, recomputed independently in Python.
  const weibull = (age: number) => 1 - Math.exp(-((age / 1000) ** 2.5));
  const best = bestAge(weibull, { planned: 1, failed: 5 }, 6000);

  it("finds the published optimum", () => {
    expect(best.age).toBeCloseTo(493.047, 1);
    expect(Math.abs(best.age - 493.19)).toBeLessThan(0.5);
    expect(best.costRate / 0.00346204).toBeCloseTo(1, 5);
    expect(best.runToFailureRate / 0.0056353).toBeCloseTo(1, 4);
  });

  it("waits for the failure where wear does not grow", () => {
    // Barlow & Proschan: with a constant hazard no planned renewal pays.
    const exponential = (age: number) => 1 - Math.exp(-age / 100);
    const never = bestAge(exponential, { planned: 1, failed: 5 }, 4000);
    expect(never.age).toBe(Infinity);
    expect(never.costRate).toBeCloseTo(5 / 100, 6);
  });
});

describe("grouping (Wildeman, Dekker & Smit 1997)", () => {
  // Formula of EJOR 99:530-551 (from memory); figures recomputed independently in Python for
  // M(x) = 100 (x / 365)², planned cost 30 and a trip of 45.
  const failures = (age: number) => 100 * (age / 365) ** 2;
  const best = bestInterval(failures, 75, 2000);

  it("finds the interval and its cost rate", () => {
    expect(best.age).toBeCloseTo(316.09927, 2);
    expect(best.costRate).toBeCloseTo(0.47453447, 8);
  });

  it("prices a shift either way", () => {
    expect(shiftPenalty(failures, best, 30)).toBeCloseTo(0.6755489, 4);
    expect(shiftPenalty(failures, best, -30)).toBeCloseTo(0.6755489, 4);
    expect(shiftPenalty(failures, best, 60)).toBeCloseTo(2.7021955, 4);
  });

  it("groups jobs whose penalties are below the trips saved", () => {
    expect(worthGrouping(45, [0.68, 2.7])).toBe(true);
    expect(worthGrouping(2, [0.68, 2.7])).toBe(false);
    expect(worthGrouping(45, [0])).toBe(false);
  });
});

describe("what service costs in the long run", () => {
  it("is what age replacement makes of log-normal lives", () => {
    // Barlow & Proschan's rate times the mean life over the planned cost, for ln(life) of spread
    // 0.17 and a failure that costs 0.5 to 10 cycles more: minimised independently in Python (trapezoid,
    // 20,000 ages). Ratios are rounded to 5 %, which moves the figure by less than 1 %.
    const recomputed = [
      [0.5, 1.31006],
      [1, 1.39808],
      [2, 1.47932],
      [5, 1.57844],
      [10, 1.64872],
    ] as const;
    for (const [ratio, premium] of recomputed) {
      expect(Math.abs(longRunPremium(100 * ratio, 100) / premium - 1)).toBeLessThan(0.01);
    }
  });

  it("is the plain cost of a cycle over its life where a failure costs nothing more", () => {
    expect(longRunPremium(0, 100)).toBe(1);
    expect(longRunPremium(100, 0)).toBe(1);
  });

  it("never costs more than waiting for every failure", () => {
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 50, noNaN: true }), (ratio) => {
        const premium = longRunPremium(ratio * 100, 100);
        expect(premium).toBeGreaterThanOrEqual(1);
        // Running to failure costs 1 + ratio a cycle; a little more for the rounding of ratios.
        expect(premium).toBeLessThanOrEqual((1 + ratio) * 1.03);
      }),
      { seed: 20261205 },
    );
  });
});

describe("the life of a pack", () => {
  const uniform = Array.from({ length: 50 }, (_, i) => 100 + (i + 0.5) * 2);

  it("reads chances and means off the quantiles", () => {
    // Uniform on 100..200: F(150) = 1/2, F(125) = 1/4, mean 150 (elementary).
    expect(chanceOutBy(uniform, 150)).toBeCloseTo(0.5, 10);
    expect(chanceOutBy(uniform, 125)).toBeCloseTo(0.25, 10);
    expect(meanLife(uniform)).toBeCloseTo(150, 10);
    expect(chanceOutBy(uniform, 99)).toBe(0);
    expect(chanceOutBy(uniform, 201)).toBe(1);
  });
});

describe("what waiting costs", () => {
  const prices = {
    silenceMinorPerHour: 10,
    urgentTripMinor: 5000,
    urgentResponseH: 24,
    nextRoundH: 600,
  };
  const uniform = Array.from({ length: 50 }, (_, i) => 100 + (i + 0.5) * 2);
  const pack = { ...prices, life: uniform, keepMinorPerDay: 4 };
  const of = { installedAt: 0, swapS: 900, cellsMinor: 500 };

  it("counts silence until the visit, or an urgent trip where that is cheaper", () => {
    // By hand: 3 days at 10 an hour = 720; after 30 days 7200 > 5000 + 240.
    expect(costOfStopping(prices, 0, 100, 103)).toBe(720);
    expect(costOfStopping(prices, 0, 100, 130)).toBe(5240);
    expect(costOfStopping(prices, 0, 104, 103)).toBe(0);
    // A round that comes by after a week ends the silence: 168 h at 10.
    expect(costOfStopping({ ...prices, nextRoundH: 168 }, 0, 100, 130)).toBe(1680);
  });

  it("takes the cheaper way out of a failure", () => {
    // By hand: 600 h at 10 = 6000 against a trip of 5000 and 24 h at 10; 168 h at 10 = 1680.
    expect(costOfFailure(prices)).toBe(5240);
    expect(costOfFailure({ ...prices, nextRoundH: 168 })).toBe(1680);
    expect(costOfFailure({ ...prices, silenceMinorPerHour: 0 })).toBe(0);
  });

  it("asks no more of a failure than the urgent trip adds to the swap that it replaces", () => {
    // By hand: a stop's share of a drive is paid either way, so the urgent trip costs what it
    // exceeds that by; the work of the swap is in neither.
    const trip = { shareMinor: 800, urgentMinor: 8_800 };
    const urgent = waitingPack({ ...pack, ...of, silenceMinorPerHour: 1_000 }, trip, PRICES);
    expect(costOfFailure(urgent)).toBe(8_000 + 24 * 1_000);
  });

  it("counts a device that is out already from now on, without a cheaper way out", () => {
    expect(costOfStopping(prices, 110, 100, 112)).toBe(480);
    expect(costOfStopping(prices, 110, 100, 140)).toBe(7200);
  });

  it("agrees with the integral it stands for", () => {
    // Uniform life on 100..200, visit at 120, now 90: silence = ∫₀²⁰ 240 s ds / 100 = 480;
    // unused life = ∫ (t − 120) dt / 100 over 120..200 = 32 days, at 4 a day = 128 (by hand).
    const price = priceVisit(pack, 90, 120);
    expect(price.silenceMinor).toBeCloseTo(480, 0);
    expect(price.thrownMinor).toBeCloseTo(128, 6);
    expect(price.chanceOut).toBeCloseTo(0.2, 10);
  });

  it("is the plain mean over the quantiles of each one's cost", () => {
    const hours = fc.integer({ min: 0, max: 500 });
    fc.assert(
      fc.property(
        fc.array(fc.integer({ min: 50, max: 400 }), { minLength: 50, maxLength: 50 }),
        fc.integer({ min: 60, max: 300 }),
        fc.integer({ min: 0, max: 300 }),
        fc.record({ silence: hours, urgent: fc.integer({ min: 0, max: 20_000 }), next: hours }),
        (days, now, ahead, drawn) => {
          const one = {
            silenceMinorPerHour: drawn.silence,
            urgentTripMinor: drawn.urgent,
            urgentResponseH: 24,
            nextRoundH: drawn.next,
          };
          const life = [...days].sort((a, b) => a - b);
          const visit = now + ahead;
          const mean = life.reduce((sum, t) => sum + costOfStopping(one, now, t, visit), 0) / 50;
          const price = priceVisit({ ...one, life, keepMinorPerDay: 4 }, now, visit);
          expect(price.silenceMinor).toBeCloseTo(mean, 6);
        },
      ),
      { seed: 20261204 },
    );
  });

  it("is nothing a week while the pack is young", () => {
    expect(waitingCostPerWeek(pack, 0, 10)).toBe(0);
    expect(waitingCostPerWeek(pack, 90, 150)).toBeGreaterThan(0);
  });
});

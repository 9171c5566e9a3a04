import { describe, expect, test } from "vitest";
import { coldSnap } from "../../../lib/battery/cold-snap";
import { badLots, type DrawObservation, drawShifts } from "../../../lib/battery/fleet-findings";
import {
  cohortPrior,
  devicePrior,
  type FinishedPack,
  learnCohorts,
} from "../../../lib/battery/fleet-prior";
import { forecastPack } from "../../../lib/battery/forecast";
import { normalQuantile } from "../../../lib/stats/normal";
import { input, pack } from "./cells";

/** n packs whose ln(life ratio) are the quantiles of N(mean, sd); every `early`-th swapped. */
function cohort(name: string, n: number, mean: number, sd: number, early = 0): FinishedPack[] {
  return Array.from({ length: n }, (_, i) => {
    const ratio = Math.exp(mean + sd * normalQuantile((i + 0.5) / n));
    const swapped = early > 0 && i % early === 0;
    return {
      packKey: `${name}/${i}`,
      deviceKey: `${name}/${i}`,
      cohort: name,
      lot: "L1",
      lifeRatio: swapped ? ratio * 0.7 : ratio,
      ranOut: !swapped,
    };
  });
}

describe("what finished packs teach", () => {
  // The sample's own mean and spread are the truth here: quantiles of a known normal.
  test("a cohort's mean is found, early swaps notwithstanding", () => {
    const [plain] = learnCohorts(cohort("a", 40, -0.2, 0.15));
    expect(plain!.mean).toBeCloseTo(-0.2, 2);
    const swapped = learnCohorts(cohort("a", 40, -0.2, 0.15, 3))[0]!;
    expect(Math.abs(swapped.mean + 0.2)).toBeLessThan(0.05);
    // taking the swaps for deaths would be far off
    const naive =
      cohort("a", 40, -0.2, 0.15, 3).reduce((s, p) => s + Math.log(p.lifeRatio), 0) / 40;
    expect(naive).toBeLessThan(-0.3);
  });

  test("a small cohort is drawn further towards the fleet than a large one", () => {
    const life = learnCohorts([
      ...cohort("large", 60, 0.3, 0.15),
      ...cohort("other", 60, -0.3, 0.15),
      ...cohort("small", 3, 0.3, 0.15),
    ]);
    const mean = (name: string) => life.find((l) => l.cohort === name)!.mean;
    expect(mean("small")).toBeLessThan(mean("large"));
    expect(mean("large")).toBeCloseTo(0.3, 1);
  });

  test("nothing ran out, nothing is learned", () => {
    expect(learnCohorts([])).toEqual([]);
    expect(learnCohorts(cohort("a", 5, 0, 0.1, 1))).toEqual([]);
  });

  test("packs that lived a third shorter make the next forecast a third shorter", () => {
    const life = learnCohorts(cohort("a", 40, Math.log(2 / 3), 0.15))[0]!;
    const plain = forecastPack(input()).quantiles.p50 - 19_000;
    const taught = forecastPack(input({ prior: cohortPrior(life) }));
    expect((taught.quantiles.p50 - 19_000) / plain).toBeCloseTo(2 / 3, 1);
    expect(taught.basis.fleetPacks).toBe(40);
  });

  test("a device that drank faster than its cohort is expected to again, less surely so", () => {
    const life = learnCohorts(cohort("a", 40, 0, 0.17))[0]!;
    const thirsty: FinishedPack = { ...cohort("a", 1, -0.3, 0.1)[0]!, lifeRatio: Math.exp(-0.3) };
    const own = devicePrior(life, [thirsty]);
    const base = cohortPrior(life);
    const step = Math.log(own.drawFactor.mean / base.drawFactor.mean);
    expect(step).toBeGreaterThan(0.1);
    expect(step).toBeLessThan(0.3);
    expect(own.drawFactor.relativeSd).toBeLessThan(base.drawFactor.relativeSd);
    expect(devicePrior(life, [{ ...thirsty, ranOut: false }])).toEqual(base);
  });
});

describe("findings", () => {
  test("a lot that lived 40 % shorter is found with its packs, the good ones are not", () => {
    const bad = cohort("a", 12, Math.log(0.6), 0.12).map((p) => ({ ...p, lot: "bad" }));
    const good = cohort("b", 60, 0, 0.15).map((p, i) => ({ ...p, lot: `good-${i % 5}` }));
    const found = badLots([...bad, ...good]);
    expect(found.map((f) => f.lot)).toEqual(["bad"]);
    expect(found[0]!.lifeFactor).toBeCloseTo(0.6, 1);
    expect(found[0]!.packKeys).toHaveLength(12);
  });

  test("two bad packs are not yet a bad lot", () => {
    const two = cohort("a", 2, -1, 0.1).map((p) => ({ ...p, lot: "two" }));
    expect(badLots([...two, ...cohort("b", 30, 0, 0.15)])).toEqual([]);
  });

  const observations = (step: number): DrawObservation[] =>
    Array.from({ length: 60 }, (_, i) => ({
      packKey: `p${i % 10}`,
      model: "M",
      at: 19_000 + i * 10,
      lnFactor: 0.1 * normalQuantile((((i * 37) % 60) + 0.5) / 60) + (i >= 30 ? step : 0),
      sd: 0.1,
    }));

  test("a draw that rose by a third on a day is found near that day", () => {
    const [found] = drawShifts(observations(Math.log(4 / 3)));
    expect(Math.abs(found!.at - 19_300)).toBeLessThanOrEqual(30);
    expect(found!.factor).toBeCloseTo(4 / 3, 1);
    expect(found!.packKeys).toHaveLength(10);
  });

  test("scatter alone is no shift", () => {
    expect(drawShifts(observations(0))).toEqual([]);
  });
});

describe("cold snaps", () => {
  const arctic = [-200, -190, -120, 0, 80, 130, 150, 140, 90, 20, -80, -160];

  test("a hard winter stops it, spring brings it back, and it ends later", () => {
    const snaps = Array.from({ length: 12 }, (_, k) =>
      coldSnap(input({ pack: pack({ monthlyMeanDc: arctic, installedAt: 19_000 + 30 * k }) })),
    ).filter((s) => s !== null);
    expect(snaps.length).toBeGreaterThan(0);
    for (const snap of snaps) {
      expect(snap.stopsAt).toBeLessThan(snap.returnsAt);
      expect(snap.returnsAt).toBeLessThan(snap.endsAt);
    }
  });

  test("where every month is alike there is none", () => {
    const even = Array.from({ length: 12 }, () => 150);
    expect(coldSnap(input({ pack: pack({ monthlyMeanDc: even }) }))).toBeNull();
  });
});

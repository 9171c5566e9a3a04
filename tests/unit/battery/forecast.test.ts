import { describe, expect, test } from "vitest";
import { packMv, packCurve } from "../../../lib/battery/cutoff";
import { chanceOutBy, forecastPack } from "../../../lib/battery/forecast";
import type { Forecast, PackReading, PackSpec } from "../../../lib/battery/pack";
import { fullCapacity, packModel } from "../../../lib/battery/pack-model";
import { filmChance } from "../../../lib/battery/passivation";
import { ER34615, LR6, input, pack } from "./cells";

const START = 19_000;

function reading(at: number, millivolts: number, over: Partial<PackReading> = {}): PackReading {
  return {
    id: `r${at}`,
    at,
    millivolts,
    kind: "resting",
    loadUa: null,
    temperatureDc: 200,
    accuracyMv: 10,
    ...over,
  };
}

/** Resting voltage of the test pack at a depth, at 20 °C. */
function restAt(depth: number, p: PackSpec = pack()): number {
  return packMv(p, packCurve(p), depth, 0, 200);
}

const life = (f: Forecast) => f.quantiles.p50 - START;
const width = (f: Forecast) => f.quantiles.p95 - f.quantiles.p05;

describe("without readings the data sheet decides", () => {
  // By hand: 2800 mAh at 201 uA is 580 days; the 1.0 V cut-off and 3 % a year take some of it.
  test("the median is the capacity over the draw, less the cut-off's share and the leak", () => {
    const f = forecastPack(input());
    const byHand = 2800 / 0.201 / 24;
    expect(life(f)).toBeGreaterThan(byHand * 0.85);
    expect(life(f)).toBeLessThan(byHand);
    expect(f.basis).toMatchObject({ restingReadings: 0, measuredDraw: false, fleetPacks: 0 });
  });

  // 8 % capacity and 15 % draw spread: 17 % together, so the 90 % window is about 56 % wide.
  test("the window is as wide as the stated spreads", () => {
    const f = forecastPack(input());
    expect(width(f) / life(f)).toBeGreaterThan(0.5);
    expect(width(f) / life(f)).toBeLessThan(0.7);
  });

  test("a measured draw narrows it", () => {
    const measured = input({ pack: pack({ measuredDraw: { averageUa: 201, relativeSd: 0.03 } }) });
    expect(width(forecastPack(measured))).toBeLessThan(0.75 * width(forecastPack(input())));
  });

  // Common practice, no source: a larger cell of the same voltage lasts longer by its charge.
  test("a cell of eight times the capacity lasts about eight times as long, leak aside", () => {
    const leakless = { ...LR6, selfDischargePpmPerYear: 0 };
    const large = { ...leakless, rated: { ...LR6.rated, capacityMah: 22_400 } };
    const small = life(forecastPack(input({ pack: pack({ cell: leakless }) })));
    const big = life(forecastPack(input({ pack: pack({ cell: large }) })));
    expect(big / small).toBeGreaterThan(7.5);
    expect(big / small).toBeLessThan(8.5);
  });

  test("two strings in parallel hold twice the charge of one", () => {
    const one = pack({ series: 1, cutoffMv: 1000 });
    expect(fullCapacity(one, 201)).toBeCloseTo(fullCapacity({ ...one, series: 3 }, 201), 6);
    const leakless = { ...LR6, selfDischargePpmPerYear: 0, resistanceMohm: 0 };
    const alone = life(forecastPack(input({ pack: pack({ cell: leakless }) })));
    const both = life(forecastPack(input({ pack: pack({ cell: leakless, parallel: 2 }) })));
    expect(both / alone).toBeCloseTo(2, 1);
  });
});

describe("readings", () => {
  const now = START + 300;
  const at = (depth: number, over: Partial<PackReading> = {}) =>
    forecastPack(input({ readings: [reading(now, restAt(depth), over)], now }));

  test("a resting voltage halfway down its curve leaves about half", () => {
    const f = at(0.5);
    expect(f.shareLeft.p50).toBeGreaterThan(0.4);
    expect(f.shareLeft.p50).toBeLessThan(0.55);
    expect(f.weights[0]).toMatchObject({ reason: "fits" });
    expect(f.weights[0]!.weight).toBeGreaterThan(0.9);
  });

  test("a lower voltage means less left and an earlier end", () => {
    const [high, low] = [at(0.4), at(0.65)];
    expect(low.quantiles.p50).toBeLessThan(high.quantiles.p50);
    expect(low.shareLeft.p50).toBeLessThan(high.shareLeft.p50);
  });

  test("a coarse instrument moves the forecast less than a fine one", () => {
    const plain = life(forecastPack(input({ now })));
    const fine = Math.abs(life(at(0.65, { accuracyMv: 5 })) - plain);
    const coarse = Math.abs(life(at(0.65, { accuracyMv: 200 })) - plain);
    expect(coarse).toBeLessThan(fine);
  });

  test("an outlier among good readings hardly counts and is named", () => {
    const good = [60, 120, 180, 240].map((d) => reading(START + d, restAt(d / 560)));
    const wild = reading(START + 200, 3300);
    const without = forecastPack(input({ readings: good, now }));
    const withIt = forecastPack(input({ readings: [...good, wild], now }));
    const said = withIt.weights.find((w) => w.readingId === wild.id)!;
    expect(said.reason).toBe("doubtful");
    expect(said.weight).toBeLessThan(0.05);
    expect(Math.abs(life(withIt) - life(without)) / life(without)).toBeLessThan(0.03);
    expect(withIt.basis.doubtfulReadings).toBe(1);
  });

  test("readings before installation and impossible ones are kept, named and without effect", () => {
    const readings = [
      reading(START - 5, 4800),
      reading(START + 10, -20),
      reading(START + 20, 48_000),
      reading(now + 30, 4000),
    ];
    const f = forecastPack(input({ readings, now }));
    expect(f.weights.map((w) => w.reason)).toEqual([
      "before-install",
      "impossible",
      "impossible",
      "impossible",
    ]);
    expect(f.weights.every((w) => w.weight === 0)).toBe(true);
    expect(f.quantiles).toEqual(forecastPack(input({ now })).quantiles);
  });

  test("a loaded reading agrees with the resting one of the same depth", () => {
    const p = pack();
    const loaded = packMv(p, packCurve(p), 0.6, 30_000, 200);
    const f = at(0, { millivolts: loaded, kind: "loaded" });
    expect(f.basis.loadedReadings).toBe(1);
    expect(Math.abs(f.shareLeft.p50 - at(0.6).shareLeft.p50)).toBeLessThan(0.08);
  });

  // Maxell ER data sheet: the film of LiCl gives a transient minimum after rest.
  test("a first loaded dip of a Li-SOCl2 pack is no evidence of depletion", () => {
    const p = pack({
      cell: ER34615,
      series: 1,
      cutoffMv: 2800,
      duty: [
        { name: "sleep", currentUa: 60, durationMs: 59_900 },
        { name: "send", currentUa: 20_000, durationMs: 100 },
      ],
    });
    const dip = reading(now, 2600, { kind: "loaded" });
    const f = forecastPack(input({ pack: p, readings: [dip], now }));
    expect(f.weights[0]!.reason).toBe("passivation");
    expect(f.weights[0]!.weight).toBeLessThan(0.05);
    const unread = forecastPack(input({ pack: p, now })).quantiles;
    expect(Math.abs(f.quantiles.p50 - unread.p50)).toBeLessThan(0.02 * (unread.p50 - START));
    const repeat = reading(now, 3300, { kind: "loaded", id: "again" });
    const second = forecastPack(input({ pack: p, readings: [dip, repeat], now }));
    expect(second.weights[1]!.reason).not.toBe("passivation");
  });
});

// Maxell ER data sheet: the film grows at rest and recovers under load; how fast is from memory.
describe("the film of a Li-SOCl2 cell", () => {
  const model = (chemistry: "li-socl2" | "alkaline", sleepUa: number) =>
    packModel(
      pack({
        cell: chemistry === "alkaline" ? LR6 : ER34615,
        duty: [
          { name: "sleep", currentUa: sleepUa, durationMs: 59_900 },
          { name: "send", currentUa: 20_000, durationMs: 100 },
        ],
      }),
      null,
    );

  test("is likelier after a longer rest, and never of another chemistry", () => {
    const cell = model("li-socl2", 60);
    const chances = [0, 5, 30, 120, 365].map((days) => filmChance(cell, days));
    expect(chances).toEqual([...chances].sort((a, b) => a - b));
    expect(chances[0]).toBe(0);
    expect(filmChance(model("alkaline", 60), 365)).toBe(0);
  });

  test("is kept thin by the device's own pulses, not on the shelf", () => {
    expect(filmChance(model("li-socl2", 60), 120)).toBeLessThan(
      filmChance(model("li-socl2", 19_000), 120),
    );
    expect(filmChance(model("li-socl2", 60), Infinity)).toBeGreaterThan(0.9);
  });
});

describe("events", () => {
  test("still reporting past the expected end moves the end on and never before that day", () => {
    const now = START + 600;
    const f = forecastPack(input({ events: [{ kind: "reporting", at: now }], now }));
    expect(f.quantiles.p05).toBeGreaterThanOrEqual(now);
    expect(f.quantiles.p50).toBeGreaterThan(forecastPack(input({ now })).quantiles.p50);
    expect(f.outNow).toBeLessThan(0.01);
  });

  test("stopped between two days puts every quantile between them", () => {
    const now = START + 520;
    const events = [{ kind: "stopped" as const, at: START + 500, lastAliveAt: START + 470 }];
    const f = forecastPack(input({ events, now }));
    expect(f.outNow).toBe(1);
    expect(f.cdfDays[0]).toBeGreaterThanOrEqual(START + 470);
    expect(f.cdfDays[49]).toBeLessThanOrEqual(START + 500);
  });

  test("a draw change makes the window wider", () => {
    const now = START + 250;
    const readings = [60, 120, 180, 240].map((d) => reading(START + d, restAt(d / 560)));
    const events = [{ kind: "draw-changed" as const, at: START + 245 }];
    const before = forecastPack(input({ readings, now }));
    expect(width(forecastPack(input({ readings, events, now })))).toBeGreaterThan(width(before));
  });
});

describe("the ends of what can happen", () => {
  test("a cut-off above the fresh loaded voltage: out from the start", () => {
    const f = forecastPack(input({ pack: pack({ cutoffMv: 5000 }), now: START + 40 }));
    expect(f.outNow).toBeGreaterThan(0.9);
    expect(f.quantiles.p50).toBeLessThan(START + 10);
    expect(f.quantiles.p05).toBeGreaterThanOrEqual(START);
  });

  test("years past its life without a word: most likely out, on a day in the past", () => {
    const f = forecastPack(input({ now: START + 3000 }));
    expect(f.outNow).toBeGreaterThan(0.99);
    expect(Math.abs(life(f) / life(forecastPack(input())) - 1)).toBeLessThan(0.12);
    expect(f.shareLeft.p50).toBe(0);
  });

  test("nothing drawn and nothing leaking: the stated limit of 40 years", () => {
    const still = pack({ duty: [], cell: { ...LR6, selfDischargePpmPerYear: 0 } });
    const f = forecastPack(input({ pack: still }));
    expect(f.quantiles.p05).toBeCloseTo(START + 40 * 365.2425, 0);
  });

  test("old stock ends earlier", () => {
    const old = forecastPack(input({ pack: pack({ madeAt: START - 5 * 365 }) }));
    const fresh = forecastPack(input());
    expect(old.quantiles.p50).toBeLessThan(fresh.quantiles.p50 - 40);
  });

  test("a hard winter stops a pack that a mild one would carry through", () => {
    const arctic = [-250, -250, -200, -50, 50, 120, 150, 140, 80, 0, -150, -220];
    const cold = pack({ monthlyMeanDc: arctic });
    const f = forecastPack(input({ pack: cold }));
    expect(f.quantiles.p05).toBeLessThan(forecastPack(input()).quantiles.p05);
  });

  test("bad input is refused by field", () => {
    const bad = pack({ series: 0, monthlyMeanDc: [1, 2] });
    expect(() => forecastPack(input({ pack: bad }))).toThrowError(
      expect.objectContaining({
        code: "invalid",
        faults: [
          expect.objectContaining({ field: "series" }),
          expect.objectContaining({ field: "monthlyMeanDc" }),
        ],
      }),
    );
  });
});

describe("chance of being out by a day", () => {
  test("agrees with the quantiles and stays within 0 and 1", () => {
    const f = forecastPack(input());
    const { p05, p20, p50, p80, p95 } = f.quantiles;
    const at = [p05, p20, p50, p80, p95].map((d) => chanceOutBy(f, d));
    [0.05, 0.2, 0.5, 0.8, 0.95].forEach((p, i) => expect(at[i]).toBeCloseTo(p, 2));
    expect(chanceOutBy(f, START - 1000)).toBe(0);
    expect(chanceOutBy(f, START + 100_000)).toBe(1);
  });
});

/**
 * Draw read from voltages and findings worth telling. Truths: charge is current times time; packs
 * and lots made here with known lives and a known step of the draw.
 */
import { describe, expect, test } from "vitest";
import { packCurve, packMv } from "../../../lib/battery/cutoff";
import {
  type DepthObservation,
  drawObservations,
  levelByDepth,
} from "../../../lib/battery/draw-observations";
import { watchFleet, type WatchedPack } from "../../../lib/battery/fleet-watch";
import type { PackReading } from "../../../lib/battery/pack";
import { normalQuantile } from "../../../lib/stats/normal";
import { ER34615, LR6, pack } from "./cells";

const START = 19_000;
const leakless = pack({ cell: { ...LR6, selfDischargePpmPerYear: 0 } });

/** Resting voltages of a pack that draws `factor` times its sheet, every 60 days. */
function readingsAt(factor: (day: number) => number, days: number, p = leakless): PackReading[] {
  const perDay = (201.3 * 24) / 1000 / fullMah();
  let depth = 0.02;
  const found: PackReading[] = [];
  for (let day = 0; day <= days; day++) {
    if (day % 60 === 0) {
      const millivolts = packMv(p, packCurve(p), depth, 0, 200);
      const id = `r${day}`;
      found.push({
        id,
        at: START + day,
        millivolts,
        kind: "resting",
        loadUa: null,
        temperatureDc: 200,
        accuracyMv: 10,
      });
    }
    depth += perDay * factor(day);
  }
  return found;
}
/** Charge of the test cell: rated 2.8 Ah at 25 mA, its leak during that test put back (none). */
const fullMah = () => 2800;

describe("draw read from voltages", () => {
  test("a device that draws twice its sheet is seen to, within the error stated", () => {
    const readings = readingsAt(() => 2, 240);
    const seen = drawObservations({ packKey: "p", model: "M", pack: leakless, readings });
    expect(seen.length).toBeGreaterThan(2);
    for (const { lnFactor, sd } of seen) {
      expect(Math.abs(lnFactor - Math.log(2))).toBeLessThan(Math.max(0.1, sd));
    }
  });

  test("a flat curve says nothing: no observation of a Li-SOCl2 pack on its plateau", () => {
    const flat = pack({ cell: ER34615, series: 1, cutoffMv: 2500 });
    const readings = readingsAt(() => 1, 240, flat);
    expect(drawObservations({ packKey: "p", model: "M", pack: flat, readings })).toEqual([]);
  });

  test("loaded readings, and resting ones close together, are left alone", () => {
    const [first, second] = readingsAt(() => 1, 60);
    const loaded = { ...second!, kind: "loaded" as const };
    const of = (readings: PackReading[]) =>
      drawObservations({ packKey: "p", model: "M", pack: leakless, readings });
    expect(of([first!, loaded])).toEqual([]);
    expect(of([first!, { ...second!, at: first!.at + 10 }])).toEqual([]);
  });
});

/** Observations of ten packs over 600 days: scatter of 10 %, a step where asked. */
function observed(model: string, step: number): DepthObservation[] {
  return Array.from({ length: 120 }, (_, i) => ({
    ...{ packKey: `${model}/${i % 10}`, model, chemistry: "alkaline" as const },
    at: START + i * 5,
    depth: ((i * 7) % 10) / 10,
    lnFactor: 0.1 * normalQuantile((((i * 37) % 120) + 0.5) / 120) + (i >= 60 ? step : 0),
    sd: 0.1,
  }));
}

test("what a curve gets wrong at one depth is no draw: levelled away", () => {
  const bent = observed("A", 0).map((o) =>
    o.depth < 0.1 ? { ...o, lnFactor: o.lnFactor + 0.5 } : o,
  );
  const first = (all: readonly { lnFactor: number }[]) =>
    all.filter((_, i) => bent[i]!.depth < 0.1).reduce((s, o) => s + o.lnFactor, 0) / 12;
  expect(first(bent)).toBeGreaterThan(0.4);
  expect(Math.abs(first(levelByDepth(bent)))).toBeLessThan(0.12);
});

/** Packs whose ln(life ratio) are the quantiles of N(mean, 0.15). */
function lived(model: string, lot: string, n: number, mean: number, until = START): WatchedPack[] {
  return Array.from({ length: n }, (_, i) => ({
    ...{ packKey: `${lot}/${i}`, deviceKey: `${model}/${i}`, model, lot, until },
    ...{ cohort: model, cellType: "LR6", ranOut: true },
    lifeRatio: Math.exp(mean + 0.15 * normalQuantile((i + 0.5) / n)),
  }));
}
const sound = ["g1", "g2", "g3"].flatMap((lot) => lived("A", lot, 30, 0));

describe("findings worth telling", () => {
  test("a lot that lived 40 % shorter, and only that", () => {
    const { lots } = watchFleet([...sound, ...lived("A", "bad", 20, Math.log(0.6))], []);
    expect(lots.map((l) => l.lot)).toEqual(["bad"]);
    expect(lots[0]!.lifeFactor).toBeLessThan(0.7);
  });

  test("not a lot of few packs, nor one that lived a tenth shorter", () => {
    expect(watchFleet([...sound, ...lived("A", "few", 5, Math.log(0.6))], []).lots).toEqual([]);
    expect(watchFleet([...sound, ...lived("A", "tenth", 30, Math.log(0.9))], []).lots).toEqual([]);
  });

  test("packs still in count as having lived so far: a young lot is not a bad one", () => {
    const young = lived("A", "young", 30, Math.log(0.4)).map((p, i) => ({
      ...p,
      ranOut: i < 3,
    }));
    const { lots } = watchFleet([...sound, ...young], []);
    expect(lots.map((l) => l.lot)).not.toContain("young");
  });

  test("a draw that rose by two fifths, near its day; its worn packs are no bad lot", () => {
    const after = lived("B", "worn", 20, Math.log(0.7), START + 500);
    const { lots, shifts } = watchFleet(
      [...sound, ...lived("B", "g4", 30, 0, START + 100), ...after],
      [...observed("A", 0), ...observed("B", Math.log(1.4))],
    );
    expect(shifts.map((s) => s.model)).toEqual(["B"]);
    expect(Math.abs(shifts[0]!.at - (START + 300))).toBeLessThan(40);
    expect(shifts[0]!.factor).toBeGreaterThan(1.25);
    expect(lots).toEqual([]);
  });

  test("packs of a bad lot do not pass for a thirsty firmware", () => {
    const bad = lived("B", "bad", 20, Math.log(0.6));
    const thirsty = observed("B", Math.log(1.6)).map((o, i) => ({
      ...o,
      packKey: i >= 60 ? `bad/${i % 10}` : o.packKey,
    }));
    const { lots, shifts } = watchFleet([...sound, ...lived("B", "g4", 30, 0), ...bad], thirsty);
    expect(lots.map((l) => l.lot)).toEqual(["bad"]);
    expect(shifts).toEqual([]);
  });
});

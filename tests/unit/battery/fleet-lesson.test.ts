/**
 * What finished packs teach. The truths are the tests' own: packs are made on the published
 * curve with a known error laid on, and learning has to find that error; scores are quantiles
 * of a known normal.
 */
import { describe, expect, test } from "vitest";
import { calibrate } from "../../../lib/battery/calibration";
import { endUnder, learnEnds, paceTo, spent } from "../../../lib/battery/end-lesson";
import { type FinishedHistory, learnFleet } from "../../../lib/battery/fleet-lesson";
import { forecastPack } from "../../../lib/battery/forecast";
import type { PackReading, PackSpec } from "../../../lib/battery/pack";
import { packModel } from "../../../lib/battery/pack-model";
import { packMv } from "../../../lib/battery/cutoff";
import { normalQuantile } from "../../../lib/stats/normal";
import { pack } from "./cells";

const SPEC: PackSpec = pack();

/** The day on which a pack reaches its end at a pace, by the product's own course of depth. */
function outAt(spec: PackSpec, pace: number): number {
  let [low, high] = [spec.installedAt + 2, spec.installedAt + 8000];
  while (high - low > 0.5) {
    const middle = (low + high) / 2;
    const one = spent(spec, middle);
    if (paceTo(one, endUnder(one, 1), middle) > pace) low = middle;
    else high = middle;
  }
  return high;
}

/** A pack that ran out at a pace, its resting voltages `offMv` an element off the curve. */
function history(device: number, pace: number, offMv: number, swapped = false): FinishedHistory {
  const end = outAt(SPEC, pace);
  const model = packModel(SPEC, null);
  const from = SPEC.installedAt;
  const readings = Array.from({ length: 12 }, (_, k): PackReading => {
    const at = from + ((k + 0.5) / 12) * (end - from);
    const depth = model.startDepth + (model.end.warm - model.startDepth) * ((k + 0.5) / 12);
    const mv = packMv(SPEC, model.curve, depth, 0, 200) + offMv * model.curve.restScale;
    const base = { id: `${device}/${k}`, at, millivolts: mv, kind: "resting" as const };
    return { ...base, loadUa: null, temperatureDc: 200, accuracyMv: null };
  });
  const out = swapped ? from + 0.7 * (end - from) : end;
  return {
    packKey: `p${device}`,
    deviceKey: `d${device}`,
    cohort: "c",
    lot: null,
    pack: SPEC,
    readings: readings.filter((r) => r.at < out),
    outAt: out,
    ranOut: !swapped,
  };
}

const paces = Array.from({ length: 20 }, (_, i) => Math.exp(0.1 * normalQuantile((i + 0.5) / 20)));
const member = (device: number) =>
  ({ deviceKey: `d${device}`, cohort: "c", chemistry: SPEC.cell.chemistry }) as const;

describe("a lesson", () => {
  test("finds by how much the curve is off, and nothing where it is not", () => {
    const middle = (offMv: number): number => {
      const lesson = learnFleet(paces.map((p, i) => history(i, p, offMv)));
      return lesson.priorFor(member(99))!.curve!.restShiftMv[10]!;
    };
    expect(middle(15)).toBeGreaterThan(11);
    expect(middle(15)).toBeLessThan(18);
    expect(Math.abs(middle(0))).toBeLessThan(3);
  });

  test("carries a device's own pace over to its next pack", () => {
    const lesson = learnFleet(paces.map((p, i) => history(i, p, 0)));
    const [slow, fast] = [lesson.priorFor(member(0))!, lesson.priorFor(member(19))!];
    expect(fast.drawFactor.mean / slow.drawFactor.mean).toBeGreaterThan(1.1);
    const stranger = lesson.priorFor(member(99))!;
    expect(slow.drawFactor.relativeSd).toBeLessThan(stranger.drawFactor.relativeSd);
  });

  test("a pack swapped early tells what its readings promised, not its short life", () => {
    const rest = paces.map((p, i) => history(i, p, 0));
    const lesson = learnFleet([...rest, history(50, 1, 0, true)]);
    const swapped = lesson.priorFor(member(50))!;
    const stranger = lesson.priorFor(member(99))!;
    expect(Math.abs(Math.log(swapped.drawFactor.mean / stranger.drawFactor.mean))).toBeLessThan(
      0.1,
    );
  });

  test("a change of device or firmware voids its own history and opens the draw", () => {
    const lesson = learnFleet(paces.map((p, i) => history(i, p, 0)));
    const changed = lesson.priorFor({ ...member(19), changedAt: SPEC.installedAt + 1 })!;
    expect(changed.drawFactor.mean).toBeCloseTo(lesson.priorFor(member(99))!.drawFactor.mean, 6);
    expect(changed.drawFactor.relativeSd).toBeGreaterThan(0.35);
  });

  test("packs that failed within days leave a prior that can be forecast with", () => {
    const failed = paces.map((p, i) => ({
      ...history(i, p, 0),
      readings: [],
      outAt: SPEC.installedAt + 1.1 + i / 10,
    }));
    const prior = learnFleet(failed).priorFor(member(0))!;
    const now = SPEC.installedAt + 1;
    const said = forecastPack({ pack: SPEC, readings: [], events: [], prior, now });
    expect(said.cdfDays.every(Number.isFinite)).toBe(true);
  });

  test("nothing finished, nothing taught; an unseen cohort gets what its chemistry taught", () => {
    expect(learnFleet([]).priorFor(member(0))).toBeNull();
    const lesson = learnFleet(paces.map((p, i) => history(i, p, 0)));
    expect(lesson.priorFor({ ...member(99), cohort: "other" })?.curve).toBeTruthy();
    expect(lesson.priorFor({ ...member(99), chemistry: "li-socl2" })).toBeNull();
  });
});

describe("the end", () => {
  const peak = 220_000;
  const cold: PackSpec = {
    ...SPEC,
    cutoffMv: 1050 * SPEC.series,
    duty: [
      { name: "sleep", currentUa: 200, durationMs: 600_000 },
      { name: "send", currentUa: peak, durationMs: 1 },
    ],
    monthlyMeanDc: [20, 20, 50, 90, 130, 160, 180, 180, 140, 100, 60, 30],
  };

  // packs made to stop where the resistance is `factor` times the sheet's
  function stopped(factor: number) {
    return Array.from({ length: 24 }, (_, i) => {
      const spec = { ...cold, installedAt: SPEC.installedAt + i * 31 };
      let at = spec.installedAt + 60;
      while (paceTo(spent(spec, at), endUnder(spent(spec, at), factor), at) > 1) at += 1;
      return spent(spec, at);
    });
  }

  test.each([0.7, 1.5])("a resistance %f times the sheet's is read off the stops", (factor) => {
    const learned = learnEnds(new Map([["c", stopped(factor)]])).get("c")!;
    expect(Math.abs(Math.log(learned / factor))).toBeLessThan(0.3);
  });
});

describe("calibration", () => {
  const scores = (mean: number, sd: number) =>
    Array.from({ length: 400 }, (_, i) => [mean + sd * normalQuantile((i + 0.5) / 400)]);

  test("even probabilities leave the windows alone", () => {
    const { shift, spread } = calibrate(scores(0, 1), 3);
    expect(shift).toBeCloseTo(0, 2);
    expect(spread).toBeCloseTo(1, 1);
  });

  test("ends twice as far out make them twice as wide, up to the stated limits", () => {
    expect(calibrate(scores(0, 2), 3).spread).toBeCloseTo(2, 1);
    expect(calibrate(scores(0, 20), 3).spread).toBe(3);
    expect(calibrate(scores(0, 0.01), 3).spread).toBe(0.6);
  });

  test("a short life's narrowing is half believed, a long one's wholly, as stated", () => {
    expect(calibrate(scores(0, 0.5), 1).spread).toBeCloseTo(Math.SQRT1_2, 1);
    expect(calibrate(scores(0, 0.7), 3).spread).toBeCloseTo(0.7, 1);
  });

  test("a wider calibration widens a forecast about its median", () => {
    const factor = { mean: 1, relativeSd: 0.15 };
    const said = (spread: number) =>
      forecastPack({
        pack: SPEC,
        readings: [],
        events: [],
        now: SPEC.installedAt,
        prior: {
          capacityFactor: factor,
          drawFactor: factor,
          packs: 9,
          calibration: { shift: 0, spread },
        },
      }).quantiles;
    expect(said(2).p50).toBeCloseTo(said(1).p50, 6);
    const width = (q: { p05: number; p95: number }) => q.p95 - q.p05;
    expect(width(said(2))).toBeGreaterThan(1.5 * width(said(1)));
  });
});

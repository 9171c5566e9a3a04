/**
 * A duty cycle changed. Truths: average is charge over time, by hand; a pack without leak lasts
 * in inverse proportion to its draw; and for a fresh pack the battery core's own forecast of the
 * changed device.
 */
import { describe, expect, test } from "vitest";
import { averageUa, forecastPack, type PackSpec } from "@/lib/battery";
import { changedDuty, forecastAfterChange, periodMs, withDuty } from "@/lib/planning/changed-duty";
import { input, LR6, pack } from "../battery/cells";

const duty = [
  { name: "sleep", currentUa: 50, durationMs: 895_000 },
  { name: "sample", currentUa: 12_000, durationMs: 5000 },
];
const fresh = (over: Partial<PackSpec> = {}) => input({ pack: pack({ duty, ...over }) });
const states = (changed: ReturnType<typeof changedDuty>) =>
  "states" in changed ? changed.states : [];

describe("a changed duty cycle", () => {
  test("every 5 minutes instead of 15: work as long as before, rest gives", () => {
    const changed = states(changedDuty(duty, { periodMs: 300_000, state: null }));
    expect(periodMs(duty)).toBe(900_000);
    expect(changed.map((s) => s.durationMs)).toEqual([295_000, 5000]);
    // (50 µA × 295 s + 12 mA × 5 s) / 300 s = 249.2 µA, against 116.4 µA
    expect(averageUa(changed)).toBeCloseTo(249.17, 1);
    expect(averageUa(duty)).toBeCloseTo(116.39, 1);
  });

  test("one state's current, and no state of that name", () => {
    const change = { periodMs: null, state: { name: "sample", currentUa: 6000 } };
    expect(states(changedDuty(duty, change)).map((s) => s.currentUa)).toEqual([50, 6000]);
    const wrong = changedDuty(duty, { ...change, state: { name: "nap", currentUa: 1 } });
    expect(wrong).toMatchObject({ fault: { field: "stateName" } });
  });

  test("a period shorter than its work is refused by its field", () => {
    const changed = changedDuty(duty, { periodMs: 4000, state: null });
    expect(changed).toMatchObject({ fault: { field: "periodMinutes" } });
  });

  test("a measured draw changes in proportion", () => {
    const measured = pack({ duty, measuredDraw: { averageUa: 200, relativeSd: 0.05 } });
    const doubled = duty.map((s) => ({ ...s, currentUa: s.currentUa * 2 }));
    expect(withDuty(measured, doubled).measuredDraw?.averageUa).toBeCloseTo(400, 6);
  });
});

describe("the forecast after a change", () => {
  const leakless = { cell: { ...LR6, selfDischargePpmPerYear: 0 } };
  const resting = duty.map((s) => (s.name === "sleep" ? { ...s, currentUa: 172.4 } : s));

  test("without leak twice the draw halves the days left", () => {
    // Sleep at 172.4 µA instead of 50: average 116.4 -> 238.1 µA (by hand), peak as before.
    const known = fresh(leakless);
    const forecast = forecastPack(known);
    const after = forecastAfterChange(forecast, known.pack, resting, known.now);
    const ratio = averageUa(resting) / averageUa(duty);
    const left = (q: { p50: number }) => q.p50 - known.now;
    expect(left(forecast.quantiles) / left(after.quantiles)).toBeCloseTo(ratio, 3);
    expect(after.drawUa.p50 / forecast.drawUa.p50).toBeCloseTo(ratio, 6);
  });

  test.each([
    ["three times as often", 300_000],
    ["a third as often", 2_700_000],
  ])("%s: within a tenth of the whole forecast made anew for a fresh pack", (_, period) => {
    const known = fresh();
    const changed = states(changedDuty(duty, { periodMs: period, state: null }));
    const after = forecastAfterChange(forecastPack(known), known.pack, changed, known.now);
    const anew = forecastPack(fresh({ duty: changed }));
    const ratio = (after.quantiles.p50 - known.now) / (anew.quantiles.p50 - known.now);
    expect(Math.abs(Math.log(ratio))).toBeLessThan(0.1);
  });

  test("days that have passed stay", () => {
    const known = fresh();
    const forecast = forecastPack(known);
    const late = forecast.quantiles.p50;
    const after = forecastAfterChange(forecast, known.pack, resting, late);
    expect(after.quantiles.p05).toBe(forecast.quantiles.p05);
    expect(after.quantiles.p95).toBeLessThan(forecast.quantiles.p95);
  });
});

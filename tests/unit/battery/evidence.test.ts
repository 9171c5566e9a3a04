/** What one piece of evidence moved. Truth: the two forecasts themselves, made apart. */
import { describe, expect, test } from "vitest";
import { lastMoved, movedByReading } from "../../../lib/battery/evidence";
import { forecastPack } from "../../../lib/battery/forecast";
import type { PackReading } from "../../../lib/battery/pack";
import { input, pack } from "./cells";

const at = (day: number, millivolts: number): PackReading => ({
  ...{ id: `r${day}`, at: 19_000 + day, millivolts, kind: "resting" as const },
  ...{ loadUa: null, temperatureDc: 200, accuracyMv: 10 },
});
const early = at(100, 4150);
/** 3.85 V at rest on three alkaline cells: over half used (LR03 table: 1.27 V at 40 % left). */
const low = at(200, 3850);

describe("the last piece of evidence", () => {
  test("a low reading brings the likely day forward, by the difference of the two forecasts", () => {
    const all = input({ readings: [early, low], now: 19_210 });
    const without = forecastPack({ ...all, readings: [early] }).quantiles.p50;
    const moved = lastMoved(all, forecastPack(all), null)!;
    expect(moved.evidence).toMatchObject({ kind: "reading", reading: { id: "r200" } });
    expect(moved.without).toBe(without);
    expect(moved.days).toBeLessThan(-20);
  });

  test("is the latest of readings, a measured draw and changes of the device", () => {
    const all = input({
      pack: pack({ measuredDraw: { averageUa: 400, relativeSd: 0.06 } }),
      readings: [early],
      events: [{ at: 19_150, kind: "draw-changed" }],
      now: 19_210,
    });
    const forecast = forecastPack(all);
    expect(lastMoved(all, forecast, 19_190)!.evidence.kind).toBe("measured-draw");
    expect(lastMoved(all, forecast, 19_190)!.days).toBeLessThan(0);
    expect(lastMoved(all, forecast, 19_110)!.evidence.kind).toBe("event");
  });

  test("is none where nothing was logged, or all of it lies ahead", () => {
    const none = input({ now: 19_050 });
    expect(lastMoved(none, forecastPack(none), null)).toBeNull();
    const ahead = input({ readings: [low], now: 19_050 });
    expect(lastMoved(ahead, forecastPack(ahead), null)).toBeNull();
  });
});

test("each reading's own move is the forecast less that without it", () => {
  const all = input({ readings: [early, low], now: 19_210 });
  const forecast = forecastPack(all);
  const moves = movedByReading(all, forecast, ["r100", "r200"]);
  const without = forecastPack({ ...all, readings: [low] }).quantiles.p50;
  expect(moves.get("r100")).toBe(forecast.quantiles.p50 - without);
  expect([...moves.keys()]).toEqual(["r100", "r200"]);
});

import fc from "fast-check";
import { expect, test } from "vitest";
import { CHEMISTRIES, type ForecastInput } from "../../../lib/battery/pack";
import { CURVES } from "../../../lib/battery/curve-tables";
import { filterPack } from "../../../lib/battery/filter";
import { forecastPack } from "../../../lib/battery/forecast";
import { expectedVoltage } from "../../../lib/battery/voltage-band";
import { LR6, input, pack } from "./cells";

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });
/** Magnitudes evenly over the decades, so that extremes come up. */
const decades = (from: number, to: number) => number(from, to).map((e) => 10 ** e);

const capacityPoint = fc.record({
  currentUa: decades(0, 7),
  cutoffMv: number(0, 3000),
  temperatureDc: number(-400, 600),
  capacityMah: decades(-2, 6),
});

const cell = fc.record({
  chemistry: fc.constantFrom(...CHEMISTRIES),
  nominalMv: number(1000, 24_000),
  rated: capacityPoint,
  capacityTable: fc.array(capacityPoint, { maxLength: 6 }),
  selfDischargePpmPerYear: fc.oneof(fc.constant(0), decades(0, 6)),
  resistanceMohm: fc.oneof(fc.constant(0), decades(0, 7)),
  maxPulseUa: fc.constant(null),
});

const packs = fc.record({
  cell,
  series: fc.integer({ min: 1, max: 12 }),
  parallel: fc.integer({ min: 1, max: 8 }),
  cutoffMv: fc.oneof(fc.constant(0), decades(0, 5)),
  duty: fc.array(
    fc.record({
      name: fc.constant("s"),
      currentUa: fc.oneof(fc.constant(0), decades(-2, 7)),
      durationMs: fc.oneof(fc.constant(0), decades(0, 8)),
    }),
    { maxLength: 4 },
  ),
  measuredDraw: fc.option(fc.record({ averageUa: decades(-2, 7), relativeSd: number(0, 3) }), {
    nil: null,
  }),
  monthlyMeanDc: fc.array(number(-500, 500), { minLength: 12, maxLength: 12 }),
  madeAt: fc.option(number(10_000, 20_000), { nil: null }),
  installedAt: number(15_000, 20_000),
});

const readings = fc.array(
  fc.record({
    id: fc.uuid(),
    at: number(14_000, 24_000),
    millivolts: fc.oneof(number(-100, 60_000), number(1000, 5000)),
    kind: fc.constantFrom("resting" as const, "loaded" as const),
    loadUa: fc.option(decades(0, 7), { nil: null }),
    temperatureDc: fc.option(number(-500, 500), { nil: null }),
    accuracyMv: fc.option(fc.oneof(fc.constant(0), decades(-2, 4)), { nil: null }),
  }),
  { maxLength: 8 },
);

const events = fc.array(
  fc
    .record({
      at: number(14_000, 24_000),
      kind: fc.constantFrom("reporting" as const, "stopped" as const, "draw-changed" as const),
      before: number(0, 500),
    })
    .map(({ at, kind, before }) =>
      kind === "stopped" ? { at, kind, lastAliveAt: at - before } : { at, kind },
    ),
  { maxLength: 4 },
);

const factor = fc.record({ mean: number(0.2, 5), relativeSd: number(0, 2) });
const inputs: fc.Arbitrary<ForecastInput> = fc.record({
  pack: packs,
  readings,
  events,
  prior: fc.option(fc.record({ capacityFactor: factor, drawFactor: factor, packs: fc.nat(500) }), {
    nil: null,
  }),
  now: number(14_000, 24_000),
});

test("the filter's probability stays whole and nowhere negative", () => {
  fc.assert(
    fc.property(inputs, (given) => {
      const { p } = filterPack(given).grid;
      expect(p.every((m) => m >= 0)).toBe(true);
      expect(p.reduce((a, b) => a + b, 0)).toBeCloseTo(1, 9);
    }),
    { numRuns: 60 },
  );
});

test("for any valid input: no NaN, ordered quantiles, dates within the stated limits", () => {
  fc.assert(
    fc.property(inputs, (given) => {
      const f = forecastPack(given);
      const { p05, p20, p50, p80, p95 } = f.quantiles;
      const days = [...f.cdfDays];
      expect(days.every(Number.isFinite)).toBe(true);
      expect(days).toEqual([...days].sort((a, b) => a - b));
      expect([p05, p20, p50, p80, p95]).toEqual([p05, p20, p50, p80, p95].sort((a, b) => a - b));
      expect(days[0]).toBeGreaterThanOrEqual(given.pack.installedAt);
      const latest = Math.max(given.now, given.pack.installedAt) + 40 * 365.2425;
      expect(days[49]).toBeLessThanOrEqual(latest + 1e-6);
      expect(f.outNow).toBeGreaterThanOrEqual(0);
      expect(f.outNow).toBeLessThanOrEqual(1);
      expect(f.shareLeft.p05).toBeLessThanOrEqual(f.shareLeft.p50);
      expect(f.shareLeft.p50).toBeLessThanOrEqual(f.shareLeft.p95);
      expect(f.drawUa.p05).toBeLessThanOrEqual(f.drawUa.p50);
      expect(f.drawUa.p50).toBeLessThanOrEqual(f.drawUa.p95);
      expect(f.weights.map((w) => w.readingId)).toEqual(given.readings.map((r) => r.id));
      for (const w of f.weights) {
        expect(w.weight).toBeGreaterThanOrEqual(0);
        expect(w.weight).toBeLessThanOrEqual(1);
        expect(w.expectedLowMv).toBeLessThanOrEqual(w.expectedMv);
        expect(w.expectedMv).toBeLessThanOrEqual(w.expectedHighMv);
      }
    }),
    { numRuns: 300 },
  );
});

test("the same input gives the same forecast to the last bit", () => {
  fc.assert(
    fc.property(inputs, (given) => {
      expect(forecastPack(structuredClone(given))).toEqual(forecastPack(given));
    }),
    { numRuns: 40 },
  );
});

test("a device that draws more stops earlier", () => {
  fc.assert(
    fc.property(
      number(20, 2000),
      number(1.05, 4),
      fc.constantFrom(...CHEMISTRIES),
      number(0, 900),
      (draw, more, chemistry, elapsed) => {
        const nominalMv = CURVES[chemistry].elementMv;
        const p50 = (ua: number) =>
          forecastPack(
            input({
              pack: pack({
                cell: { ...LR6, chemistry, nominalMv },
                cutoffMv: 2.1 * nominalMv,
                measuredDraw: { averageUa: ua, relativeSd: 0.1 },
              }),
              now: 19_000 + elapsed,
            }),
          ).quantiles.p50;
        expect(p50(draw * more)).toBeLessThan(p50(draw) + 1e-6);
      },
    ),
    { numRuns: 80 },
  );
});

test("the expected band is ordered and finite on any date", () => {
  fc.assert(
    fc.property(inputs, number(14_000, 26_000), (given, at) => {
      for (const kind of ["resting", "loaded"] as const) {
        const [band] = expectedVoltage(given, [at], { kind, loadUa: null, temperatureDc: null });
        expect(Number.isFinite(band!.midMv)).toBe(true);
        expect(band!.lowMv).toBeLessThanOrEqual(band!.midMv);
        expect(band!.midMv).toBeLessThanOrEqual(band!.highMv);
      }
    }),
    { numRuns: 60 },
  );
});

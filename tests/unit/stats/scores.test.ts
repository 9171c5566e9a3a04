import { expect, test } from "vitest";
import { errorFunction } from "simple-statistics";
import { coverageBand, wilson } from "../../../lib/stats/coverage";
import { gridQuantile } from "../../../lib/stats/grid-quantile";
import { interpolate } from "../../../lib/stats/interpolate";
import { normalCdf, normalQuantile } from "../../../lib/stats/normal";
import {
  alphaMass,
  crpsNormal,
  crpsSample,
  intervalScore,
  pinball,
  relativeAccuracy,
  withinAlpha,
} from "../../../lib/stats/scores";

// Gneiting & Raftery, JASA 102, 2007 (formula from memory), recomputed independently.
test.each([
  [0, 1, 0, 0.233695],
  [0, 1, 1, 0.602441],
  [100, 15, 130, 21.791877],
])("CRPS of N(%f, %f) at %f", (mean, sd, y, crps) => {
  expect(crpsNormal(mean, sd, y)).toBeCloseTo(crps, 5);
});

// E|X-y| - E|X-X'|/2 worked by hand: 10 - 6.25.
test("CRPS of a sample", () => {
  expect(crpsSample([90, 100, 110, 120], 105)).toBeCloseTo(3.75, 9);
});

test("CRPS of many normal quantiles approaches the closed form", () => {
  const sample = Array.from({ length: 4000 }, (_, i) => normalQuantile((i + 0.5) / 4000));
  expect(crpsSample(sample, 1)).toBeCloseTo(0.602441, 3);
});

// Definition of the pinball loss.
test("pinball", () => {
  expect(pinball(0.9, 8, 10)).toBeCloseTo(1.8, 9);
  expect(pinball(0.9, 12, 10)).toBeCloseTo(0.2, 9);
});

// Gneiting & Raftery 2007, eq. 43: u - l + (2/a) miss.
test("interval score", () => {
  expect(intervalScore(0.2, 10, 20, 15)).toBeCloseTo(10, 9);
  expect(intervalScore(0.2, 10, 20, 22)).toBeCloseTo(30, 9);
});

// Saxena et al., IJPHM 2010; definition as in nasa/progpy toe_profile_metrics.py.
test("relative accuracy and alpha", () => {
  expect(relativeAccuracy(100, 85)).toBeCloseTo(0.85, 9);
  expect(withinAlpha(0.2, 100, 81)).toBe(true);
  expect(withinAlpha(0.2, 100, 79)).toBe(false);
  expect(alphaMass(0.2, 100, 50, (d) => normalCdf((d - 100) / 10))).toBeCloseTo(0.682689, 6);
});

// Binomial 2.5-97.5 % quantiles, computed independently (scipy).
test("band of hits by chance", () => {
  expect(coverageBand(100, 0.9)).toEqual([84, 95]);
  expect(coverageBand(200, 0.8)).toEqual([149, 171]);
});

// Wilson 1927, computed independently.
test("Wilson interval of 86 in 100", () => {
  const [low, high] = wilson(86, 100);
  expect(low).toBeCloseTo(0.778628, 5);
  expect(high).toBeCloseTo(0.914737, 5);
});

// simple-statistics 7.12, an independent library; its own error is about 1e-7.
test.each([-8, -3.2, -1, -0.1, 0, 0.7, 2.9, 3.1, 6])("normal CDF at %f", (z) => {
  expect(normalCdf(z)).toBeCloseTo((1 + errorFunction(z / Math.SQRT2)) / 2, 6);
  expect(normalQuantile(normalCdf(z))).toBeCloseTo(z, z > 5 ? 4 : 9);
});

// Abramowitz & Stegun table 26.1: P(1.96) and the 99th percentile.
test("normal distribution's printed values", () => {
  expect(normalCdf(1.96)).toBeCloseTo(0.97500210485178, 12);
  expect(normalQuantile(0.99)).toBeCloseTo(2.3263478740408, 10);
});

test("interpolation never extrapolates", () => {
  expect(interpolate([1, 2, 4], [10, 20, 0], 3)).toBe(10);
  expect(interpolate([1, 2, 4], [10, 20, 0], -5)).toBe(10);
  expect(interpolate([1, 2, 4], [10, 20, 0], 99)).toBe(0);
});

// An even mass over three cells of width 2 around 0, 2, 4 is uniform on -1..5.
test("quantile of an even mass is that of a uniform", () => {
  expect(gridQuantile([1, 1, 1], 0, 2, 0.5)).toBeCloseTo(2, 12);
  expect(gridQuantile([1, 1, 1], 0, 2, 0.1)).toBeCloseTo(-0.4, 12);
  expect(gridQuantile([0, 0], 0, 2, 0.1)).toBeNaN();
});

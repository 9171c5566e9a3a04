import fc from "fast-check";
import { expect, test } from "vitest";
import { DAYS_PER_YEAR, MONTH_STARTS, monthOf } from "../../../lib/battery/climate";
import {
  ageing,
  doublingEnergy,
  equivalentCelsius,
  meanFactor,
  tenDegreeFactor,
} from "../../../lib/battery/self-discharge";

// Identity Ea = R ln 2 / (1/T1 - 1/T2).
test("the ten-degree rule is 51.2 kJ/mol between 20 and 30 °C", () => {
  expect(doublingEnergy(20, 30) / 1000).toBeCloseTo(51.216, 2);
  expect(tenDegreeFactor(30)).toBe(2);
});

// Computed by hand: (2^-2 + 2^2)/2; at the mean temperature it would be 1.
test("half a year at 0 °C and half at 40 °C", () => {
  expect(meanFactor([0, 40])).toBeCloseTo(2.125, 9);
  expect(equivalentCelsius(2.125)).toBeCloseTo(30.875, 3);
});

// Closed form 2^-0.5 I0(1.5 ln 2), I0 the modified Bessel function.
test("a year swinging 15 +/- 15 °C", () => {
  const days = Array.from({ length: 3650 }, (_, d) => 15 + 15 * Math.sin((2 * Math.PI * d) / 3650));
  expect(meanFactor(days)).toBeCloseTo(0.911511, 4);
  expect(equivalentCelsius(0.911511)).toBeCloseTo(18.663, 3);
});

test("over whole years the climate's integral is its mean factor", () => {
  const year = ageing([0, 0, 0, 0, 0, 0, 400, 400, 400, 400, 400, 400]);
  expect(year.between(100, 100 + 3 * DAYS_PER_YEAR)).toBeCloseTo(
    3 * DAYS_PER_YEAR * year.meanFactor,
    6,
  );
  // July to December hold 184 of 365.2425 days
  expect(year.meanFactor).toBeCloseTo((0.25 * 181.2425 + 4 * 184) / 365.2425, 9);
});

test("ageing adds up over any division of time and never runs back", () => {
  const climate = ageing([-100, 0, 50, 100, 150, 200, 250, 250, 200, 100, 0, -50]);
  const day = fc.double({ min: -4000, max: 40_000, noNaN: true });
  fc.assert(
    fc.property(day, day, day, (a, b, c) => {
      const whole = climate.between(a, c);
      expect(climate.between(a, b) + climate.between(b, c)).toBeCloseTo(whole, 5);
      if (c > a) expect(whole).toBeGreaterThanOrEqual(0);
    }),
  );
});

// The Gregorian calendar.
test("months begin on their days", () => {
  expect(MONTH_STARTS[12]).toBeCloseTo(DAYS_PER_YEAR, 9);
  const day = (iso: string) => Date.parse(`${iso}T12:00:00Z`) / 86_400_000;
  expect(monthOf(day("2026-01-15"))).toBe(0);
  expect(monthOf(day("2026-07-15"))).toBe(6);
  expect(monthOf(day("1965-12-15"))).toBe(11);
  expect(monthOf(day("2027-03-10"))).toBe(2);
});

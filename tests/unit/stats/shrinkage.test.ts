import { expect, test } from "vitest";
import { poolGroups, shrink } from "../../../lib/stats/shrinkage";

// Rubin 1981, in Gelman et al., Bayesian Data Analysis (data from memory): eight schools. The
// moment estimate of the variance between them is 0, which must not break anything.
const SCHOOLS = [28, 8, -3, 7, -1, 1, 18, 12].map((mean, i) => ({
  mean,
  se: [15, 10, 16, 11, 9, 11, 10, 18][i]!,
}));

test("eight schools pool completely", () => {
  const pool = poolGroups(SCHOOLS)!;
  expect(pool.mean).toBeCloseTo(7.685617, 5);
  expect(pool.se).toBeCloseTo(4.071919, 5);
  expect(pool.q).toBeCloseTo(4.707079, 5);
  expect(pool.tau2).toBe(0);
  const first = shrink(SCHOOLS[0]!, pool);
  expect(first.mean).toBeCloseTo(pool.mean, 9);
  expect(first.se).toBeCloseTo(pool.se, 9);
});

// By hand: two groups at 0 and 10 with error 1: Q = 50, tau² = (50 - 1)/(2 - 1) = 49.
test("far groups keep their own mean, drawn in by B = 1/50", () => {
  const groups = [
    { mean: 0, se: 1 },
    { mean: 10, se: 1 },
  ];
  const pool = poolGroups(groups)!;
  expect(pool.tau2).toBeCloseTo(49, 9);
  expect(shrink(groups[1]!, pool).mean).toBeCloseTo(10 - 5 / 50, 9);
});

test("one group and none", () => {
  expect(poolGroups([])).toBeNull();
  expect(poolGroups([{ mean: 3, se: 2 }])).toMatchObject({ mean: 3, se: 2, tau2: 0 });
});

import loadHighs, { type Highs } from "highs";
import { beforeAll, describe, expect, it } from "vitest";
import { checkPlan } from "../../../lib/routing/check";
import { afterIterations, solve } from "../../../lib/routing/solve";
import { seededRng } from "../../../lib/routing/rng";
import { milpText } from "./milp";
import { randomProblem } from "./random-problem";

const MISSED = 1_000_000;

/**
 * Truth: the optimum of an independent MILP, solved by HiGHS (Huangfu & Hall 2018,
 * doi 10.1007/s12532-017-0130-5). Costs are integers, so that they must be equal.
 */
describe("small problems reach the MILP optimum", () => {
  let highs: Highs;
  beforeAll(async () => {
    highs = await loadHighs();
  });

  const shapes = [
    { sites: 4, days: 1, technicians: 1, breaks: false },
    { sites: 5, days: 2, technicians: 1, breaks: false },
    { sites: 6, days: 2, technicians: 2, breaks: false },
    { sites: 7, days: 1, technicians: 2, breaks: false },
  ];
  const scarce = [
    { sites: 5, days: 2, technicians: 1, breaks: false, stock: true },
    { sites: 6, days: 2, technicians: 2, breaks: false, stock: true },
  ];
  const cases = [...shapes, ...scarce].flatMap((shape) =>
    [1, 2, 3, 4].map((seed) => ({ stock: false, ...shape, seed })),
  );

  it.each(cases)(
    "$sites sites, $days days, $technicians technicians, seed $seed, stock short: $stock",
    (shape) => {
      const problem = randomProblem(shape.seed, shape);
      const exact = highs.solve(milpText(problem, MISSED), { mip_rel_gap: 0, output_flag: false });
      expect(exact.Status).toBe("Optimal");
      const found = solve(problem, afterIterations(4000), seededRng(7));
      expect(checkPlan(problem, found.routes).faults).toEqual([]);
      const cost = found.cost.total + MISSED * found.missedMust.length;
      expect(cost).toBe(Math.round(exact.ObjectiveValue));
    },
    60_000,
  );
});

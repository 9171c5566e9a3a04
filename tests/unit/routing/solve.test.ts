import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { checkPlan } from "../../../lib/routing/check";
import { planCost, priceEdit, whyLeftOut, type Edit } from "../../../lib/routing/evaluate";
import type { Problem } from "../../../lib/routing/problem";
import { seededRng } from "../../../lib/routing/rng";
import { afterIterations, solve } from "../../../lib/routing/solve";
import { randomProblem } from "./random-problem";

const shape = fc.record({
  sites: fc.integer({ min: 0, max: 25 }),
  days: fc.integer({ min: 1, max: 3 }),
  technicians: fc.integer({ min: 0, max: 3 }),
  breaks: fc.boolean(),
  stock: fc.boolean(),
});
const anyProblem = fc
  .tuple(fc.integer({ min: 1, max: 1_000_000 }), shape)
  .map(([seed, s]) => randomProblem(seed, { ...s, technicians: Math.max(1, s.technicians) }));

/** The checker walks the wall clock and shares no code with the search: it is the truth here. */
describe("every plan passes the independent checker", () => {
  it("has no fault and costs what the checker adds up", () => {
    fc.assert(
      fc.property(anyProblem, fc.integer({ min: 1, max: 99 }), (problem, seed) => {
        const found = solve(problem, afterIterations(400), seededRng(seed));
        const check = checkPlan(problem, found.routes);
        expect(check.faults).toEqual([]);
        expect(check.cost).toBe(found.cost.total);
        expect(check.missedMust).toBe(found.missedMust.length);
      }),
      { numRuns: 60 },
    );
  });

  it("keeps frozen stops first and in order, whatever rule they break", () => {
    fc.assert(
      fc.property(anyProblem, (problem) => {
        const free = problem.sites.flatMap((s, i) => (s.lockedTo === undefined ? [i] : []));
        const frozen = free.slice(0, 2).reverse();
        const fixed: Problem = {
          ...problem,
          slots: problem.slots.map((slot, r) => (r === 0 ? { ...slot, frozen } : slot)),
        };
        const found = solve(fixed, afterIterations(300), seededRng(3));
        expect(found.routes[0]?.slice(0, frozen.length)).toEqual(frozen);
        expect(checkPlan(fixed, found.routes).faults).toEqual([]);
      }),
      { numRuns: 40 },
    );
  });
});

describe("the price of an edit", () => {
  it("is the difference of the checker's costs, and refuses what the checker faults", () => {
    fc.assert(
      fc.property(anyProblem, fc.nat(), fc.nat(), fc.nat(), (problem, a, b, c) => {
        fc.pre(problem.sites.length > 0);
        const found = solve(problem, afterIterations(100), seededRng(5));
        const site = a % problem.sites.length;
        const slot = b % problem.slots.length;
        const placed = found.routes.some((route) => route.includes(site));
        const edits: Edit[] = placed
          ? [
              { kind: "remove", site },
              { kind: "move", site, slot, position: c % 4 },
            ]
          : [{ kind: "insert", site, slot }];
        edits.push({ kind: "reorder", slot, order: [...(found.routes[slot] ?? [])].reverse() });
        for (const edit of edits) {
          const priced = priceEdit(problem, found.routes, edit);
          const after = checkPlan(problem, priced.routes);
          expect(priced.change.total).toBe(after.cost - checkPlan(problem, found.routes).cost);
          if (edit.kind !== "remove") {
            const codes = [...new Set(after.faults.map((fault) => fault.code))].sort();
            const same = codes.map((code) => (code === "lock_broken" ? "locked" : code));
            expect([...new Set(priced.refusals.map((refusal) => refusal.code))].sort()).toEqual(
              same.sort(),
            );
          }
        }
      }),
      { numRuns: 60 },
    );
  });

  it("has no free insertion left that the search passed over", () => {
    fc.assert(
      fc.property(anyProblem, (problem) => {
        const found = solve(problem, afterIterations(600), seededRng(5));
        for (const site of found.leftOut) {
          const { fixed, fits } = whyLeftOut(problem, found.routes, site);
          const open = fixed.map((refusals, slot) => {
            const priced = priceEdit(problem, found.routes, { kind: "insert", site, slot });
            const lets = refusals.length === 0 && priced.refusals.length === 0;
            if (lets) expect(priced.change.total).toBeGreaterThanOrEqual(0);
            if (lets) expect(found.missedMust).not.toContain(site);
            return lets;
          });
          expect(fits).toBe(open.includes(true));
        }
      }),
      { numRuns: 30 },
    );
  });
});

describe("repeatability", () => {
  const problem = randomProblem(11, { sites: 40, days: 3, technicians: 2, breaks: true });

  it("gives the same plan for the same seed and iterations", () => {
    const [a, b] = [1, 2].map(() => solve(problem, afterIterations(3000), seededRng(42)));
    expect(a).toEqual(b);
  });

  it("depends on the seed", () => {
    const short = (seed: number) => solve(problem, afterIterations(64), seededRng(seed)).routes;
    expect(short(1)).not.toEqual(short(2));
  });
});

describe("elites", () => {
  const problem = randomProblem(12, { sites: 30, days: 2, technicians: 2, breaks: false });

  it("starts from a given plan and never ends above it", () => {
    const first = solve(problem, afterIterations(2000), seededRng(1));
    const second = solve(problem, afterIterations(64), seededRng(2), { start: first.routes });
    expect(second.cost.total).toBeLessThanOrEqual(first.cost.total);
  });

  it("takes a better plan over from the progress call", () => {
    const good = solve(problem, afterIterations(4000), seededRng(1));
    const helped = solve(problem, afterIterations(64), seededRng(9), {}, () => good.routes);
    expect(helped.cost.total).toBeLessThanOrEqual(good.cost.total);
  });

  it("reports a best cost that only falls, and ends on it", () => {
    const seen: number[] = [];
    const end = solve(problem, afterIterations(2000), seededRng(4), {}, ({ best }) => {
      seen.push(best);
    });
    expect(seen).toEqual([...seen].sort((a, b) => b - a));
    if (end.missedMust.length === 0) expect(seen.at(-1)).toBe(end.cost.total);
  });
});

describe("degenerate problems", () => {
  const empty = randomProblem(1, { sites: 0, days: 1, technicians: 1, breaks: false });

  it("plans nothing for no sites, and for no slots leaves everything out", () => {
    expect(solve(empty, afterIterations(100), seededRng(1)).routes).toEqual([[]]);
    const full = randomProblem(3, { sites: 5, days: 1, technicians: 1, breaks: false });
    const sites = full.sites.map(({ lockedTo: _, previous: __, ...site }) => site);
    const none = solve({ ...full, sites, slots: [] }, afterIterations(100), seededRng(1));
    expect(none.routes).toEqual([]);
    expect(none.leftOut).toHaveLength(5);
  });

  it("names a must site that no slot can take", () => {
    const full = randomProblem(4, { sites: 4, days: 1, technicians: 1, breaks: false });
    const sites = full.sites.map((site) => ({ ...site, must: true, firstDay: 1 }));
    const found = solve({ ...full, sites }, afterIterations(200), seededRng(1));
    expect(found.missedMust).toEqual([0, 1, 2, 3]);
    expect(whyLeftOut({ ...full, sites }, found.routes, 2)).toMatchObject({
      fixed: [[{ code: "notice" }]],
      fits: false,
    });
  });

  it("holds more stops than the first row size, all at one place", () => {
    const base = randomProblem(5, { sites: 1, days: 1, technicians: 1, breaks: false });
    const { lockedTo: _, previous: __, ...site } = base.sites[0]!;
    const wide = [{ openS: 0, closeS: 86_400 }];
    const easy = { ...site, serviceS: 1, windows: wide, must: true, skills: 0, demand: [0, 0] };
    const sites = Array.from({ length: 90 }, (_x, i) => ({ ...easy, id: `${i}`, firstDay: 0 }));
    const slots = [{ ...base.slots[0]!, overtimeS: 40_000 }];
    const found = solve({ ...base, sites, slots }, afterIterations(200), seededRng(1));
    expect(found.routes[0]).toHaveLength(90);
    expect(planCost({ ...base, sites, slots }, found.routes).total).toBe(found.cost.total);
  });
});

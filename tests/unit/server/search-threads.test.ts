import { afterAll, describe, expect, it } from "vitest";
import { checkPlan } from "@/lib/routing/check";
import { planCost } from "@/lib/routing/evaluate";
import { Race } from "@/lib/server/search-threads/race";
import { searchBeside } from "@/lib/server/search-threads/search-beside";
import { randomProblem } from "../routing/random-problem";

const problem = randomProblem(21, {
  sites: 40,
  days: 2,
  technicians: 2,
  breaks: true,
  stock: true,
});
const limit = { kind: "turns", turns: 4000 } as const;
const race = new Race(2);
afterAll(() => race.close());

describe("two searches that hand each other their plans", () => {
  it("end on the same sound plan for the same seed and turns, however the threads run", async () => {
    const first = await race.run({ problem, options: {}, seed: 5, limit });
    const again = await race.run({ problem, options: {}, seed: 5, limit });
    expect(again.routes).toEqual(first.routes);
    expect(first.iterations).toBe(2 * 4032);
    expect(checkPlan(problem, first.routes)).toMatchObject({ faults: [] });
  });

  it("say how far they are, and stop when nobody wants the plan any more", async () => {
    const shares: number[] = [];
    const asked = { problem, turns: 4000, options: {}, seed: 5 };
    const routes = await searchBeside(asked, async ({ share }) => {
      shares.push(share);
      return "go on";
    });
    expect(routes).not.toBeNull();
    expect(shares.length).toBeGreaterThan(5);
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
    const long = { ...asked, turns: 600_000 };
    expect(await searchBeside(long, async () => "drop")).toBeNull();
  }, 20_000);

  it("stop early with the best so far, and never with less than they began with", async () => {
    const { routes: start } = await race.run({ problem, options: {}, seed: 5, limit });
    const costs: number[] = [];
    const long = { problem, turns: 600_000, options: { start }, seed: 6 };
    const routes = await searchBeside(long, async ({ cost }) => {
      costs.push(cost);
      return "enough";
    });
    // a dozen news are sent in a whole run
    expect(costs.length).toBeLessThan(6);
    expect(checkPlan(problem, routes ?? [])).toMatchObject({ faults: [] });
    expect(planCost(problem, routes ?? []).total).toBeLessThanOrEqual(
      planCost(problem, start).total + 1e-6,
    );
  }, 60_000);

  it("pass an error of a thread on", async () => {
    const broken = new Race(2);
    const wrong = { ...problem, days: -1 };
    await expect(broken.run({ problem: wrong, options: {}, seed: 1, limit })).rejects.toThrow();
    await broken.close();
  });
});

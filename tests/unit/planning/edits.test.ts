import { describe, expect, it } from "vitest";
import { priceAct, slotIndex, visitIndex } from "@/lib/planning/edits";
import type { KnownVisit } from "@/lib/planning/fleet";
import { prepareKnown, problemOf, type PlanInput } from "@/lib/planning/plan";
import { knownRoutes, placesOf } from "@/lib/planning/problem";
import { swapTask } from "@/lib/planning/due";
import { planFigures } from "@/lib/planning/rounds";
import { greatCircleTable } from "@/lib/planning/travel";
import { planCost } from "@/lib/routing/evaluate";
import { evenLife, pack, planInput, ROAD, site, technician } from "./district";

const write = (day: string) => day;

function plan(more: Partial<PlanInput> = {}) {
  const sites = more.sites ?? [site(0), site(1), site(2)];
  const packs = sites.map((s, i) => pack(i, s.siteId, { life: evenLife("2026-12-07", -2, 40) }));
  const bare = planInput({ packs, ...more, sites });
  const known = bare.known.length > 0 ? bare.known : visits(bare, [0, 1, 2]);
  const input = { ...bare, known };
  const prepared = prepareKnown(input, []);
  const travel = greatCircleTable(placesOf(input.technicians, prepared.visits), ROAD);
  const rounds = problemOf(prepared, travel);
  return { input, rounds, routes: knownRoutes(rounds, known) };
}

function visits(input: PlanInput, sites: number[], day = "2026-12-08"): KnownVisit[] {
  return sites.map((i) => ({
    siteId: `site-${i}`,
    technicianId: "technician-0",
    day,
    position: i + 1,
    locked: false,
    tasks: [swapTask({ pack: input.packs[i]! } as never)],
  }));
}

function move(p: ReturnType<typeof plan>, siteId: string, technicianId: string, day: string) {
  const edit = {
    kind: "move" as const,
    site: visitIndex(p.rounds, siteId),
    slot: slotIndex(p.rounds, technicianId, day),
  };
  return priceAct(p.rounds, p.routes, edit, write);
}

describe("the price of an act", () => {
  it("is exactly the difference of two whole plans", () => {
    const p = plan();
    const act = move(p, "site-1", "technician-1", "2026-12-10");
    const [was, is] = [p.routes, act.routes].map((r) => planFigures(p.rounds, r));
    expect(act.refusals).toEqual([]);
    expect(act.dutyS).toBe(is!.dutyS - was!.dutyS);
    expect(act.costMinor).toBeCloseTo(
      is!.crewMinor + is!.travelMinor - was!.crewMinor - was!.travelMinor,
      3,
    );
    expect(act.riskMinor).toBeCloseTo(is!.riskMinor - was!.riskMinor, 3);
    const cost = (r: typeof act.routes) => planCost(p.rounds.problem, r).total / 1000;
    expect(act.totalMinor).toBeCloseTo(cost(act.routes) - cost(p.routes), 3);
  });

  it("grows in risk when a pack that may be out waits longer", () => {
    const p = plan();
    expect(move(p, "site-0", "technician-0", "2026-12-11").riskMinor).toBeGreaterThan(0);
    expect(move(p, "site-0", "technician-0", "2026-12-07").riskMinor).toBeLessThan(0);
  });

  it("says why a stop cannot go there", () => {
    const sites = [
      site(0, { tickets: ["boat"] }),
      site(1, { noticeDays: 8 }),
      site(2, {
        closures: [{ firstMonthDay: "12-10", lastMonthDay: "01-31", reason: "wintering birds" }],
      }),
    ];
    const p = plan({ sites, technicians: [technician(0, { tickets: ["boat"] }), technician(1)] });
    expect(move(p, "site-0", "technician-1", "2026-12-09").refusals.join()).toContain(
      "needs a boat ticket, which Bram does not hold",
    );
    expect(move(p, "site-1", "technician-0", "2026-12-08").refusals).toEqual([]);
    expect(move(p, "site-1", "technician-0", "2026-12-07").refusals.join()).toContain(
      "needs 8 days' notice: not before 2026-12-09",
    );
    expect(move(p, "site-2", "technician-0", "2026-12-10").refusals.join()).toContain(
      "wintering birds",
    );
  });

  it("refuses a round that no shift can hold", () => {
    const far = site(1, { latitude: 56.5, longitude: -3 });
    const p = plan({ sites: [site(0), far, site(2)], known: [] });
    expect(move(p, "site-1", "technician-1", "2026-12-09").refusals.join()).toContain(
      "beyond Bram's shift",
    );
  });
});

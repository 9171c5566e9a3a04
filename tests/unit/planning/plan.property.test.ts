import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { TICKETS, type PlanningSite, type PlanningTechnician } from "@/lib/planning/fleet";
import { makePlan, preparePlan, problemOf, type PlanInput } from "@/lib/planning/plan";
import { placesOf } from "@/lib/planning/problem";
import { greatCircleTable } from "@/lib/planning/travel";
import { checkPlan } from "@/lib/routing/check";
import { seededRng } from "@/lib/routing/rng";
import { afterIterations } from "@/lib/routing/solve";
import { evenLife, pack, planInput, ROAD, site, technician } from "./district";
import { faultsOf } from "./feasible";

const ticket = fc.subarray([...TICKETS], { maxLength: 1 });
const monthDay = fc.constantFrom("11-15", "12-05", "12-09", "12-10", "12-24", "01-10");

const anySite = fc.record({
  noticeDays: fc.constantFrom(0, 0, 0, 5, 8, 14),
  hours: fc.constantFrom(null, null, { opensS: 36_000, closesS: 50_400 }),
  tickets: ticket,
  closures: fc.array(
    fc.record({ firstMonthDay: monthDay, lastMonthDay: monthDay, reason: fc.constant("nesting") }),
    { maxLength: 1 },
  ),
}) satisfies fc.Arbitrary<Partial<PlanningSite>>;

const anyTechnician = fc.record({
  tickets: fc.subarray([...TICKETS]),
  vanCells: fc.constantFrom(null, 12, 40),
  takenDays: fc.subarray(["2026-12-08", "2026-12-10"]),
  absences: fc.constantFrom([], [{ firstDay: "2026-12-09", lastDay: "2026-12-09", reason: "" }]),
}) satisfies fc.Arbitrary<Partial<PlanningTechnician>>;

const anyPack = fc.record({
  from: fc.integer({ min: -30, max: 200 }),
  spread: fc.integer({ min: 1, max: 300 }),
  cells: fc.integer({ min: 1, max: 8 }),
  type: fc.constantFrom("LR20", "ER34615"),
  silence: fc.integer({ min: 0, max: 600 }),
});

/** Weeks around both changes of the clocks in London, and one in between. */
const anyWeek = fc.constantFrom(
  { now: "2026-12-01T09:00:00Z", firstDay: "2026-12-07", lastDay: "2026-12-11" },
  { now: "2027-03-26T09:00:00Z", firstDay: "2027-03-26", lastDay: "2027-03-30" },
  { now: "2027-10-29T11:30:00Z", firstDay: "2027-10-29", lastDay: "2027-11-02" },
);

const anyInput = fc
  .record({
    week: anyWeek,
    sites: fc.array(anySite, { minLength: 1, maxLength: 14 }),
    technicians: fc.array(anyTechnician, { minLength: 1, maxLength: 3 }),
    packs: fc.array(fc.tuple(fc.nat(), anyPack), { minLength: 1, maxLength: 24 }),
    onHand: fc.integer({ min: 0, max: 60 }),
    everyDay: fc.boolean(),
  })
  .map(({ week, sites, technicians, packs, onHand, everyDay }): PlanInput => {
    const weekdays = everyDay ? [1, 2, 3, 4, 5, 6, 7] : [1, 2, 3, 4, 5];
    return planInput({
      frame: {
        timeZone: "Europe/London",
        now: new Date(week.now),
        firstDay: week.firstDay,
        lastDay: week.lastDay,
        workingDays: weekdays,
      },
      sites: sites.map((more, i) => site(i, more)),
      technicians: technicians.map((more, i) =>
        technician(i, {
          ...more,
          // Every other one has a break, from 11:30 to 12:15.
          shifts: weekdays.map((weekday) => ({
            ...{ weekday, startsS: 25_200, endsS: 54_000 },
            pause: i % 2 === 0 ? { startsS: 41_400, endsS: 44_100 } : null,
          })),
        }),
      ),
      packs: packs.map(([at, p], i) =>
        pack(i, `site-${at % sites.length}`, {
          life: evenLife(week.firstDay, p.from, p.from + p.spread),
          cells: p.cells,
          cellTypeId: p.type,
          silenceMinorPerHour: p.silence,
        }),
      ),
      cellsOnHand: new Map([["LR20", onHand]]).set("ER34615", 25),
    });
  });

function planned(input: PlanInput, seed = 1) {
  const prepared = preparePlan(input);
  const travel = greatCircleTable(placesOf(input.technicians, prepared.visits), ROAD);
  const search = { stop: afterIterations(640), rng: seededRng(seed) };
  return { problem: problemOf(prepared, travel), plan: makePlan(prepared, travel, search) };
}

describe("any plan", () => {
  it("breaks no rule, by an independent checker of instants and wall clocks", () => {
    fc.assert(
      fc.property(anyInput, (input) => {
        expect(faultsOf(input, planned(input).plan.rounds)).toEqual([]);
      }),
      { numRuns: 120, seed: 20261201 },
    );
  });

  it("passes the routing core's own plan checker and is repeatable", () => {
    fc.assert(
      fc.property(anyInput, fc.integer({ min: 1, max: 999 }), (input, seed) => {
        const { plan, problem } = planned(input, seed);
        expect(checkPlan(problem.problem, plan.routes).faults).toEqual([]);
        expect(planned(input, seed).plan.rounds).toEqual(plan.rounds);
      }),
      { numRuns: 40, seed: 20261202 },
    );
  });

  it("accounts for every due pack: visited, or left out with a reason", () => {
    fc.assert(
      fc.property(anyInput, (input) => {
        const prepared = preparePlan(input);
        const { plan } = planned(input);
        const visited = new Set(
          plan.rounds.flatMap((r) =>
            r.stops.flatMap((s) => s.tasks.flatMap((t) => (t.kind === "swap" ? t.assetId : []))),
          ),
        );
        const left = new Set(plan.leftOut.map((l) => l.assetId));
        const due = prepared.outlooks.flatMap((s) =>
          s.outlooks.filter((o) => o.standing === "due"),
        );
        for (const { pack: p } of due) {
          expect(visited.has(p.assetId) !== left.has(p.assetId)).toBe(true);
        }
        for (const row of plan.leftOut) expect(row.detail).not.toBe("");
      }),
      { numRuns: 60, seed: 20261203 },
    );
  });
});

it("the checker itself sees planted faults", () => {
  const life = evenLife("2026-12-07", -5, 12);
  const packs = [0, 1].map((i) => pack(i, `site-${i}`, { life, silenceMinorPerHour: 300 }));
  const input = planInput({ packs });
  const { plan } = planned(input);
  const round = plan.rounds[0]!;
  const shift = (at: Date, hours: number) => new Date(at.getTime() + hours * 3_600_000);
  const away = technician(0, {
    absences: [{ firstDay: "2026-12-01", lastDay: "2026-12-31", reason: "" }],
  });
  const all = { ...input, technicians: [away, { ...away, technicianId: "technician-1" }] };
  expect(faultsOf(all, plan.rounds).join()).toContain("is away");
  expect(faultsOf(input, [round, round]).join()).toContain("twice");
  const late = { ...round, endsAt: shift(round.endsAt, 12) };
  expect(faultsOf(input, [late]).join()).toContain("ends too late");
  const stop = round.stops[0]!;
  const hasty = { ...stop, arrivesAt: shift(round.startsAt, 0) };
  expect(faultsOf(input, [{ ...round, stops: [hasty] }]).join()).toContain("faster than the road");
});

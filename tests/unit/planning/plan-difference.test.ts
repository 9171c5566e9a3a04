import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type PlacedVisit, planDifference } from "@/lib/planning/plan-difference";
import { differenceWords } from "@/lib/present/plan-difference-words";

const visit = (siteId: string, technicianId: string, day: string): PlacedVisit => ({
  siteId,
  technicianId,
  day,
});
// 2026-12-07 is a Monday.
const before = [
  visit("sluice", "ada", "2026-12-07"),
  visit("pump", "ada", "2026-12-08"),
  visit("weir", "bram", "2026-12-09"),
];

describe("what changes between two plans", () => {
  it("tells moved, new and dropped visits apart, and whose days stay as they are", () => {
    const after = [
      visit("sluice", "ada", "2026-12-07"),
      visit("pump", "bram", "2026-12-08"),
      visit("mere", "bram", "2026-12-10"),
    ];
    const difference = planDifference(before, after);
    expect(difference).toEqual({
      moved: [{ siteId: "pump", from: before[1], to: after[1] }],
      added: [after[2]],
      dropped: [before[2]],
      kept: 1,
      touchedDays: ["2026-12-08", "2026-12-09", "2026-12-10"],
      untouchedDays: ["2026-12-07"],
    });
    expect(differenceWords(difference, "en-GB")).toBe(
      "1 visit moved, 1 new, 1 dropped; nobody's Monday is touched.",
    );
  });

  it("calls a weekday calm only where all of its days are", () => {
    const twoWeeks = [
      ...before,
      visit("barn", "ada", "2026-12-14"),
      visit("dyke", "ada", "2026-12-15"),
    ];
    const after = twoWeeks.map((v) => (v.siteId === "barn" ? { ...v, technicianId: "bram" } : v));
    expect(differenceWords(planDifference(twoWeeks, after), "en-GB")).toBe(
      "1 visit moved; nobody's Tuesday or Wednesday is touched.",
    );
  });

  it("says so when nothing changes, and nothing where nothing was", () => {
    expect(differenceWords(planDifference(before, [...before].reverse()), "en-GB")).toBe(
      "No visit changes its day or its technician.",
    );
    expect(differenceWords(planDifference([], []), "en-GB")).toBe("");
  });

  it("accounts for every visit of both plans, whatever they are", () => {
    const place = fc.record({
      siteId: fc.constantFrom("a", "b", "c"),
      technicianId: fc.constantFrom("x", "y"),
      day: fc.constantFrom("2026-12-07", "2026-12-08", "2026-12-09"),
    });
    const plan = fc.array(place, { maxLength: 8 });
    fc.assert(
      fc.property(plan, plan, (was, is) => {
        const { moved, added, dropped, kept, touchedDays, untouchedDays } = planDifference(was, is);
        expect(kept + moved.length + dropped.length).toBe(was.length);
        expect(kept + moved.length + added.length).toBe(is.length);
        expect(
          moved.every((m) => m.from.day !== m.to.day || m.from.technicianId !== m.to.technicianId),
        ).toBe(true);
        const days = [...new Set([...was, ...is].map((v) => v.day))].sort();
        expect([...touchedDays, ...untouchedDays].sort()).toEqual(days);
      }),
    );
  });
});

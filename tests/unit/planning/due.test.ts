import { describe, expect, it } from "vitest";
import { makePlan, preparePlan } from "@/lib/planning/plan";
import { placesOf } from "@/lib/planning/problem";
import { greatCircleTable } from "@/lib/planning/travel";
import { seededRng } from "@/lib/routing/rng";
import { afterIterations } from "@/lib/routing/solve";
import { evenLife, MONDAY, pack, planInput, ROAD, site } from "./district";

/** One site: a pack that is due, and one with a wide window that is not. */
function tasksWhenReadingTakes(readS: number, silenceMinorPerHour = 60) {
  const prepared = preparePlan(
    planInput({
      sites: [site(0)],
      packs: [
        pack(0, "site-0", { life: evenLife(MONDAY, 1, 10) }),
        pack(1, "site-0", { life: evenLife(MONDAY, 90, 400), readS, silenceMinorPerHour }),
      ],
    }),
  );
  return prepared.visits[0]!.tasks.map(({ kind, assetId }) => `${kind} ${assetId}`);
}

describe("voltages taken on the way", () => {
  // Common sense, no source: a reading cannot save more than not knowing costs.
  it("are taken where they may save more than their minutes cost", () => {
    expect(tasksWhenReadingTakes(120, 600)).toEqual(["swap asset-0", "read asset-1"]);
  });

  it("are left alone where the minutes cost more", () => {
    expect(tasksWhenReadingTakes(7200, 600)).toEqual(["swap asset-0"]);
  });

  it("are left alone where a failure costs nothing", () => {
    expect(tasksWhenReadingTakes(120, 0)).toEqual(["swap asset-0"]);
  });
});

describe("a lonely device of low criticality that is out", () => {
  // Ski rental (Karlin, Manasse, Rudolph & Sleator 1988, from memory): go once what waiting has
  // cost comes to what going costs; then no more than twice the best is ever paid.
  function swapsWhenOutFor(days: number): number {
    const far = { latitude: 53.2, longitude: 1.3 };
    const life = evenLife(MONDAY, -7 - days, -6.9 - days);
    const input = planInput({
      sites: [site(0, far)],
      packs: [pack(0, "site-0", { life, silenceMinorPerHour: 10 })],
    });
    const prepared = preparePlan(input);
    const travel = greatCircleTable(placesOf(input.technicians, prepared.visits), ROAD);
    const search = { stop: afterIterations(320), rng: seededRng(1) };
    return makePlan(prepared, travel, search).figures.swaps;
  }

  it("waits for company at first", () => {
    expect(swapsWhenOutFor(1)).toBe(0);
  });

  it("is not put off week after week", () => {
    expect(swapsWhenOutFor(200)).toBe(1);
  });
});

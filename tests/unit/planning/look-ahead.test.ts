import { describe, expect, it } from "vitest";
import { makePlan, preparePlan, type PlanInput } from "@/lib/planning/plan";
import { placesOf } from "@/lib/planning/problem";
import { greatCircleTable } from "@/lib/planning/travel";
import { seededRng } from "@/lib/routing/rng";
import { afterIterations } from "@/lib/routing/solve";
import { evenLife, MONDAY, pack, planInput, ROAD, site, technician } from "./district";

function planned(input: PlanInput) {
  const prepared = preparePlan(input);
  const travel = greatCircleTable(placesOf(input.technicians, prepared.visits), ROAD);
  return makePlan(prepared, travel, { stop: afterIterations(2000), rng: seededRng(1) });
}

const visited = (plan: ReturnType<typeof planned>) =>
  plan.rounds.flatMap((round) => round.stops.map((stop) => stop.siteId)).sort();

/** Two sites side by side; the second is closed all week, both packs last into the week after. */
const neighbours: Partial<PlanInput> = {
  technicians: [technician(0)],
  sites: [
    site(0, { latitude: 52.9, longitude: 0.5 }),
    site(1, {
      latitude: 52.901,
      longitude: 0.5,
      closures: [{ firstMonthDay: "12-07", lastMonthDay: "12-13", reason: "nesting" }],
    }),
  ],
  packs: [0, 1].map((i) =>
    pack(i, `site-${i}`, { life: evenLife(MONDAY, 12, 16), silenceMinorPerHour: 300 }),
  ),
};

// Two drives of some 80 km against one: by hand, no source.
describe("looking beyond the plan's own days", () => {
  it("leaves to next week what is then done with its neighbour, and says so", () => {
    const plan = planned(planInput({ ...neighbours, lookAheadDays: 7 }));
    expect(visited(plan)).toEqual([]);
    expect(plan.figures).toMatchObject({ swaps: 0, rounds: 0, totalMinor: 0 });
    const [own, closed] = ["asset-0", "asset-1"].map((assetId) =>
      plan.leftOut.find((row) => row.assetId === assetId)!,
    );
    expect(own).toMatchObject({
      reason: "cheaper_later",
      detail: "cheaper later with its neighbour",
    });
    expect(own!.earliestDay! > "2026-12-13" && own!.earliestDay! <= "2026-12-20").toBe(true);
    expect(closed).toMatchObject({ reason: "closed", earliestDay: "2026-12-14" });
  });
});

describe("cells that are short", () => {
  it("go where the drive is shorter, though the other pack is a little more urgent", () => {
    const near = site(0, { latitude: 52.581, longitude: 0.2 });
    const far = site(1, { latitude: 53.1, longitude: 0.9 });
    const input = planInput({
      technicians: [technician(0)],
      sites: [near, far],
      packs: [
        pack(0, "site-0", { life: evenLife(MONDAY, 1, 10), silenceMinorPerHour: 300 }),
        pack(1, "site-1", { life: evenLife(MONDAY, 1, 9.9), silenceMinorPerHour: 300 }),
      ],
      cellsOnHand: new Map([["LR20", 6]]),
    });
    const plan = planned(input);
    expect(visited(plan)).toEqual(["site-0"]);
    expect(plan.leftOut).toMatchObject([
      { assetId: "asset-1", reason: "no_cells", detail: "not enough LR20 on hand" },
    ]);
  });
});

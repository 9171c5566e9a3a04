import { describe, expect, it } from "vitest";
import { readField, readSolomon, readVrplib } from "../../../scripts/bench/routing/instances";
import { checkPlan } from "../../../lib/routing/check";
import { seededRng } from "../../../lib/routing/rng";
import { afterIterations, solve } from "../../../lib/routing/solve";

const solomon = `TINY
VEHICLE
NUMBER     CAPACITY
  2         10
CUSTOMER
CUST NO.  XCOORD.  YCOORD.  DEMAND  READY TIME  DUE DATE  SERVICE TIME
 0  0  0  0  0  100  0
 1  1  1  6  0   50  5
 2  3  4  6  7   50  5
`;

const prizes = `NAME : TINY
VEHICLES : 1
CAPACITY : 10
SERVICE_TIME : 5
NODE_COORD_SECTION
1 0 0
2 3 4
3 90 0
DEMAND_SECTION
1 0
2 6
3 1
TIME_WINDOW_SECTION
1 0 500
2 7 50
3 0 500
PRIZE_SECTION
1 0
2 30
3 25
DEPOT_SECTION
1
-1
EOF`;

const field = JSON.stringify({
  speedUnitsPerMinute: 10,
  days: 2,
  depots: [[0, 0]],
  technicians: [{ id: 0, depot: 0, shift: [480, 1020], vanBatteries: 40 }],
  clients: [
    ...[{ id: 0, x: 0, y: 101, service: 10, batteries: 2, tw: [480, 720] }].map((client) => ({
      ...client,
      visitCost: [9, 4],
      skipCost: 60,
    })),
  ],
});

const solved = (problem: ReturnType<typeof readField>) =>
  solve(problem, afterIterations(200), seededRng(1));

/** Truth: distances and sums done by hand, under the conventions that each format's tables use. */
describe("readers of public instances", () => {
  it("reads Solomon's layout in tenths, cut off", () => {
    const problem = readSolomon(solomon);
    expect(problem.slots).toHaveLength(2);
    // sqrt 2 = 1.41 -> 14; 3-4-5 triangle -> 50. Two vans: 2 * 14 + 2 * 50.
    expect(solved(problem).cost.total).toBe(128);
    expect(problem.sites[1]?.windows).toEqual([{ openS: 70, closeS: 500 }]);
  });

  it("reads prizes: the far customer is not worth the drive", () => {
    const found = solved(readVrplib(prizes));
    expect(found.leftOut).toEqual([1]);
    expect(found.cost.total).toBe(2 * 50 + 250);
  });

  it("reads technicians and days, minutes rounded up", () => {
    const problem = readField(field);
    const found = solved(problem);
    // 101 units at 10 a minute: 11 minutes out and back, on the cheaper second day.
    expect(found.routes).toEqual([[], [0]]);
    expect(checkPlan(problem, found.routes).cost).toBe(22 + 4);
  });
});

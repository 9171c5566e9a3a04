import { describe, expect, it } from "vitest";
import { latestStartS, wallAtEndS, wallAtStartS, workedS } from "../../../lib/routing/clock";
import { assertProblem } from "../../../lib/routing/assert-problem";
import type { Problem, Site } from "../../../lib/routing/problem";
import { scheduleRoute } from "../../../lib/routing/schedule";
import { AppError } from "../../../lib/errors";

const HOUR = 3600;
const noon = [{ openS: 12 * HOUR, closeS: 12.5 * HOUR }];

/** Truth: arithmetic on the clock face, done by hand beside each case. */
describe("the working clock", () => {
  it("cuts breaks out", () => {
    expect(workedS(noon, 11 * HOUR)).toBe(11 * HOUR);
    expect(workedS(noon, 12.25 * HOUR)).toBe(12 * HOUR);
    expect(workedS(noon, 14 * HOUR)).toBe(13.5 * HOUR);
  });

  it("ends work at a break's beginning and starts it at a break's end", () => {
    expect(wallAtEndS(noon, 12 * HOUR)).toBe(12 * HOUR);
    expect(wallAtStartS(noon, 12 * HOUR)).toBe(12.5 * HOUR);
    expect(wallAtEndS(noon, 13 * HOUR)).toBe(13.5 * HOUR);
  });

  it("lets nothing start in a break", () => {
    expect(latestStartS(noon, 12 * HOUR)).toBe(12 * HOUR - 1);
    expect(latestStartS(noon, 12.5 * HOUR)).toBe(12 * HOUR);
  });
});

const site: Site = {
  id: "Sluice 4",
  place: 1,
  serviceS: HOUR,
  windows: [{ openS: 9 * HOUR, closeS: 16 * HOUR }],
  visitCost: [70],
  skipCost: 10,
  must: false,
  skills: 0,
  demand: [4],
  firstDay: 0,
};

/** One technician, one depot, two sites in a row, an hour and 40 km apart each. */
function line(sites: readonly Site[]): Problem {
  const hours = [0, 1, 2, 1, 0, 1, 2, 1, 0];
  return {
    days: 1,
    cellTypes: 1,
    sites,
    slots: [
      {
        ...{ id: "Mon", technician: 0, day: 0, startPlace: 0, endPlace: 0, skills: 0 },
        ...{ startS: 7 * HOUR, endS: 14 * HOUR, overtimeS: 2 * HOUR, overtimePerS: 3 },
        ...{ breaks: noon, capacity: [8], capacityTotal: 8, openingCost: 500, frozen: [] },
      },
    ],
    places: 3,
    travelS: hours.map((hour) => hour * HOUR),
    travelM: hours.map((hour) => hour * 40_000),
    prices: { drivingPerS: 1, dutyPerS: 2, perM: 1 },
  };
}

describe("a route's schedule", () => {
  it("waits at the gate, stands still at noon and pays overtime", () => {
    const problem = line([site, { ...site, id: "Pump house", place: 2 }]);
    const route = scheduleRoute(problem, 0, [0, 1]);
    // 7:00 drive, 8:00 at the gate, 9:00-10:00 work, 11:00-12:00 work, break, 12:30-14:30 home.
    expect(route.stops.map((stop) => [stop.arriveS / HOUR, stop.startS / HOUR])).toEqual([
      [8, 9],
      [11, 11],
    ]);
    expect(route.stops[1]?.leaveS).toBe(12 * HOUR);
    expect(route.returnS).toBe(14.5 * HOUR);
    expect(route.overtimeS).toBe(0.5 * HOUR);
    expect(route.dutyS).toBe(7 * HOUR);
    expect(route.waitS).toBe(HOUR);
    expect(route.cost).toEqual({
      driving: 4 * HOUR + 160_000,
      duty: 14 * HOUR,
      overtime: 1.5 * HOUR,
      opening: 500,
      visits: 140,
      changes: 0,
      skipped: 0,
      total: 19.5 * HOUR + 160_640,
    });
    expect(route.refusals).toEqual([]);
  });

  it("says each reason why a stop cannot be there", () => {
    const codes = (change: Partial<Site>) =>
      scheduleRoute(line([{ ...site, ...change }]), 0, [0]).refusals.map(({ code }) => code);
    expect(codes({})).toEqual([]);
    expect(codes({ skills: 2 })).toEqual(["skill_missing"]);
    expect(codes({ firstDay: 1 })).toEqual(["notice"]);
    expect(codes({ windows: [null] })).toEqual(["site_closed"]);
    expect(codes({ lockedTo: 1 })).toEqual(["locked"]);
    expect(codes({ demand: [9] })).toEqual(["van_full"]);
    expect(codes({ serviceS: 8 * HOUR })).toEqual(["outside_shift"]);
    expect(codes({ windows: [{ openS: 0, closeS: 7 * HOUR }] })).toEqual(["outside_hours"]);
  });
});

describe("a problem that is not whole", () => {
  it("is refused with the field and the mend", () => {
    const broken = line([{ ...site, serviceS: 1.5, visitCost: [], place: 7 }]);
    let faults: readonly string[] = [];
    try {
      assertProblem(broken);
    } catch (error) {
      if (error instanceof AppError) faults = error.faults.map((fault) => fault.field);
    }
    expect(faults).toEqual(["sites[0].place", "sites[0].serviceS", "sites[0].visitCost"]);
  });
});

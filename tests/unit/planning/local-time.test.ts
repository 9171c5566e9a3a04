import { describe, expect, it } from "vitest";
import {
  addDays,
  elapsedOfWall,
  instantOfElapsed,
  instantOfWall,
  localDay,
  mondayOf,
  secondsOfClock,
  weekdayOf,
} from "@/lib/planning/local-time";

// Truths: IANA time zone rules for Europe/London (clocks forward 28 Mar 2027 01:00 UTC, back
// 31 Oct 2027 01:00 UTC) and ISO 8601 weekdays; 1 December 2026 is a Tuesday.
describe("local time", () => {
  const zone = "Europe/London";

  it("knows the calendar", () => {
    expect(weekdayOf("2026-12-01")).toBe(2);
    expect(mondayOf("2026-12-06")).toBe("2026-11-30");
    expect(addDays("2026-12-31", 1)).toBe("2027-01-01");
    expect(localDay(new Date("2026-07-01T23:30:00Z"), zone)).toBe("2026-07-02");
  });

  it("places 08:00 rightly on both days on which the clocks change", () => {
    expect(instantOfWall("2027-03-28", 28_800, zone).toISOString()).toBe(
      "2027-03-28T07:00:00.000Z",
    );
    expect(instantOfWall("2027-10-31", 28_800, zone).toISOString()).toBe(
      "2027-10-31T08:00:00.000Z",
    );
    expect(elapsedOfWall("2027-03-28", 28_800, zone)).toBe(7 * 3600);
    expect(elapsedOfWall("2027-10-31", 28_800, zone)).toBe(9 * 3600);
    expect(elapsedOfWall("2026-12-07", 28_800, zone)).toBe(8 * 3600);
  });

  it("goes back from seconds that passed to the same instant", () => {
    const at = instantOfElapsed("2027-10-31", 9 * 3600, zone);
    expect(at.toISOString()).toBe("2027-10-31T08:00:00.000Z");
  });

  it("reads clock times and refuses others", () => {
    expect(secondsOfClock("07:30:00")).toBe(27_000);
    expect(() => secondsOfClock("7.30")).toThrow(RangeError);
  });
});

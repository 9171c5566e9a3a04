import { describe, expect, it, vi } from "vitest";
import { axisDay, dayFromNumber, dayNumber, dayOfInstant } from "@/lib/present/calendar-days";
import { formatDay, formatDaysAway, formatWindow } from "@/lib/present/format-day";
import { formatToday, isoWeek, weekLabel } from "@/lib/present/format-week";

const NBSP = "\u00a0";
const today = "2026-12-01";

describe("calendar days", () => {
  it("falls on the organisation's day, not on UTC's or the machine's", () => {
    // Offsets of the IANA time zone database: London +1 in July, Auckland +13 in January.
    expect(dayOfInstant(new Date("2026-07-01T23:30Z"), "Europe/London")).toBe("2026-07-02");
    expect(dayOfInstant(new Date("2026-01-01T12:00Z"), "Pacific/Auckland")).toBe("2026-01-02");
    expect(dayOfInstant(new Date("2026-01-01T03:00Z"), "America/New_York")).toBe("2025-12-31");
  });
  it("counts the days of both clock changes as one day each", () => {
    // Directive 2000/84/EC: last Sunday of March and of October, 01:00 UTC.
    expect(dayNumber("2026-03-30") - dayNumber("2026-03-28")).toBe(2);
    expect(dayNumber("2026-10-26") - dayNumber("2026-10-24")).toBe(2);
    for (const hour of ["00:30", "01:30", "12:00", "21:30"]) {
      expect(dayOfInstant(new Date(`2026-03-29T${hour}Z`), "Europe/Berlin")).toBe("2026-03-29");
    }
    expect(axisDay(new Date("2026-03-29T10:00Z"), "Europe/Berlin")).toBe(
      dayNumber("2026-03-29") + 0.5,
    );
    expect(axisDay(new Date("2026-10-25T11:00Z"), "Europe/Berlin")).toBe(
      dayNumber("2026-10-25") + 0.5,
    );
  });
  it("goes to a number and back, and refuses what is no day", () => {
    expect(dayNumber("1970-01-01")).toBe(0);
    expect(dayFromNumber(dayNumber("2028-02-29"))).toBe("2028-02-29");
    expect(() => dayNumber("2026-13-01")).toThrow(/2026-13-01/);
    expect(() => dayNumber("1 Dec")).toThrow(/YYYY-MM-DD/);
  });
});

describe("formatDay", () => {
  it("writes the year only where the day could be mistaken", () => {
    expect(formatDay("2026-12-15", "en-GB", { today })).toBe("15 Dec");
    expect(formatDay("2027-01-03", "en-GB", { today })).toBe("3 Jan");
    expect(formatDay("2027-11-16", "en-GB", { today })).toBe("16 Nov 2027");
    expect(formatDay("2026-12-15", "en-GB")).toBe("15 Dec 2026");
  });
  it("writes the weekday without a comma, in either locale", () => {
    expect(formatDay(today, "en-GB", { weekday: true, year: true })).toBe("Tue 1 Dec 2026");
    // CLDR de: abbreviated weekdays and months carry a full stop.
    expect(formatDay(today, "de-DE", { weekday: true, year: true })).toBe("Di., 1. Dez. 2026");
  });
  it("writes the year of a window once", () => {
    const same = formatWindow(
      { p5: "2027-05-18", p50: "2027-06-09", p95: "2027-07-21" },
      "en-GB",
      today,
    );
    expect([same.from, same.likely, same.to]).toEqual(["18 May", "9 Jun", "21 Jul 2027"]);
    const two = formatWindow(
      { p5: "2027-09-17", p50: "2027-11-16", p95: "2028-02-06" },
      "en-GB",
      today,
    );
    expect(two.text).toBe("17 Sept – 6 Feb 2028, likely 16 Nov 2027");
    const near = formatWindow(
      { p5: "2026-12-05", p50: "2026-12-15", p95: "2027-01-01" },
      "en-GB",
      today,
    );
    expect(near.text).toBe("5 Dec – 1 Jan, likely 15 Dec");
  });
  it("says how far away a day is", () => {
    expect(formatDaysAway("2026-12-01", today)).toBe("today");
    expect(formatDaysAway("2026-12-02", today)).toBe("tomorrow");
    expect(formatDaysAway("2026-11-26", today)).toBe(`5${NBSP}days ago`);
  });
});

describe("ISO 8601 weeks", () => {
  // Week 1 holds the year's first Thursday (ISO 8601-1:2019, 5.2.3.2); examples from memory.
  it.each([
    ["2005-01-01", 2004, 53],
    ["2008-12-29", 2009, 1],
    ["2010-01-03", 2009, 53],
    ["2026-12-01", 2026, 49],
    ["2027-01-01", 2026, 53],
    ["2027-01-04", 2027, 1],
  ])("%s lies in week %i-%i", (day, year, week) => {
    expect(isoWeek(day)).toEqual({ year, week });
  });
  it.each(["America/Los_Angeles", "Pacific/Kiritimati"])("does not ask the machine: %s", (zone) => {
    vi.stubEnv("TZ", zone);
    expect(new Date(0).getTimezoneOffset()).not.toBe(0);
    expect(isoWeek("2027-01-04")).toEqual({ year: 2027, week: 1 });
    expect(isoWeek("2027-01-03")).toEqual({ year: 2026, week: 53 });
    expect(formatDay("2026-12-01", "en-GB", { today })).toBe("1 Dec");
    vi.unstubAllEnvs();
  });
  it("names the week's year where it is another", () => {
    expect(weekLabel("2026-12-14", today)).toBe(`week${NBSP}51`);
    expect(weekLabel("2027-01-04", today)).toBe(`week${NBSP}1 of 2027`);
  });
  it("dates the masthead in the organisation's time zone", () => {
    const gb = { locale: "en-GB", timeZone: "Europe/London", currency: "GBP" };
    expect(formatToday(new Date("2026-11-30T23:59Z"), gb)).toBe(`Mon 30 Nov 2026 · week${NBSP}49`);
    expect(formatToday(new Date("2026-12-01T00:00Z"), gb)).toBe(`Tue 1 Dec 2026 · week${NBSP}49`);
  });
});

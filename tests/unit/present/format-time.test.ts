import { describe, expect, it } from "vitest";
import { formatDuration, formatHours, formatInstant, formatTime } from "@/lib/present/format-time";

const NBSP = "\u00a0";
const london = { locale: "en-GB", timeZone: "Europe/London", currency: "GBP" };
const berlin = { locale: "de-DE", timeZone: "Europe/Berlin", currency: "EUR" };
const howe = { locale: "en-GB", timeZone: "Australia/Lord_Howe", currency: "AUD" };

describe("formatTime", () => {
  it("reads 24 hours in the organisation's zone, summer and winter", () => {
    expect(formatTime(new Date("2026-07-01T08:52Z"), london)).toBe("09:52");
    expect(formatTime(new Date("2026-12-01T09:52Z"), london)).toBe("09:52");
    expect(formatTime(new Date("2026-12-01T23:00Z"), berlin)).toBe("00:00");
  });
  it("names the zone in the hour that comes twice (Directive 2000/84/EC: 25 Oct 2026)", () => {
    expect(formatTime(new Date("2026-10-25T00:30Z"), london)).toBe("01:30 BST");
    expect(formatTime(new Date("2026-10-25T01:30Z"), london)).toBe("01:30 GMT");
    expect(formatTime(new Date("2026-10-25T02:00Z"), london)).toBe("02:00");
    expect(formatTime(new Date("2026-10-25T00:30Z"), berlin)).toBe("02:30 MESZ");
    expect(formatTime(new Date("2026-10-25T01:30Z"), berlin)).toBe("02:30 MEZ");
  });
  it("jumps in spring without a twin (29 Mar 2026)", () => {
    expect(formatTime(new Date("2026-03-29T00:59Z"), london)).toBe("00:59");
    expect(formatTime(new Date("2026-03-29T01:00Z"), london)).toBe("02:00");
    expect(formatTime(new Date("2026-03-29T01:00Z"), berlin)).toBe("03:00");
  });
  it("notices a change of half an hour (IANA: Lord Howe Island, 5 Apr 2026, 15:00 UTC)", () => {
    expect(formatTime(new Date("2026-04-04T14:45Z"), howe)).toMatch(/^01:45 \S+/);
    expect(formatTime(new Date("2026-04-04T15:15Z"), howe)).toMatch(/^01:45 \S+/);
    expect(formatTime(new Date("2026-04-04T15:45Z"), howe)).toBe("02:15");
  });
  it("puts the weekday to an instant", () => {
    const at = new Date("2026-12-01T09:52Z");
    expect(formatInstant(at, london, { today: "2026-12-01" })).toBe("Tue 1 Dec, 09:52");
    expect(formatInstant(at, london)).toBe("Tue 1 Dec 2026, 09:52");
  });
});

describe("lengths of time", () => {
  it("writes working hours with one decimal in the locale's hand", () => {
    expect(formatHours(113_400, "en-GB")).toBe(`31.5${NBSP}h`);
    expect(formatHours(113_400, "de-DE")).toBe(`31,5${NBSP}h`);
  });
  it("never writes sixty minutes", () => {
    expect(formatDuration(3599, "en-GB")).toBe(`1${NBSP}h`);
    expect(formatDuration(24_600, "en-GB")).toBe(`6${NBSP}h 50${NBSP}min`);
    expect(formatDuration(2100, "en-GB")).toBe(`35${NBSP}min`);
    expect(formatDuration(-1200, "en-GB")).toBe(`−20${NBSP}min`);
    expect(formatDuration(-20, "en-GB")).toBe(`0${NBSP}min`);
  });
});

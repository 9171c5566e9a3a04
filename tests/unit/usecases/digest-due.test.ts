import { describe, expect, it } from "vitest";
import { digestDue } from "@/lib/usecases/digest-due";

// Clock changes from the IANA time zone database (release 2025b), file "europe", rules EU and
// GB-Eire: London 2027-03-28 01:00 GMT -> 02:00 BST, 2027-10-31 02:00 BST -> 01:00 GMT; and
// "australasia", rule LH: Lord Howe 2027-04-04 02:00 +11 -> 01:30 +10:30, half an hour.
// 2027-03-28 and 2027-10-31 are Sundays (ISO 8601 weekday 7).
const LONDON = "Europe/London";
const at = (instant: string) => new Date(instant);
const sundays = (sendAt: string, lastSentOn: string | null = null) => ({
  weekdays: [7],
  sendAt,
  lastSentOn,
});

describe("when a digest is due", () => {
  it("waits for the local time, not for that of the server", () => {
    const monday = { weekdays: [1], sendAt: "07:00:00", lastSentOn: null };
    // 2026-06-29 is a Monday; London is an hour ahead of UTC then.
    expect(digestDue(monday, at("2026-06-29T05:59:59Z"), LONDON)).toBe(false);
    expect(digestDue(monday, at("2026-06-29T06:00:00Z"), LONDON)).toBe(true);
  });

  it("takes the weekday of the place: Sunday evening in London is Monday in Auckland", () => {
    const monday = { weekdays: [1], sendAt: "07:00", lastSentOn: null };
    const instant = at("2026-11-29T19:00:00Z");
    expect(digestDue(monday, instant, LONDON)).toBe(false);
    expect(digestDue(monday, instant, "Pacific/Auckland")).toBe(true);
  });

  it("is due at the jump when the clocks jump over its time", () => {
    expect(digestDue(sundays("01:30"), at("2027-03-28T00:59:59Z"), LONDON)).toBe(false);
    expect(digestDue(sundays("01:30"), at("2027-03-28T01:00:00Z"), LONDON)).toBe(true);
  });

  it("is due at the first of two when its time comes twice, and then no more", () => {
    expect(digestDue(sundays("01:30"), at("2027-10-31T00:29:59Z"), LONDON)).toBe(false);
    expect(digestDue(sundays("01:30"), at("2027-10-31T00:30:00Z"), LONDON)).toBe(true);
    const sent = sundays("01:30", "2027-10-31");
    expect(digestDue(sent, at("2027-10-31T01:30:00Z"), LONDON)).toBe(false);
    expect(digestDue(sent, at("2027-10-31T23:59:59Z"), LONDON)).toBe(false);
    expect(digestDue(sent, at("2027-11-07T01:30:00Z"), LONDON)).toBe(true);
  });

  it("holds where clocks change by half an hour", () => {
    // 2027-04-04 is a Sunday; 01:45 comes at 14:45 UTC (+11) and again at 15:15 UTC (+10:30).
    expect(digestDue(sundays("01:45"), at("2027-04-03T14:44:59Z"), "Australia/Lord_Howe")).toBe(
      false,
    );
    expect(digestDue(sundays("01:45"), at("2027-04-03T14:45:00Z"), "Australia/Lord_Howe")).toBe(
      true,
    );
  });

  it("is sent late the same day when missed, and not the day after", () => {
    expect(digestDue(sundays("07:00"), at("2027-06-06T22:00:00Z"), LONDON)).toBe(true);
    expect(digestDue(sundays("07:00"), at("2027-06-07T08:00:00Z"), LONDON)).toBe(false);
  });
});

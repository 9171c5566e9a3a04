import ICAL from "ical.js";
import { describe, expect, it } from "vitest";
import { previewRound } from "@/emails/preview-data";
import { roundCalendar } from "@/emails/round-calendar";

/** Read back by ical.js, a parser that shares no code with the library that writes the file. */
function readBack(text: string) {
  const calendar = new ICAL.Component(ICAL.parse(text));
  const event = new ICAL.Event(calendar.getFirstSubcomponent("vevent")!);
  return { calendar, event };
}

describe("a round as a calendar file (RFC 5545)", () => {
  it("is read back by an independent parser with the same instants, UID and SEQUENCE", () => {
    const { calendar, event } = readBack(roundCalendar(previewRound, false));
    expect(calendar.getFirstPropertyValue("method")).toBe("PUBLISH");
    expect(calendar.getFirstPropertyValue("version")).toBe("2.0");
    expect(event.uid).toBe("round-1@wanewright.example");
    expect(event.sequence).toBe(0);
    expect(event.startDate.toJSDate().toISOString()).toBe("2026-12-09T08:00:00.000Z");
    expect(event.endDate.toJSDate().toISOString()).toBe("2026-12-09T14:50:00.000Z");
    expect(event.description).toContain("Swap QF-0417 Level gauge: 2 × LR20");
  });

  it("keeps the UID and raises SEQUENCE on a change (RFC 5546, 2.1.4)", () => {
    const changed = { ...previewRound, calendar: { ...previewRound.calendar, sequence: 3 } };
    const { event } = readBack(roundCalendar(changed, false));
    expect([event.uid, event.sequence]).toEqual(["round-1@wanewright.example", 3]);
  });

  it("cancels with METHOD:CANCEL and STATUS:CANCELLED (RFC 5546, 3.2.5)", () => {
    const { calendar, event } = readBack(roundCalendar(previewRound, true));
    expect(calendar.getFirstPropertyValue("method")).toBe("CANCEL");
    expect(event.component.getFirstPropertyValue("status")).toBe("CANCELLED");
  });

  it("folds lines at 75 octets and ends them with CRLF (RFC 5545, 3.1)", () => {
    const text = roundCalendar(previewRound, false);
    const lines = text.split("\r\n");
    expect(text.replaceAll("\r\n", "")).not.toMatch(/[\r\n]/);
    for (const line of lines) expect(Buffer.byteLength(line)).toBeLessThanOrEqual(75);
  });

  it("keeps the instants across both daylight-saving changes", () => {
    for (const day of ["2026-03-29", "2026-10-25"]) {
      const props = {
        ...previewRound,
        startsAt: `${day}T00:30:00Z`,
        endsAt: `${day}T06:00:00Z`,
      };
      const { event } = readBack(roundCalendar(props, false));
      expect(event.startDate.toJSDate().toISOString()).toBe(`${day}T00:30:00.000Z`);
    }
  });
});

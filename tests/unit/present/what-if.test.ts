/** Words and strips of "what if" and of what moved a forecast; the expected ones by hand. */
import { describe, expect, test } from "vitest";
import { dayShift } from "@/lib/present/day-shift";
import { coldSnapSentence, movedWords } from "@/lib/present/forecast-moved";
import { whatIfModel } from "@/lib/present/what-if";

const presentation = { locale: "en-GB", timeZone: "Europe/London", currency: "GBP" };
const at = (day: string) => new Date(`${day}T12:00:00Z`);
const plain = (text: string) => text.replaceAll("\u00a0", " ");

describe("how far a date moved", () => {
  test.each([
    [-9.2, "9 days earlier"],
    [0.6, "1 day later"],
    [-0.4, "not by a day"],
    [1461, "4 years later"],
  ])("%d", (days, words) => expect(plain(dayShift(days))).toBe(words));
});

describe("what moved it last", () => {
  const moved = {
    ...{ kind: "reading" as const, at: at("2026-11-12"), days: -9 },
    reading: { millivolts: 2710, kind: "resting" },
    ...{ without: at("2026-12-21"), likely: at("2026-12-12") },
  };
  test("a reading, its volts, the shift and both dates", () => {
    const words = movedWords(moved, at("2026-12-01"), presentation);
    expect(plain(words.what)).toBe("Reading of 12 Nov, 2.71 V resting");
    expect(plain(words.shift)).toBe("likely date 9 days earlier");
    expect(words.dates).toBe("21 Dec without it, 12 Dec with it");
  });

  test("one that fitted, and one that is no reading", () => {
    const still = movedWords({ ...moved, days: 0.2 }, at("2026-12-01"), presentation);
    expect(still.shift).toMatch(/as before/);
    expect(still.dates).toBeNull();
    const draw = { ...moved, kind: "measured-draw" as const, reading: null };
    expect(movedWords(draw, at("2026-12-01"), presentation).what).toBe("Measured draw of 12 Nov");
  });
});

test("a cold stop is told with its return and its end", () => {
  const snap = { stopsAt: at("2027-01-14"), returnsAt: at("2027-03-02"), endsAt: at("2027-04-20") };
  expect(coldSnapSentence(snap, at("2026-12-01"), presentation)).toMatch(
    /14 Jan; .* 2 Mar and stop for good on 20 Apr/,
  );
});

describe("the two strips", () => {
  const forecast = {
    ...{ p05: at("2026-12-20"), p50: at("2027-01-10"), p95: at("2027-02-05") },
    ...{ shareLeft: 0.2, drawUa: 150, outNow: 0 },
  };
  const earlier = {
    ...forecast,
    p05: at("2026-12-05"),
    p50: at("2026-12-15"),
    p95: at("2027-01-02"),
  };
  const input = {
    tag: "QF-1",
    installedAt: at("2025-03-01"),
    today: "2026-12-01",
    room: "wide" as const,
  };
  const model = whatIfModel({ ...input, now: forecast, then: earlier }, presentation);

  test("share one axis that holds both windows", () => {
    const [now, then] = model.rows;
    expect(then!.strip.spindle!.medianX).toBeLessThan(now!.strip.spindle!.medianX);
    expect(now!.strip.spindle!.toX).toBeLessThanOrEqual(model.axis.widthPx);
    expect(model.scale).toMatchObject({ width: model.axis.widthPx });
  });

  test("say the shift, the dates, and the tone of each", () => {
    expect(plain(model.shift)).toBe("26 days earlier");
    expect(model.rows.map((row) => row.window.likely)).toEqual(
      ["10 Jan 2027", "15 Dec"].map((d) => d.replace(" 2027", "")),
    );
    expect(model.rows.map((row) => row.tone)).toEqual(["order", "soon"]);
    expect(model.rows[1]!.strip.title).toBe("QF-1, What if");
  });

  test("a window years ahead does not press the other out of sight", () => {
    const far = { ...forecast, p50: at("2036-01-01"), p95: at("2046-01-01") };
    const wide = whatIfModel({ ...input, now: forecast, then: far }, presentation);
    expect(wide.rows[1]!.strip.beyond).toBeNull();
    expect(wide.axis.toDay).toBeGreaterThan(24_106); // 1 Jan 2036
  });
});

import { describe, expect, it } from "vitest";
import { dayFromNumber, dayNumber } from "@/lib/present/calendar-days";
import { spanStrip, type SpanStripInput, spindlePath, stripScale } from "@/lib/present/span-strip";
import { stripHead } from "@/lib/present/strip-head";
import { timeAxis, xOf } from "@/lib/present/time-axis";
import { pointsAlong } from "../../support/svg-path";

// The geometry is DESIGN's own: the truth here is arithmetic, two px to a day.
const today = "2026-12-01";
const axis = timeAxis({ from: "2026-10-02", to: "2027-06-29", widthPx: 540, locale: "en-GB" });
const day = (offset: number) => dayFromNumber(dayNumber(today) + offset);
const input: SpanStripInput = {
  axis,
  today,
  subject: "QF-0981",
  installed: day(-400),
  ended: null,
  readings: [day(-500), day(-58), day(-5)],
  cutoff: { p5: day(4), p50: day(14), p95: day(31) },
  visits: [
    { day: day(2), published: true },
    { day: day(18), published: false },
  ],
  tone: "soon",
  locale: "en-GB",
};

describe("timeAxis", () => {
  it("puts days to scale and ticks the first of each month, naming the new year", () => {
    expect(axis.toDay - axis.fromDay).toBe(270);
    expect(xOf(axis, dayNumber(today))).toBe(120);
    expect(axis.ticks.map((tick) => tick.label)).toEqual([
      ...["Nov", "Dec", "Jan 2027", "Feb", "Mar", "Apr", "May", "Jun"],
    ]);
    expect(axis.ticks[2]?.x).toBe((dayNumber("2027-01-01") - axis.fromDay) * 2);
  });
  it("thins the ticks where months would crowd", () => {
    const years = timeAxis({ from: "2024-01-01", to: "2029-01-01", widthPx: 300, locale: "de-DE" });
    expect(years.ticks.length).toBeLessThanOrEqual(6);
    for (const [i, tick] of years.ticks.entries()) {
      if (i > 0) expect(tick.x - (years.ticks[i - 1]?.x ?? 0)).toBeGreaterThan(40);
    }
  });
  it("does not run backward", () => {
    expect(() => timeAxis({ ...axis, from: today, to: today, locale: "en-GB" })).toThrow(/forward/);
  });
});

describe("spanStrip", () => {
  const strip = spanStrip(input);
  it("draws a spindle from the 5th to the 95th percentile, fullest at the median", () => {
    expect(strip.spindle).toMatchObject({ fromX: 128, medianX: 148, toX: 182 });
    const outline = pointsAlong(strip.spindle ? spindlePath(strip.spindle) : "", 400);
    const heightAt = (x: number) => {
      const near = outline.filter((p) => Math.abs(p.x - x) < 0.6).map((p) => p.y);
      return Math.max(...near) - Math.min(...near);
    };
    expect(heightAt(128)).toBeLessThan(0.5);
    expect(heightAt(182)).toBeLessThan(0.5);
    expect(heightAt(148)).toBeCloseTo(22, 0);
    const widest = outline.reduce((a, b) => (Math.abs(b.y - 19) > Math.abs(a.y - 19) ? b : a));
    expect(widest.x).toBeCloseTo(148, 0);
    expect(heightAt(132)).toBeLessThan(heightAt(138));
    expect(heightAt(175)).toBeLessThan(heightAt(160));
  });
  it("tells service that was from service that is expected", () => {
    expect(strip.past).toEqual({ x1: 0, x2: 120 });
    expect(strip.ahead).toEqual({ x1: 120, x2: 128 });
    expect(stripScale(axis, today).nowX).toBe(120);
  });
  it("leaves out readings and visits outside the axis", () => {
    expect(strip.dots).toEqual([4, 110]);
    expect(strip.pennants.map((p) => [p.x, p.published])).toEqual([
      [124, true],
      [156, false],
    ]);
    expect(spanStrip({ ...input, visits: [{ day: day(900), published: true }] }).pennants).toEqual(
      [],
    );
  });
  it("ends the line where the pack ended", () => {
    const out = spanStrip({ ...input, ended: day(-3), tone: "out" });
    expect(out.past).toEqual({ x1: 0, x2: 114 });
    expect(out.ahead).toBeNull();
    expect(out.endX).toBe(114);
  });
  it("stays drawable without a pack or a forecast, and points beyond the axis", () => {
    expect(spanStrip({ ...input, installed: null, cutoff: null })).toMatchObject({
      past: null,
      ahead: null,
      spindle: null,
      beyond: null,
    });
    const late = { p5: day(300), p50: day(350), p95: day(420) };
    expect(spanStrip({ ...input, cutoff: late }).beyond).toBe("after");
    expect(spanStrip({ ...input, cutoff: late }).ahead).toEqual({ x1: 120, x2: 540 });
  });
  it("keeps a certain cut-off wide enough to be seen", () => {
    const sure = spanStrip({ ...input, cutoff: { p5: day(9), p50: day(9), p95: day(9) } }).spindle;
    expect((sure?.toX ?? 0) - (sure?.fromX ?? 0)).toBe(5);
  });
  it("says in words what it draws", () => {
    expect(strip.description).toContain("cut-off 5 Dec – 1 Jan, likely 15 Dec");
    expect(strip.description).toContain("visit published for Thu 3 Dec");
    expect(strip.description).toContain("visit proposed for Sat 19 Dec");
    expect(strip.description).toContain("3 readings");
    const beside = spanStrip({ ...input, datesBeside: true }).description;
    expect(beside).toMatch(/^in service since 27 Oct 2025; 3 readings$/);
  });
});

describe("stripHead", () => {
  const weeks = [
    { from: day(-1), expected: 20, low: 15, high: 26 },
    { from: day(6), expected: 40, low: 30, high: 50 },
    { from: day(900), expected: 1, low: 0, high: 2 },
  ];
  const head = stripHead({ axis, today, weeks, soonUntil: day(5), locale: "en-GB" });
  it("stands each week on the strips' axis, to one scale, with its spread", () => {
    expect(head.bars).toHaveLength(2);
    const [first, second] = head.bars;
    if (!first || !second) throw new Error("two bars were expected");
    expect(first.x).toBeCloseTo(118.75, 1);
    expect(first.width).toBeCloseTo(12.5, 1);
    expect((head.baseline - second.top) / (head.baseline - first.top)).toBeCloseTo(2, 2);
    expect(head.baseline - second.highY).toBeCloseTo((head.baseline - second.top) * 1.25, 1);
    expect([first.soon, second.soon]).toEqual([true, false]);
    expect(head.scaleLine?.label).toBe("40");
    expect(head.description).toContain("week of 7 Dec: 40 (30–50)");
  });
  it("is empty, not broken, without weeks", () => {
    expect(stripHead({ axis, today, weeks: [], soonUntil: today, locale: "en-GB" }).bars).toEqual(
      [],
    );
  });
});

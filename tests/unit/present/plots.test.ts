import { describe, expect, it } from "vitest";
import { dayNumber } from "@/lib/present/calendar-days";
import { dayBar, DAY_BAR_WIDTH } from "@/lib/present/day-bar";
import { reliabilityPlot } from "@/lib/present/reliability-plot";
import { sparkBars } from "@/lib/present/spark-bars";
import { timeAxis } from "@/lib/present/time-axis";
import { voltageChart } from "@/lib/present/voltage-chart";
import { verdictOf, voltagePlate } from "@/lib/present/voltage-plate";

const hour = 3600;
const plain = (text: string | null) => text?.replaceAll("\u00a0", " ") ?? null;

describe("dayBar", () => {
  const legs = [
    { kind: "drive" as const, fromS: 0, toS: hour },
    { kind: "work" as const, fromS: hour, toS: 3 * hour },
    { kind: "wait" as const, fromS: 3 * hour, toS: 4 * hour },
    { kind: "work" as const, fromS: 7 * hour, toS: 10 * hour },
  ];
  it("draws to the scale of the shift and cuts what runs over at its end", () => {
    const bar = dayBar({ shiftS: 8 * hour, legs, locale: "en-GB" });
    expect(bar.shiftWidth).toBeCloseTo(DAY_BAR_WIDTH * 0.8, 5);
    const perHour = DAY_BAR_WIDTH / 10;
    expect(bar.parts).toEqual([
      { kind: "drive", x: 0, width: perHour, over: false },
      { kind: "work", x: perHour, width: 2 * perHour, over: false },
      { kind: "work", x: 7 * perHour, width: perHour, over: false },
      { kind: "work", x: 8 * perHour, width: 2 * perHour, over: true },
    ]);
    expect(plain(bar.overLabel)).toBe("over by 2 h");
    expect(plain(bar.description)).toBe("driving 1 h, working 5 h, shift 8 h, over by 2 h");
  });
  it("keeps one scale over several rounds, and a day without legs", () => {
    const bar = dayBar({
      shiftS: 6 * hour,
      legs: legs.slice(0, 2),
      locale: "en-GB",
      scaleS: 8 * hour,
    });
    expect(bar.shiftWidth).toBeCloseTo(DAY_BAR_WIDTH * 0.75, 5);
    expect(bar.overLabel).toBeNull();
    expect(dayBar({ shiftS: 8 * hour, legs: [], locale: "en-GB" }).parts).toEqual([]);
  });
});

describe("voltagePlate", () => {
  const input = {
    readingMv: 3480,
    expected: { lowMv: 3580, highMv: 3640 },
    cutoffMv: 3050,
    locale: "en-GB",
  };
  it("puts all on one scale, in order of volts", () => {
    const plate = voltagePlate(input);
    expect(plate.cutoffX).toBeLessThan(plate.readingX ?? 0);
    expect(plate.readingX).toBeLessThan(plate.band?.x ?? 0);
    const pxPerMv = ((plate.readingX ?? 0) - plate.cutoffX) / 430;
    expect((plate.band?.x ?? 0) - plate.cutoffX).toBeCloseTo(530 * pxPerMv, 0);
    expect(plate.band?.width).toBeCloseTo(60 * pxPerMv, 0);
  });
  it("says in words where the reading lies", () => {
    const word = (readingMv: number | null) => verdictOf({ ...input, readingMv })?.word;
    expect(word(3480)).toBe("Lower than expected");
    expect(word(3580)).toBe("As expected");
    expect(word(3641)).toBe("Higher than expected");
    expect(word(3050)).toBe("At or below cut-off");
    expect(word(null)).toBeUndefined();
    expect(verdictOf({ ...input, expected: null })?.tone).toBe("quiet");
    expect(plain(voltagePlate({ ...input, locale: "de-DE" }).description)).toContain("3,58–3,64 V");
  });
});

describe("voltageChart", () => {
  const axis = timeAxis({ from: "2026-01-01", to: "2026-12-31", widthPx: 728, locale: "en-GB" });
  const reading = (day: string, mv: number, doubtful = false) => ({
    day: dayNumber(day),
    mv,
    kind: "resting" as const,
    doubtful,
    label: `${mv} mV`,
  });
  const chart = voltageChart({
    axis,
    today: "2026-12-01",
    readings: [
      reading("2025-06-01", 3300),
      reading("2026-01-01", 3200),
      reading("2026-07-02", 2900, true),
    ],
    expected: [],
    cutoffMv: 2100,
    installs: ["2026-01-01", "2020-01-01"],
    locale: "en-GB",
  });
  it("draws what lies on the axis, higher volts higher up, cut-off below all", () => {
    expect(chart.dots).toHaveLength(2);
    const [first, second] = chart.dots;
    expect(first?.x).toBe(chart.plot.left);
    expect(second?.x).toBeCloseTo(chart.plot.left + 364, 0);
    expect(first?.y).toBeLessThan(second?.y ?? 0);
    expect(chart.cutoffY).toBeGreaterThan(second?.y ?? 0);
    expect(chart.cutoffY).toBeLessThanOrEqual(chart.plot.bottom);
    expect(chart.installXs).toEqual([chart.plot.left]);
    expect(chart.bandPath).toBeNull();
    expect(plain(chart.description)).toContain("1 marked as unlikely");
  });
});

describe("reliabilityPlot", () => {
  const bin = { forecast: 0.5, observed: 0.5, low: 0.4, high: 0.6, count: 40 };
  const plot = reliabilityPlot({
    bins: [bin, { ...bin, observed: 0.8, low: 0.7, high: 0.9, count: 10 }],
    locale: "en-GB",
  });
  it("puts sound forecasts on the diagonal and marks those off it", () => {
    const [sound, off] = plot.points;
    expect((sound?.x ?? 0) - plot.plot.left).toBeCloseTo(plot.plot.bottom - (sound?.y ?? 0), 6);
    expect([sound?.sound, off?.sound]).toEqual([true, false]);
    expect(off?.y).toBeLessThan(sound?.y ?? 0);
    expect(plain(sound?.label ?? "")).toBe("forecast 50 %, came true 50 % of 40");
    expect(reliabilityPlot({ bins: [], locale: "en-GB" }).description).toBe("no outcomes yet");
  });
});

describe("sparkBars", () => {
  it("stands bars on one zero, and shows a small value still", () => {
    const { bars } = sparkBars({
      title: "Swaps a month",
      values: [0, 1, 500, 1000].map((value) => ({ value, label: String(value) })),
    });
    const [none, small, half, most] = bars.map((bar) => bar.height);
    expect(none).toBe(0);
    expect(small).toBeGreaterThan(0);
    expect((half ?? 0) / (most ?? 1)).toBeCloseTo(0.5, 5);
    expect(new Set(bars.map((bar) => bar.y + bar.height)).size).toBe(1);
    expect(bars.map((bar) => bar.strong)).toEqual([false, false, false, true]);
  });
});

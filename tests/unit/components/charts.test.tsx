import type { ReactElement } from "react";
import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import { DayBar } from "@/components/charts/day-bar";
import { ReliabilityPlot } from "@/components/charts/reliability-plot";
import { SpanStrip, StripGround } from "@/components/charts/span-strip";
import { SparkBars } from "@/components/charts/spark-bars";
import { StripHead } from "@/components/charts/strip-head";
import { VoltageChart } from "@/components/charts/voltage-chart";
import { VoltagePlate } from "@/components/charts/voltage-plate";
import { WaneDisc, WaneLabel } from "@/components/charts/wane-disc";
import { dayBar } from "@/lib/present/day-bar";
import { reliabilityPlot } from "@/lib/present/reliability-plot";
import { spanStrip, stripScale } from "@/lib/present/span-strip";
import { sparkBars } from "@/lib/present/spark-bars";
import { stripHead } from "@/lib/present/strip-head";
import { timeAxis } from "@/lib/present/time-axis";
import { voltageChart } from "@/lib/present/voltage-chart";
import { voltagePlate } from "@/lib/present/voltage-plate";
import { DISC_RADIUS, waneDisc } from "@/lib/present/wane-disc";
import { areaWithin, pointsAlong } from "../../support/svg-path";

const locale = "en-GB";
const today = "2026-12-01";
const axis = timeAxis({ from: "2026-10-02", to: "2027-06-29", widthPx: 540, locale });
const scale = stripScale(axis, today);
const strip = spanStrip({
  axis,
  today,
  subject: "QF-0981",
  installed: "2025-11-04",
  ended: null,
  readings: ["2026-10-04", "2026-11-26"],
  cutoff: { p5: "2026-12-05", p50: "2026-12-15", p95: "2027-01-01" },
  visits: [
    { day: "2026-12-03", published: true },
    { day: "2026-12-19", published: false },
  ],
  tone: "soon",
  locale,
});
const week = { from: "2026-11-30", expected: 20, low: 15, high: 26 };
const disc = waneDisc({ share: 0.09, isOut: false, tone: "soon", locale });
const leg = { kind: "work" as const, fromS: 0, toS: 3600 };
const bin = { forecast: 0.5, observed: 0.5, low: 0.4, high: 0.6, count: 40 };

const every: [string, ReactElement, RegExp][] = [
  ["WaneDisc", <WaneDisc key="a" model={disc} />, /^9\s%\sof charge left$/],
  ["SpanStrip", <SpanStrip key="b" scale={scale} model={strip} />, /^QF-0981$/],
  [
    "StripHead",
    <StripHead
      key="c"
      model={stripHead({ axis, today, weeks: [week], soonUntil: today, locale })}
    />,
    /^Packs expected to reach cut-off, a week$/,
  ],
  ["DayBar", <DayBar key="d" model={dayBar({ shiftS: 1800, legs: [leg], locale })} />, /shift/],
  [
    "VoltagePlate",
    <VoltagePlate
      key="e"
      model={voltagePlate({ readingMv: 3480, expected: null, cutoffMv: 3050, locale })}
    />,
    /^Reading 3\.48\sV$/,
  ],
  [
    "VoltageChart",
    <VoltageChart
      key="f"
      model={voltageChart({
        axis,
        today,
        readings: [],
        expected: [],
        cutoffMv: 2100,
        installs: [],
        locale,
      })}
    />,
    /^Voltage over time$/,
  ],
  [
    "SparkBars",
    <SparkBars key="g" model={sparkBars({ title: "Swaps", values: [{ value: 1, label: "x" }] })} />,
    /^Swaps$/,
  ],
  [
    "ReliabilityPlot",
    <ReliabilityPlot key="h" model={reliabilityPlot({ bins: [bin], locale })} />,
    /^Chance forecast/,
  ],
];

describe("every chart", () => {
  // SVG-AAM 1.0, 8.1: role="img" takes its name from the first child <title>.
  it.each(every)("%s is an image with an accessible name", (_, element, name) => {
    const html = renderToStaticMarkup(element);
    const [, attributes = "", title = ""] =
      /^(?:<figure>)?<svg([^>]*)><title>([^<]+)<\/title>/.exec(html) ?? [];
    expect(attributes).toContain('role="img"');
    expect(title).toMatch(name);
  });
  it.each(every)("%s takes its colours from the tokens only", (_, element) => {
    const html = renderToStaticMarkup(element);
    expect(html).not.toMatch(/#[0-9a-f]{3,8}\b|rgb\(|style=/i);
    expect(html).not.toMatch(/NaN|undefined|Infinity/);
  });
});

describe("WaneDisc", () => {
  it("draws the lit part whose area is the share, within 1 %", () => {
    for (const share of [0.03, 0.09, 0.25, 0.5, 0.62, 0.88]) {
      const model = waneDisc({ share, isOut: false, tone: "order", locale });
      const html = renderToStaticMarkup(<WaneDisc model={model} />);
      const d = /<path d="([^"]+)"/.exec(html)?.[1] ?? "";
      const lit = areaWithin(pointsAlong(d)) / (Math.PI * DISC_RADIUS ** 2);
      expect(Math.abs(lit - share)).toBeLessThan(0.01 * share);
    }
  });
  it("is never alone: the label carries the word and the picture is passed over", () => {
    const html = renderToStaticMarkup(<WaneLabel model={disc} />);
    expect(html).toContain('aria-hidden="true"');
    expect(html).not.toContain('role="img"');
    expect(html.replaceAll(/<[^>]*>/g, "")).toMatch(/^9\s%$/);
  });
  it("shows out by shape, not only by colour", () => {
    const out = waneDisc({ share: 0, isOut: true, tone: "out", locale });
    expect(renderToStaticMarkup(<WaneDisc model={out} />)).toContain('d="M-5-5L5 5M5-5L-5 5"');
  });
});

describe("SpanStrip", () => {
  const html = renderToStaticMarkup(<SpanStrip scale={scale} model={strip} />);
  it("notches the spindle at the median, over its full height", () => {
    expect(html).toMatch(/<line x1="148" x2="148" y1="8" y2="30"/);
  });
  it("draws open dots, a dashed rule for now, a filled and a hollow pennant", () => {
    expect(html.match(/<circle[^>]*fill-sheet/g)).toHaveLength(2);
    expect(html).toMatch(/<line x1="120" x2="120"[^>]*stroke-dasharray/);
    expect(html.match(/stroke-dusk-line fill-dusk/g)).toHaveLength(1);
    expect(html.match(/stroke-dusk-line fill-sheet/g)).toHaveLength(1);
  });
  it("stands on a ground of its own or on the one of its stack", () => {
    const element = <SpanStrip scale={scale} model={strip} groundId="ground" />;
    const stacked = renderToStaticMarkup(element);
    expect(stacked).toContain('<use href="#ground"></use>');
    expect(stacked).not.toContain("stroke-dasharray");
    const ground = renderToStaticMarkup(<StripGround id="ground" scale={scale} />);
    const inner = /<g id="ground">(.*)<\/g>/.exec(ground)?.[1] ?? "nothing";
    expect(html).toContain(inner);
  });
  it("draws known service thicker than expected service", () => {
    const width = (x1: number) =>
      Number(
        new RegExp(`<line x1="${x1}" x2="\\d+" y1="19"[^>]*stroke-width="([\\d.]+)"`).exec(
          html,
        )?.[1],
      );
    expect(width(0)).toBeGreaterThan(width(120));
  });
});

describe("DayBar", () => {
  it("draws what runs over in brick", () => {
    const html = renderToStaticMarkup(
      <DayBar model={dayBar({ shiftS: 1800, legs: [leg], locale })} />,
    );
    expect(html.match(/fill-brick/g)).toHaveLength(1);
    expect(html.match(/fill-spruce/g)).toHaveLength(1);
    expect(html).toMatch(/over by 30\smin/);
  });
});

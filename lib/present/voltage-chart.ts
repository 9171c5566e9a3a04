import { scaleLinear } from "d3-scale";
import { area, curveMonotoneX, line } from "d3-shape";
import type { IsoDay, Millivolts } from "@/lib/units";
import { dayNumber } from "./calendar-days";
import { formatVolts } from "./format-quantity";
import { formatNumber } from "./locale";
import { xOf, type AxisTick, type TimeAxis } from "./time-axis";

export interface ChartReading {
  /** Days since 1970-01-01 on the local calendar (`axisDay`). */
  readonly day: number;
  readonly mv: Millivolts;
  readonly kind: "resting" | "loaded";
  /** Kept, but marked as unlikely. */
  readonly doubtful: boolean;
  /** The finished words for it: "2.41 V resting, Tue 1 Dec 2026". */
  readonly label: string;
}

export interface ExpectedVoltage {
  readonly day: number;
  readonly lowMv: Millivolts;
  readonly midMv: Millivolts;
  readonly highMv: Millivolts;
}

export interface VoltageChartInput {
  axis: TimeAxis;
  today: IsoDay;
  readings: readonly ChartReading[];
  /** Expected resting voltage, in order of days; may reach past today. */
  expected: readonly ExpectedVoltage[];
  cutoffMv: Millivolts;
  /** Days on which packs went in. */
  installs: readonly IsoDay[];
  locale: string;
}

export interface PlotDot {
  readonly x: number;
  readonly y: number;
  readonly kind: "resting" | "loaded";
  readonly doubtful: boolean;
  readonly label: string;
}

export interface VoltageChartModel {
  readonly title: string;
  readonly description: string;
  readonly width: number;
  readonly height: number;
  readonly plot: { left: number; top: number; right: number; bottom: number };
  readonly yTicks: readonly { readonly y: number; readonly label: string }[];
  readonly xTicks: readonly AxisTick[];
  readonly bandPath: string | null;
  readonly midPath: string | null;
  readonly cutoffY: number;
  readonly cutoffLabel: string;
  readonly nowX: number;
  readonly installXs: readonly number[];
  readonly dots: readonly PlotDot[];
}

const LEFT = 46;
const TOP = 12;
const PLOT_HEIGHT = 200;
const BOTTOM_ROOM = 26;
const RIGHT_ROOM = 8;

/** The voltages of an asset over time, with the expected band and the cut-off. */
export function voltageChart(input: VoltageChartInput): VoltageChartModel {
  const { axis, readings, cutoffMv, locale } = input;
  const bottom = TOP + PLOT_HEIGHT;
  const y = scaleLinear(domain(input), [bottom, TOP]).nice(5);
  const x = (day: number) => LEFT + xOf(axis, day);
  const within = (day: number) => day >= axis.fromDay && day <= axis.toDay;
  const ticks = y.ticks(5);
  const decimals = ticks.every((tick) => tick % 100 === 0) ? 1 : 2;
  return {
    title: "Voltage over time",
    description: describe(input),
    width: LEFT + axis.widthPx + RIGHT_ROOM,
    height: bottom + BOTTOM_ROOM,
    plot: { left: LEFT, top: TOP, right: LEFT + axis.widthPx, bottom },
    yTicks: ticks.map((mv) => ({ y: y(mv), label: formatNumber(mv / 1000, locale, decimals) })),
    xTicks: axis.ticks.map((tick) => ({ ...tick, x: LEFT + tick.x })),
    ...expectedPaths(
      input.expected.filter((point) => within(point.day)),
      x,
      y,
    ),
    cutoffY: y(cutoffMv),
    cutoffLabel: `cut-off ${formatVolts(cutoffMv, locale)}`,
    nowX: x(dayNumber(input.today)),
    installXs: input.installs.map(dayNumber).filter(within).map(x),
    dots: readings
      .filter((reading) => within(reading.day))
      .map(({ day, mv, ...rest }) => ({ ...rest, x: x(day), y: Math.round(y(mv) * 10) / 10 })),
  };
}

function domain({ readings, expected, cutoffMv }: VoltageChartInput): [number, number] {
  const values = [
    cutoffMv,
    ...readings.map((reading) => reading.mv),
    ...expected.flatMap((point) => [point.lowMv, point.highMv]),
  ];
  const low = Math.min(...values);
  const high = Math.max(...values);
  const room = Math.max(50, (high - low) * 0.08);
  return [low - room, high + room];
}

function expectedPaths(
  points: readonly ExpectedVoltage[],
  x: (day: number) => number,
  y: (mv: number) => number,
): Pick<VoltageChartModel, "bandPath" | "midPath"> {
  if (points.length < 2) return { bandPath: null, midPath: null };
  const band = area<ExpectedVoltage>()
    .x((point) => x(point.day))
    .y0((point) => y(point.lowMv))
    .y1((point) => y(point.highMv))
    .curve(curveMonotoneX)
    .digits(1);
  const mid = line<ExpectedVoltage>()
    .x((point) => x(point.day))
    .y((point) => y(point.midMv))
    .curve(curveMonotoneX)
    .digits(1);
  return { bandPath: band(points), midPath: mid(points) };
}

function describe({ readings, cutoffMv, locale }: VoltageChartInput): string {
  const last = readings.at(-1);
  const doubtful = readings.filter((reading) => reading.doubtful).length;
  return [
    `${readings.length} ${readings.length === 1 ? "reading" : "readings"}`,
    doubtful > 0 && `${doubtful} marked as unlikely`,
    last && `the last ${last.label}`,
    `cut-off ${formatVolts(cutoffMv, locale)}`,
  ]
    .filter(Boolean)
    .join("; ");
}

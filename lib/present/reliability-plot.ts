import { formatPercent } from "./format-share";
import { formatNumber, NBSP } from "./locale";

/** Forecasts of like chance, and how often they came true. */
export interface ReliabilityBin {
  /** Mean chance forecast, 0 to 1. */
  readonly forecast: number;
  /** Share that came true, with its 90 % interval. */
  readonly observed: number;
  readonly low: number;
  readonly high: number;
  readonly count: number;
}

export interface ReliabilityPlotModel {
  readonly title: string;
  readonly description: string;
  readonly size: number;
  readonly plot: { left: number; top: number; right: number; bottom: number };
  readonly ticks: readonly { readonly x: number; readonly y: number; readonly label: string }[];
  readonly points: readonly {
    readonly x: number;
    readonly y: number;
    readonly lowY: number;
    readonly highY: number;
    readonly r: number;
    /** The diagonal lies within the interval. */
    readonly sound: boolean;
    readonly label: string;
  }[];
}

const SIZE = 300;
const PLOT = { left: 46, top: 10, right: 280, bottom: 244 };

/** Forecast chance across, share that came true upward; sound forecasts lie on the diagonal. */
export function reliabilityPlot(input: {
  bins: readonly ReliabilityBin[];
  locale: string;
}): ReliabilityPlotModel {
  const { bins, locale } = input;
  const x = (share: number) => PLOT.left + share * (PLOT.right - PLOT.left);
  const y = (share: number) => PLOT.bottom - share * (PLOT.bottom - PLOT.top);
  const most = Math.max(1, ...bins.map((bin) => bin.count));
  const points = bins.map((bin) => ({
    x: x(bin.forecast),
    y: y(bin.observed),
    lowY: y(bin.low),
    highY: y(bin.high),
    // The area of a dot stands for its count.
    r: 2.5 + 4.5 * Math.sqrt(bin.count / most),
    sound: bin.low <= bin.forecast && bin.forecast <= bin.high,
    label:
      `forecast ${formatPercent(bin.forecast, locale)}, came true ` +
      `${formatPercent(bin.observed, locale)} of ${formatNumber(bin.count, locale)}`,
  }));
  return {
    title: "Chance forecast against share that came true",
    description: points.map((point) => point.label).join("; ") || "no outcomes yet",
    size: SIZE,
    plot: PLOT,
    ticks: [0, 0.25, 0.5, 0.75, 1].map((share) => ({
      x: x(share),
      y: y(share),
      label: `${formatNumber(share * 100, locale)}${NBSP}%`,
    })),
    points,
  };
}

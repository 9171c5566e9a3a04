import { scaleLog } from "d3-scale";
import { formatPercent } from "./format-share";
import { formatNumber, NBSP } from "./locale";

/** One pack from the day a forecast of it was put on record: days left as said and as found. */
export interface Prediction {
  readonly key: string;
  readonly saidDays: number;
  readonly foundDays: number;
  /** False: it runs or came out alive, so it would have lasted longer than found. */
  readonly stopped: boolean;
}

export interface PredictionPlotModel {
  readonly title: string;
  readonly description: string;
  readonly size: number;
  readonly plot: { left: number; top: number; right: number; bottom: number };
  readonly ticks: readonly { readonly x: number; readonly y: number; readonly label: string }[];
  readonly dots: readonly {
    readonly key: string;
    readonly x: number;
    readonly y: number;
    readonly stopped: boolean;
  }[];
  /** Half as long and twice as long as said: the corridor's four corners. */
  readonly corridor: string;
}

const SIZE = 300;
const PLOT = { left: 46, top: 10, right: 280, bottom: 244 };
const FROM_DAYS = 7;
const TO_DAYS = 2922;
/** More would only hide each other. */
const MOST_DOTS = 600;
const TICKS = [
  [7, "1 wk"],
  [30, "1 mo"],
  [91, "3 mo"],
  [365, "1 y"],
  [1096, "3 y"],
  [2922, "8 y"],
] as const;

/** Days left as said across, as found upward, both by the logarithm: equal ratios, equal steps. */
export function predictionPlot(
  predictions: readonly Prediction[],
  locale: string,
): PredictionPlotModel {
  const scale = scaleLog([FROM_DAYS, TO_DAYS], [0, 1]).clamp(true);
  const place = (days: number) => scale(Math.max(FROM_DAYS, days));
  const x = (days: number) => round(PLOT.left + place(days) * (PLOT.right - PLOT.left));
  const y = (days: number) => round(PLOT.bottom - place(days) * (PLOT.bottom - PLOT.top));
  const step = Math.max(1, predictions.length / MOST_DOTS);
  const shown = predictions.filter((_, i) => Math.floor(i / step) !== Math.floor((i - 1) / step));
  const corner = (said: number, times: number) => `${x(said)} ${y(said * times)}`;
  return {
    title: "Days left as said, and as found",
    description: describe(predictions, locale),
    size: SIZE,
    plot: PLOT,
    ticks: TICKS.map(([days, label]) => ({
      x: x(days),
      y: y(days),
      label: label.replace(" ", NBSP),
    })),
    dots: shown.map(({ key, saidDays, foundDays, stopped }) => ({
      ...{ key, stopped, x: x(saidDays), y: y(foundDays) },
    })),
    corridor:
      `M${corner(FROM_DAYS, 1)}L${corner(FROM_DAYS, 2)}L${corner(TO_DAYS / 2, 2)}` +
      `L${corner(TO_DAYS, 1)}L${corner(TO_DAYS, 0.5)}L${corner(FROM_DAYS * 2, 0.5)}Z`,
  };
}

const round = (value: number) => Math.round(value * 10) / 10;

function describe(predictions: readonly Prediction[], locale: string): string {
  const stopped = predictions.filter((p) => p.stopped);
  if (stopped.length === 0) return "no pack has stopped yet";
  const near = stopped.filter((p) => {
    const ratio = Math.max(FROM_DAYS, p.foundDays) / Math.max(FROM_DAYS, p.saidDays);
    return ratio >= 0.5 && ratio <= 2;
  });
  return `${formatNumber(stopped.length, locale)} packs had stopped; ${formatPercent(near.length / stopped.length, locale)} of them after half to twice the days said`;
}

/**
 * The forecast of one pack: the distribution of the day on which its device stops.
 * Deterministic: the same input gives the same result to the last bit.
 */
import { interpolate } from "../stats/interpolate";
import { gridQuantile } from "../stats/grid-quantile";
import type { EpochDays } from "../units";
import { type Filtered, filterPack } from "./filter";
import { depthMarginal, rateMarginal } from "./grid";
import { type OutDates, outDates } from "./out-dates";
import type { Forecast, ForecastInput } from "./pack";
import { assertForecastable } from "./validate";

const Z90 = 1.6448536269514722;
/** Probabilities of `Forecast.cdfDays`. */
export const CDF_PROBABILITIES: readonly number[] = Array.from(
  { length: 50 },
  (_, k) => (2 * k + 1) / 100,
);

/**
 * Forecast one pack. Readings before the installation, impossible ones and those after `now`
 * are listed with weight 0. No date lies more than 40 years after `now`: a pack that would
 * last longer gets that limit. Throws `invalid` with every fault of the input.
 */
export function forecastPack(input: ForecastInput): Forecast {
  assertForecastable(input);
  return summarise(input, filterPack(input));
}

function summarise(input: ForecastInput, filtered: Filtered): Forecast {
  const dates = outDates(filtered, input.now);
  const used = filtered.weights.filter((w) => w.reason === "fits" || w.reason === "doubtful");
  const kinds = new Map(input.readings.map((r) => [r.id, r.kind]));
  return {
    quantiles: {
      p05: dates.quantile(0.05),
      p20: dates.quantile(0.2),
      p50: dates.quantile(0.5),
      p80: dates.quantile(0.8),
      p95: dates.quantile(0.95),
    },
    cdfDays: CDF_PROBABILITIES.map((p) => dates.quantile(p)),
    shareLeft: shareLeft(filtered, dates),
    drawUa: drawNow(filtered),
    outNow: dates.outNow,
    weights: filtered.weights,
    basis: {
      restingReadings: used.filter((w) => kinds.get(w.readingId) === "resting").length,
      loadedReadings: used.filter((w) => kinds.get(w.readingId) === "loaded").length,
      doubtfulReadings: used.filter((w) => w.reason === "doubtful").length,
      measuredDraw: input.pack.measuredDraw !== null,
      fleetPacks: input.prior?.packs ?? 0,
    },
  };
}

function shareLeft({ grid }: Filtered, dates: OutDates): Forecast["shareLeft"] {
  const marginal = depthMarginal(grid);
  const depthAt = (p: number): number => gridQuantile(marginal, grid.depthFrom, grid.depthStep, p);
  const end = dates.endDepth(depthAt(0.5));
  const at = (probability: number): number =>
    Math.min(1, Math.max(0, 1 - depthAt(1 - probability) / end));
  return { p05: at(0.05), p50: at(0.5), p95: at(0.95) };
}

/**
 * The filter knows draw over capacity; the draw's part of it follows the two priors'
 * variances (both normal in the logarithm).
 */
function drawNow({ model, grid }: Filtered): Forecast["drawUa"] {
  const { mean, sd, drawMean, drawSd } = model.prior;
  const marginal = rateMarginal(grid);
  const part = (drawSd / sd) ** 2;
  const ln = (p: number): number => gridQuantile(marginal, grid.lnRate[0]!, grid.rateStep, p);
  const middle = drawMean + part * (ln(0.5) - mean);
  const own = Z90 * drawSd * Math.sqrt(1 - part);
  const ua = (shift: number): number => model.averageUa * Math.exp(middle + shift);
  return {
    p05: ua(-Math.hypot(part * (ln(0.5) - ln(0.05)), own)),
    p50: ua(0),
    p95: ua(Math.hypot(part * (ln(0.95) - ln(0.5)), own)),
  };
}

/**
 * Probability that the device has stopped by a day, from the forecast's stored quantiles;
 * below the first and above the last it falls off over the width of the next twenty percent.
 */
export function chanceOutBy(forecast: Pick<Forecast, "cdfDays">, day: EpochDays): number {
  const days = forecast.cdfDays;
  const first = days[0]!;
  const last = days[days.length - 1]!;
  if (day < first) {
    const width = Math.max(1, days[10]! - first) / 2;
    return 0.01 * Math.max(0, 1 - (first - day) / width);
  }
  if (day > last) {
    const width = Math.max(1, last - days[39]!) / 2;
    return 1 - 0.01 * Math.max(0, 1 - (day - last) / width);
  }
  return interpolate(days, CDF_PROBABILITIES, day);
}

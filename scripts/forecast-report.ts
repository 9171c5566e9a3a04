/** A forecast as the command line tells it: in lines, or as one JSON object. */
import {
  CDF_PROBABILITIES,
  type ColdSnap,
  type Forecast,
  type ReadingWeight,
} from "../lib/battery";
import { MS_PER_DAY } from "../lib/units";
import { type Fineness, timeText } from "./forecast-file";

/** Windows narrower than this, in days, are told with the time of day; with seconds. */
const SHORT_DAYS = 7;
const BRIEF_DAYS = 1 / 24;
/** More readings than this are not listed one by one. */
const MOST_LISTED = 40;

const percent = (share: number): string => `${Math.round(share * 100)} %`;

/** The lines of a forecast, dates in UTC as finely as their windows deserve. */
export function reportLines(forecast: Forecast, cold: ColdSnap | null): string[] {
  const { shareLeft, drawUa, outNow, basis, weights } = forecast;
  const { p05, p20, p50, p80, p95 } = forecast.quantiles;
  const width = p95 - p05;
  const fineness: Fineness = width < BRIEF_DAYS ? "second" : width < SHORT_DAYS ? "minute" : "day";
  const day = (at: number): string => timeText(at, fineness);
  const lines = [
    `Out, likely      ${day(p50)}`,
    `  3 in 5         ${day(p20)} to ${day(p80)}`,
    `  9 in 10        ${day(p05)} to ${day(p95)}`,
    `Charge left      ${percent(shareLeft.p50)} (${percent(shareLeft.p05)} to ${percent(shareLeft.p95)})`,
    `Average draw     ${drawUa.p50.toFixed(1)} uA (${drawUa.p05.toFixed(1)} to ${drawUa.p95.toFixed(1)})`,
    `Out already      ${percent(outNow)}`,
  ];
  if (cold) {
    lines.push(
      `Cold             may stop ${day(cold.stopsAt)}, come back ${day(cold.returnsAt)}, end ${day(cold.endsAt)}`,
    );
  }
  lines.push(
    `Rests on         ${basis.restingReadings} resting and ${basis.loadedReadings} loaded readings, ${basis.doubtfulReadings} of them doubtful; ${basis.measuredDraw ? "measured draw" : "draw by the duty cycle"}`,
  );
  return [...lines, ...weightLines(weights)];
}

/** Each reading's weight; of a long log those that did not fit. */
function weightLines(weights: readonly ReadingWeight[]): string[] {
  const told = weights.length > MOST_LISTED ? weights.filter((w) => w.reason !== "fits") : weights;
  const lines = told.slice(0, MOST_LISTED).map((w) => {
    const band = `${Math.round(w.expectedLowMv)} to ${Math.round(w.expectedHighMv)} mV expected`;
    return `  ${w.readingId.padEnd(14)} weight ${w.weight.toFixed(2)}  ${w.reason}  (${band})`;
  });
  const rest = weights.length - lines.length;
  return rest > 0 ? [...lines, `  ${rest} more readings; --json lists every one`] : lines;
}

/** The same as an object for machines: moments as ISO 8601 in UTC, the whole distribution. */
export function reportJson(forecast: Forecast, cold: ColdSnap | null): unknown {
  const iso = (at: number): string => new Date(Math.round(at * MS_PER_DAY)).toISOString();
  const { p05, p20, p50, p80, p95 } = forecast.quantiles;
  return {
    quantiles: { p05: iso(p05), p20: iso(p20), p50: iso(p50), p80: iso(p80), p95: iso(p95) },
    cdf: CDF_PROBABILITIES.map((probability, k) => ({
      probability,
      at: iso(forecast.cdfDays[k]!),
    })),
    shareLeft: forecast.shareLeft,
    drawUa: forecast.drawUa,
    outNow: forecast.outNow,
    coldSnap: cold && {
      stopsAt: iso(cold.stopsAt),
      returnsAt: iso(cold.returnsAt),
      endsAt: iso(cold.endsAt),
    },
    basis: forecast.basis,
    weights: forecast.weights,
  };
}

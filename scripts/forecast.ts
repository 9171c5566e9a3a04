/**
 * npm run forecast -- FILE
 *
 * Forecast one pack from a file, JSON or CSV; the formats are told in lib/battery/README.md.
 * The web pages and this command share one function. Bad input is refused by field.
 */
import { readFileSync } from "node:fs";
import { coldSnap, type Forecast, forecastPack } from "../lib/battery";
import { isAppError } from "../lib/errors";
import { readForecastFile, timeText } from "./forecast-file";

/** Windows narrower than this are told with the time of day. */
const SHORT_DAYS = 7;

const percent = (share: number): string => `${Math.round(share * 100)} %`;

function print(forecast: Forecast, cold: ReturnType<typeof coldSnap>): void {
  const { quantiles, shareLeft, drawUa, outNow, basis, weights } = forecast;
  const { p05, p20, p50, p80, p95 } = quantiles;
  const day = (at: number): string => timeText(at, p95 - p05 < SHORT_DAYS);
  console.log(`Out, likely      ${day(p50)}`);
  console.log(`  3 in 5         ${day(p20)} to ${day(p80)}`);
  console.log(`  9 in 10        ${day(p05)} to ${day(p95)}`);
  console.log(
    `Charge left      ${percent(shareLeft.p50)} (${percent(shareLeft.p05)} to ${percent(shareLeft.p95)})`,
  );
  console.log(
    `Average draw     ${drawUa.p50.toFixed(1)} uA (${drawUa.p05.toFixed(1)} to ${drawUa.p95.toFixed(1)})`,
  );
  console.log(`Out already      ${percent(outNow)}`);
  if (cold) {
    console.log(
      `Cold             may stop ${day(cold.stopsAt)}, come back ${day(cold.returnsAt)}, end ${day(cold.endsAt)}`,
    );
  }
  console.log(
    `Rests on         ${basis.restingReadings} resting and ${basis.loadedReadings} loaded readings, ${basis.doubtfulReadings} of them doubtful; ${basis.measuredDraw ? "measured draw" : "draw by the duty cycle"}`,
  );
  for (const w of weights) {
    const band = `${Math.round(w.expectedLowMv)} to ${Math.round(w.expectedHighMv)} mV expected`;
    console.log(
      `  ${w.readingId.padEnd(14)} weight ${w.weight.toFixed(2)}  ${w.reason}  (${band})`,
    );
  }
}

function run(file: string | undefined): number {
  if (!file) {
    console.error(
      "Give a file: npm run forecast -- FILE (JSON or CSV; see lib/battery/README.md).",
    );
    return 2;
  }
  try {
    const input = readForecastFile(readFileSync(file, "utf8"), file);
    print(forecastPack(input), coldSnap(input));
    return 0;
  } catch (error) {
    if (!isAppError(error)) {
      if (!(error instanceof Error && "code" in error)) throw error;
      console.error(`${file} cannot be read: ${error.message}`);
      return 2;
    }
    console.error(error.message);
    for (const { field, row, message } of error.faults) {
      console.error(`  ${field}${row === undefined ? "" : `, row ${row}`}: ${message}`);
    }
    return 1;
  }
}

process.exitCode = run(process.argv[2]);

/**
 * npm run forecast -- FILE [--json]
 *
 * Forecast one pack from a file, JSON or CSV; the formats are told in lib/battery/README.md.
 * The web pages and this command share one function. Bad input is refused by field: exit code 1;
 * a file that cannot be read: 2.
 */
import { readFileSync } from "node:fs";
import { coldSnap, forecastPack } from "../lib/battery";
import { isAppError } from "../lib/errors";
import { readForecastFile } from "./forecast-file";
import { reportJson, reportLines } from "./forecast-report";

const USAGE = "Give a file: npm run forecast -- FILE [--json] (see lib/battery/README.md).";

function run(words: readonly string[]): number {
  const json = words.includes("--json");
  const files = words.filter((word) => word !== "--json");
  const [file] = files;
  if (!file || files.length > 1 || file.startsWith("--")) {
    console.error(USAGE);
    return 2;
  }
  try {
    const input = readForecastFile(readFileSync(file, "utf8"), file);
    const forecast = forecastPack(input);
    const cold = coldSnap(input);
    if (json) console.log(JSON.stringify(reportJson(forecast, cold), null, 2));
    else console.log(reportLines(forecast, cold).join("\n"));
    return 0;
  } catch (error) {
    return refuse(file, error);
  }
}

function refuse(file: string, error: unknown): number {
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

process.exitCode = run(process.argv.slice(2));

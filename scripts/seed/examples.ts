/** Writes the example files anew: `npx tsx scripts/seed/examples.ts 2026-12-01T08:00:00Z`. */
import { writeFile } from "node:fs/promises";
import { stringify } from "csv-stringify/sync";
import { buildScenario } from "../simulate/scenario/build-scenario";
import { cellTypeTable, deviceModelTable } from "./example-catalogue";
import * as tables from "./example-tables";
import type { TextTable } from "./text-table";

const EXAMPLE_SEED = 1;
const BYTE_ORDER_MARK = "\ufeff";

async function write(name: string, table: TextTable, delimiter: "," | ";", mark = "") {
  const text = stringify(table as string[][], { delimiter, record_delimiter: "windows" });
  await writeFile(new URL(`../../examples/${name}`, import.meta.url), mark + text);
  console.log(`examples/${name}: ${table.length - 1} rows`);
}

const now = new Date(process.argv[2] ?? "");
if (Number.isNaN(now.getTime()))
  throw new Error("Say which moment the history ends at, in ISO 8601.");
const scenario = buildScenario(EXAMPLE_SEED, now);
const assets = tables.exampleAssets(scenario);
const tags = new Set(assets.map((a) => a.tag));
await write("cell-types.csv", cellTypeTable(scenario), ",");
await write("device-models.csv", deviceModelTable(scenario), ",");
await write("assets-with-sites.csv", tables.assetTable(scenario, assets), ",", BYTE_ORDER_MARK);
await write("installs.csv", tables.installTable(scenario, tags), ",");
await write("readings.csv", tables.readingTable(scenario, tags), ";");

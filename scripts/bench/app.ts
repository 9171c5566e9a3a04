/**
 * `npm run bench:app [-- --json]`: what the screens and the import cost beside the bare
 * database, as ratios within one run. Works on the scenario's database; where `npm start` runs
 * (or APP_URL is set), the Horizon is asked for as a browser would.
 */
import { homeOf } from "../process/place.mjs";
import { runningStart } from "../process/run-record.mjs";
import { benchHorizon } from "./horizon";
import { benchImport } from "./import";

/** What was promised: the Horizon at most 3 ×, the import at most 5 ×. */
const PROMISED = { horizon: 3, import: 5 };

async function main(): Promise<void> {
  const databaseUrl = process.env.DATABASE_URL;
  if (!databaseUrl) throw new Error("Set DATABASE_URL, or run `npm start` in another window.");
  const address = process.env.APP_URL ?? runningStart(homeOf())?.address ?? null;
  const horizon = await benchHorizon(databaseUrl, address);
  const readings = await benchImport(databaseUrl);
  if (process.argv.includes("--json")) {
    console.log(JSON.stringify({ horizon, import: readings, promised: PROMISED }));
    return;
  }
  const ms = (value: number | null) => (value === null ? "no product runs" : value.toFixed(1));
  console.log(`Horizon, first 100 of ${horizon.packs} packs (medians, ms)`);
  console.log(
    `  bare SQL ${ms(horizon.bareSqlMs)} · use case ${ms(horizon.useCaseMs)} · page ${ms(horizon.pageMs)}`,
  );
  console.log(`  ratio ${horizon.ratio.toFixed(2)} (promised at most ${PROMISED.horizon})`);
  console.log(`Import of ${readings.rows} readings (medians, ms)`);
  console.log(
    `  bare COPY ${ms(readings.copyMs)} · import ${ms(readings.applyMs)} · dry run ${ms(readings.checkMs)}`,
  );
  console.log(`  ratio ${readings.ratio.toFixed(2)} (promised at most ${PROMISED.import})`);
}

main().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
});

/**
 * npm run bench:forecast-speed [-- --packs 100000 --json]
 *
 * The nightly renewal of a large fleet on PostgreSQL: reads the voltages of every pack (20
 * each), forecasts on two threads, writes a row a pack, through the product's own use case. In
 * the same run the same rows are only read and written (`ioSeconds`). The database is a
 * throw-away one: on a temporary server, or beside the one that DATABASE_URL names.
 */
import { parseArgs } from "node:util";
import { connect } from "../../db/client";
import { migrateToLatest } from "../../db/migrate";
import { Lifetime } from "../process/lifetime.mjs";
import { startTemporaryPostgres } from "../process/temporary-postgres.mjs";
import { throwAwayDatabase } from "./forecast-speed/database";
import { fillFleet, READINGS_A_PACK } from "./forecast-speed/fleet";
import { type Run, type Taken, runOnThreads } from "./forecast-speed/threads";

const THREADS = 2;
/** What was promised for 100,000 packs, and beside reading and writing alone. */
const PROMISED = { seconds: 60, ratio: 3 };

interface Result {
  readonly packs: number;
  readonly readings: number;
  readonly seconds: number;
  readonly ioSeconds: number;
  readonly peakMiB: number;
  /** Processor time of all threads, the database's own left out: holds on a busy machine too. */
  readonly cpuSeconds: number;
  readonly ioCpuSeconds: number;
  readonly threads: number;
}

const { values } = parseArgs({
  options: {
    packs: { type: "string", default: "100000" },
    json: { type: "boolean", default: false },
  },
});

async function main(): Promise<void> {
  const packs = Number(values.packs);
  if (!Number.isInteger(packs) || packs < 1)
    throw new Error("--packs: give a whole number of 1 or more.");
  const life = new Lifetime().listen();
  const tell = (name: string, error: unknown): void => {
    process.stderr.write(`${name}: ${String(error)}\n`);
  };
  // Ctrl-C leaves neither a server nor a database behind
  void life.asked.then(() => life.end(tell)).then(() => process.exit(130));
  try {
    const server = process.env.DATABASE_URL ?? (await startTemporaryPostgres(life)).url("postgres");
    const database = await throwAwayDatabase(server);
    life.onEnd("throw-away database", database.drop);
    print(await measure(database.url, packs));
  } finally {
    await life.end(tell);
  }
}

async function measure(url: string, packs: number): Promise<Result> {
  const db = connect(url, { max: 2 });
  await migrateToLatest(db);
  await fillFleet(db, url, packs);
  await db.destroy();
  // the first run writes the rows that both later ones replace, and warms nothing up for one alone
  const run = (kind: Run): Promise<Taken> => runOnThreads(THREADS, url, kind);
  await run("io");
  const io = await run("io");
  const forecast = await run("forecast");
  const peakMiB = process.resourceUsage().maxRSS / 1024;
  return {
    packs,
    readings: packs * READINGS_A_PACK,
    seconds: forecast.seconds,
    ioSeconds: io.seconds,
    peakMiB,
    cpuSeconds: forecast.cpuSeconds,
    ioCpuSeconds: io.cpuSeconds,
    threads: THREADS,
  };
}

function print(result: Result): void {
  if (values.json) {
    console.log(JSON.stringify(result));
    return;
  }
  const { packs, readings, seconds, ioSeconds, peakMiB } = result;
  const took = (wall: number, cpu: number): string =>
    `${wall.toFixed(1)} s (${cpu.toFixed(1)} s of processor time)`;
  const ratio = (seconds / ioSeconds).toFixed(2);
  console.log(`${packs} packs, ${readings} readings, ${result.threads} threads`);
  console.log(`  forecast        ${took(seconds, result.cpuSeconds)}`);
  console.log(`  read and write  ${took(ioSeconds, result.ioCpuSeconds)}`);
  console.log(`  ratio           ${ratio} (promised at most ${PROMISED.ratio})`);
  console.log(`  memory          ${peakMiB.toFixed(0)} MiB at the most, all threads`);
  console.log(`  promised for 100,000 packs: less than ${PROMISED.seconds} s`);
}

main().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
});

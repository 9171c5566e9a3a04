import { connect } from "../../../db/client";
import { ThreadPool } from "../../../lib/server/threads/pool";
import { startRenewal } from "../../../lib/server/threads/renew-forecasts";
import { installedPages } from "../../../lib/usecases/refresh-forecasts";
import { NOW } from "./fleet";

/** `forecast`: the whole renewal. `io`: the same rows read and written, nothing computed. */
export type Run = "forecast" | "io";

export interface Taken {
  readonly seconds: number;
  /** Processor time of all threads here; the database's own is not in it. */
  readonly cpuSeconds: number;
}

/** What some threads take for every installed pack, their start left out. */
export async function runOnThreads(threads: number, url: string, run: Run): Promise<Taken> {
  const pool = await start(threads, url, run);
  const db = connect(url, { max: 1 });
  try {
    const from = performance.now();
    const cpu = process.cpuUsage();
    await pool.work(installedPages({ db }));
    const { user, system } = process.cpuUsage(cpu);
    return { seconds: (performance.now() - from) / 1000, cpuSeconds: (user + system) / 1e6 };
  } finally {
    await pool.end();
    await db.destroy();
  }
}

function start(threads: number, url: string, run: Run): Promise<ThreadPool> {
  if (run === "forecast") return startRenewal({ url, at: NOW.toISOString() }, threads);
  const file = new URL("./io-start.mjs", import.meta.url);
  return ThreadPool.start({ start: file, threads, workerData: { url } });
}

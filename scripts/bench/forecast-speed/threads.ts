import { Worker } from "node:worker_threads";
import { connect } from "../../../db/client";
import { installedPackPage } from "../../../db/queries/forecasts";

/** `forecast`: the whole renewal. `io`: the same rows read and written, nothing computed. */
export type Run = "forecast" | "io";

export interface Task {
  readonly run: Run;
  readonly packIds: readonly string[];
}

/** Packs handed to a thread at a time. */
const PAGE = 500;

export interface Taken {
  readonly seconds: number;
  /** Processor time of all threads here; the database's own is not in it. */
  readonly cpuSeconds: number;
}

/** What some threads take for every installed pack, their start left out. */
export async function runOnThreads(count: number, url: string, run: Run): Promise<Taken> {
  const start = new URL("./thread-start.mjs", import.meta.url);
  const workers = Array.from({ length: count }, () => new Worker(start, { workerData: { url } }));
  const db = connect(url, { max: 1 });
  try {
    await Promise.all(workers.map((worker) => answer(worker)));
    const from = performance.now();
    const cpu = process.cpuUsage();
    let page: Promise<string[]> = installedPackPage(db, null, PAGE);
    const next = async (): Promise<string[]> => {
      const now = page;
      page = now.then((ids) =>
        ids.length < PAGE ? [] : installedPackPage(db, ids[ids.length - 1]!, PAGE),
      );
      return now;
    };
    await Promise.all(workers.map((worker) => serve(worker, run, next)));
    const { user, system } = process.cpuUsage(cpu);
    return { seconds: (performance.now() - from) / 1000, cpuSeconds: (user + system) / 1e6 };
  } finally {
    await Promise.all(workers.map((worker) => worker.terminate()));
    await db.destroy();
  }
}

/** Gives a thread page after page until there are none left. */
async function serve(worker: Worker, run: Run, next: () => Promise<string[]>): Promise<void> {
  for (;;) {
    const packIds = await next();
    if (packIds.length === 0) return;
    const done = answer(worker);
    worker.postMessage({ run, packIds } satisfies Task);
    await done;
  }
}

function answer(worker: Worker): Promise<unknown> {
  return new Promise((resolve, reject) => {
    worker.once("error", reject);
    worker.once("message", (message) => {
      worker.off("error", reject);
      resolve(message);
    });
  });
}

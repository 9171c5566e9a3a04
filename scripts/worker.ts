/** The worker process: takes jobs from the queue that lies in the same PostgreSQL. */
import PgBoss from "pg-boss";
import { deps, env } from "@/lib/server/deps";
import { bossConnection, QUEUES } from "@/lib/server/jobs";
import { log } from "@/lib/server/log";
import { searchBeside } from "@/lib/server/search-threads/search-beside";
import { HANDLERS } from "@/lib/server/job-handlers";
import type { JobName } from "@/lib/usecases/use-case";

/** Each queue's own beat: mail and forecasts should feel immediate, the rest need not. */
const POLL_SECONDS = 1;

/** Takers of a queue, where one a beat would be slow: a published week sends many mails. */
const TAKERS: Partial<Record<JobName, number>> = { mail: 4, forecast: 2 };

/** Times are UTC; the digest job itself looks up whose hour it is where. */
const SCHEDULE: Partial<Record<JobName, string>> = {
  "forecast-all": "15 2 * * *",
  digests: "*/5 * * * *",
};

async function main(): Promise<void> {
  env();
  const boss = new PgBoss({ db: bossConnection(deps().db) });
  boss.on("error", (error) => log.error({ error }, "queue"));
  await boss.start();
  for (const name of Object.keys(QUEUES) as JobName[]) {
    await boss.createQueue(name);
    for (let taker = 0; taker < (TAKERS[name] ?? 1); taker += 1) {
      await boss.work(name, { pollingIntervalSeconds: POLL_SECONDS }, (jobs) =>
        Promise.all(jobs.map((job) => run(name, job.data))).then(() => undefined),
      );
    }
  }
  for (const [name, cron] of Object.entries(SCHEDULE)) await boss.schedule(name, cron);
  log.info({ queues: Object.keys(QUEUES).length }, "worker ready");

  const stop = async (): Promise<void> => {
    await boss.stop({ graceful: true, timeout: 20_000 });
    await deps().db.destroy();
    process.exit(0);
  };
  process.once("SIGTERM", () => void stop());
  process.once("SIGINT", () => void stop());
}

async function run(name: JobName, data: unknown): Promise<void> {
  const started = performance.now();
  try {
    const result = await HANDLERS[name]({ ...deps(), searchRounds: searchBeside }, data as never);
    log.info({ job: name, result, ms: Math.round(performance.now() - started) });
  } catch (error) {
    log.error({ job: name, error, ms: Math.round(performance.now() - started) }, "job failed");
    throw error;
  }
}

main().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exit(1);
});

import PgBoss from "pg-boss";
import { QUEUES } from "@/lib/server/jobs";

/** Brings the job queue's own tables up to date, so that nothing enqueued is refused. */
export async function prepareQueues(databaseUrl: string): Promise<void> {
  const boss = new PgBoss({ connectionString: databaseUrl, max: 1, supervise: false });
  await boss.start();
  for (const name of Object.keys(QUEUES)) await boss.createQueue(name);
  await boss.stop({ graceful: false, wait: true });
}

import PgBoss from "pg-boss";
import { QUEUES } from "@/lib/server/jobs";

/** The job queue's own tables and queues, so that use cases under test can enqueue. */
export async function startQueueSchema(databaseUrl: string): Promise<void> {
  const boss = new PgBoss({ connectionString: databaseUrl, max: 1, supervise: false });
  await boss.start();
  for (const name of Object.keys(QUEUES)) await boss.createQueue(name);
  await boss.stop({ graceful: false, wait: true });
}

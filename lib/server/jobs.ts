import { CompiledQuery, type Kysely } from "kysely";
import PgBoss from "pg-boss";
import type { Database } from "@/db/client";
import type { JobName, JobQueue } from "@/lib/usecases/use-case";

/** Every queue, with how often a failed job is tried again. */
export const QUEUES: Record<JobName, { retryLimit: number; expireInSeconds: number }> = {
  forecast: { retryLimit: 5, expireInSeconds: 300 },
  "forecast-all": { retryLimit: 2, expireInSeconds: 1800 },
  plan: { retryLimit: 1, expireInSeconds: 900 },
  mail: { retryLimit: 8, expireInSeconds: 120 },
  digests: { retryLimit: 3, expireInSeconds: 300 },
  "import-check": { retryLimit: 1, expireInSeconds: 900 },
  "import-apply": { retryLimit: 1, expireInSeconds: 900 },
};

/** Runs pg-boss's SQL on a Kysely handle, so that a job shares the caller's transaction. */
export function bossConnection(db: Kysely<Database>): PgBoss.Db {
  return {
    async executeSql(text: string, values: unknown[]) {
      const result = await db.withoutPlugins().executeQuery(CompiledQuery.raw(text, values));
      return { rows: result.rows as never[] };
    },
  };
}

// Only sends: it neither polls nor maintains; the worker owns the schema (`startBoss`).
let sender: PgBoss | null = null;

function senderFor(db: Kysely<Database>): PgBoss {
  sender ??= new PgBoss({
    db: bossConnection(db),
    supervise: false,
    schedule: false,
    migrate: false,
  });
  return sender;
}

export const transactionalJobs: JobQueue = {
  async enqueue(db, name, data, options = {}) {
    await senderFor(db).send(name, data, {
      db: bossConnection(db),
      retryBackoff: true,
      retryDelay: 5,
      ...QUEUES[name],
      ...(options.singletonKey ? { singletonKey: options.singletonKey } : {}),
      ...(options.startAfter ? { startAfter: options.startAfter } : {}),
    });
  },
};

import { randomUUID } from "node:crypto";
import { connect } from "@/db/client";
import { type Env, parseEnv } from "@/lib/env";
import type { Deps } from "@/lib/usecases/use-case";
import { cleanImage } from "./clean-image";
import { transactionalJobs } from "./jobs";
import { resendMailer } from "./mail";
import { objectStorage } from "./object-storage";
import { storedLegs } from "./travel-legs";
import { tableService } from "./travel-table";

interface Process {
  readonly env: Env;
  readonly deps: Deps;
}

// A development server reloads modules; the pool must outlive them.
const holder = globalThis as { wanewrightProcess?: Process };

function process_(): Process {
  holder.wanewrightProcess ??= create();
  return holder.wanewrightProcess;
}

function create(): Process {
  const env = parseEnv(process.env);
  const db = connect(env.DATABASE_URL, { applicationName: "wanewright-web" });
  return {
    env,
    deps: {
      db,
      now: currentTime,
      newId: randomUUID,
      jobs: transactionalJobs,
      mailer: resendMailer(env),
      appUrl: env.APP_URL.replace(/\/+$/, ""),
      travel: tableService(storedLegs(db, currentTime)),
      storage: objectStorage(env),
      cleanImage,
    },
  };
}

/** The clock of this process. WANEWRIGHT_NOW fixes it, for tests that need a given day. */
export function currentTime(): Date {
  const fixed = process.env.WANEWRIGHT_NOW;
  return fixed ? new Date(fixed) : new Date();
}

/** What use cases need, one set a process. */
export function deps(): Deps {
  return process_().deps;
}

export function env(): Env {
  return process_().env;
}

import { availableParallelism } from "node:os";
import { installedPages, refreshForecasts } from "@/lib/usecases/refresh-forecasts";
import type { Deps } from "@/lib/usecases/use-case";
import { ThreadPool } from "./pool";

/** What a thread of the renewal is started with. */
export interface RenewalData {
  /** Address of the database. */
  readonly url: string;
  /** The moment to forecast at, ISO 8601; null: the clock's. */
  readonly at: string | null;
}

/** Each learns what the fleet teaches by itself; more would mostly wait for the database. */
const MOST_THREADS = 2;
/** Below this a thread's start costs more than it saves. */
const WORTH_PACKS = 5_000;

const START = new URL("./renewal-start.mjs", import.meta.url);

/** Threads that have the database at `url` open, ready for pages of packs. */
export function startRenewal(data: RenewalData, threads: number): Promise<ThreadPool> {
  return ThreadPool.start({ start: START, threads, workerData: data });
}

/**
 * Renews every installed pack's forecast: on threads where the fleet is large and the machine
 * has cores to spare, else here. A page of packs is written by one statement, so that a thread
 * that fails leaves none half-written; the packs before it keep their new forecasts.
 * @param deps the process's own; `url` names the same database
 * @throws Error when a thread cannot start, fails or dies
 */
export async function renewForecasts(
  deps: Deps,
  url: string,
  { threads = Math.min(MOST_THREADS, availableParallelism()), worthPacks = WORTH_PACKS } = {},
): Promise<{ refreshed: number }> {
  if (threads < 2 || !(await isAtLeast(deps, worthPacks))) {
    return refreshForecasts(deps, { kind: "system" }, { packIds: null });
  }
  const pool = await startRenewal({ url, at: process.env.WANEWRIGHT_NOW ?? null }, threads);
  try {
    return { refreshed: await pool.work(installedPages(deps)) };
  } finally {
    await pool.end();
  }
}

async function isAtLeast(deps: Deps, packs: number): Promise<boolean> {
  let seen = 0;
  for await (const page of installedPages(deps)) {
    seen += page.length;
    if (seen >= packs) return true;
  }
  return seen >= packs;
}

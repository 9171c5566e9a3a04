import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { markForecastsStale } from "@/db/queries/forecasts";
import type { Deps } from "./use-case";

/**
 * Says that these packs' forecasts no longer hold: they show as stale at once and a job
 * renews them. Call it in the transaction of the change (reading, swap, draw, verdict).
 */
export async function touchForecasts(
  trx: Transaction<Database>,
  deps: Deps,
  packIds: readonly string[],
): Promise<void> {
  if (packIds.length === 0) return;
  await markForecastsStale(trx, packIds, deps.now());
  await deps.jobs.enqueue(trx, "forecast", { packIds: [...packIds] });
}

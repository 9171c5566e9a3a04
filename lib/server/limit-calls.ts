import {
  countRateEvents,
  deleteRateEvents,
  forgetBucketEvents,
  insertRateEvents,
} from "@/db/queries/rate-events";
import { AppError } from "@/lib/errors";
import type { Deps } from "@/lib/usecases/use-case";

/** Calls of one key a minute; a call takes up to 1,000 readings. Common practice, no source. */
export const CALLS_A_MINUTE = 120;
const WINDOW_MS = 60_000;

/**
 * Counts a call of an API key. Each is written first and counted after, so that many at once
 * cannot slip through together; one that is refused does not count.
 * @throws AppError too_many
 */
export async function limitCalls({ db, now }: Deps, apiKeyId: string): Promise<void> {
  const bucket = `api-key:${apiKeyId}`;
  const at = now();
  const since = new Date(at.getTime() - WINDOW_MS);
  await forgetBucketEvents(db, bucket, since);
  const ids = await insertRateEvents(db, [bucket], at);
  const { count } = await countRateEvents(db, bucket, since);
  if (count <= CALLS_A_MINUTE) return;
  await deleteRateEvents(db, ids);
  const most = `More than ${CALLS_A_MINUTE} calls a minute with one key`;
  throw new AppError("too_many", `${most}: wait a minute, and send more readings in each call.`);
}

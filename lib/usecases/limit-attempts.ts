import { AppError } from "@/lib/errors";
import {
  clearRateBucket,
  countRateEvents,
  deleteRateEvents,
  forgetRateEvents,
  insertRateEvents,
} from "@/db/queries/rate-events";
import type { Deps } from "./use-case";

export interface AttemptLimit {
  /** What attempts are counted under, such as "sign-in:mail:ada@example.org". */
  readonly bucket: string;
  readonly most: number;
  readonly minutes: number;
}

export interface Attempt {
  /** It was no failure: counts nowhere, and the buckets named are forgiven. */
  forgive(buckets: readonly string[]): Promise<void>;
}

const DAY_MS = 86_400_000;

/**
 * Counts an attempt before it is made: each is written first and counted after, so that many
 * at once cannot slip through together. An attempt that is refused does not count, so nobody
 * stays locked out by knocking on.
 * @throws AppError too_many, saying when to come again
 */
export async function countAttempt(
  deps: Deps,
  limits: readonly AttemptLimit[],
  otherWay: string,
): Promise<Attempt> {
  const now = deps.now();
  await forgetRateEvents(deps.db, new Date(now.getTime() - DAY_MS));
  const buckets = limits.map((limit) => limit.bucket);
  const ids = await insertRateEvents(deps.db, buckets, now);
  for (const limit of limits) {
    const windowMs = limit.minutes * 60_000;
    const since = new Date(now.getTime() - windowMs);
    const { count, first } = await countRateEvents(deps.db, limit.bucket, since);
    if (count <= limit.most) continue;
    await deleteRateEvents(deps.db, ids);
    const leftMs = (first ?? now).getTime() + windowMs - now.getTime();
    const minutes = Math.max(1, Math.ceil(leftMs / 60_000));
    const wait = minutes === 1 ? "1 minute" : `${minutes} minutes`;
    throw new AppError("too_many", `Too many attempts. Try again in ${wait}${otherWay}.`);
  }
  return {
    async forgive(forgiven) {
      await deleteRateEvents(deps.db, ids);
      for (const bucket of forgiven) await clearRateBucket(deps.db, bucket);
    },
  };
}

import { setTimeout as wait } from "node:timers/promises";

/**
 * Takes at least so long, whatever happens inside: where an answer must not tell whether an
 * account exists, its time must not either.
 */
export async function steadily<T>(leastMs: number, work: () => Promise<T>): Promise<T> {
  const [outcome] = await Promise.allSettled([work(), wait(leastMs)]);
  if (outcome.status === "fulfilled") return outcome.value;
  throw outcome.reason;
}

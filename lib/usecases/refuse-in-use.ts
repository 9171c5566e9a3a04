import { conflict } from "@/lib/errors";

/** PostgreSQL's foreign_key_violation. */
const STILL_REFERENCED = "23503";

/**
 * Runs a removal; what other rows still point to is kept.
 * @throws AppError conflict with these words
 */
export async function refuseInUse<T>(words: string, remove: () => Promise<T>): Promise<T> {
  try {
    return await remove();
  } catch (error) {
    if (error instanceof Error && "code" in error && error.code === STILL_REFERENCED) {
      throw conflict(words);
    }
    throw error;
  }
}

/** How a build goes: what is shown while it runs and afterwards. */
export interface BuildProgress {
  /** 0 to 1. */
  readonly share: number;
  /** Cost of the best plan after each part of the search, minor units, ever lower. */
  readonly costs: readonly number[];
}

/** The stored progress, or null before the first note. */
export function storedProgress(progress: unknown): BuildProgress | null {
  return progress && typeof progress === "object" && "share" in progress
    ? (progress as BuildProgress)
    : null;
}

import { cleanText } from "@/lib/sync/clean-text";

/** Deeper than anything the phone sends. */
const MOST_LEVELS = 20;

/**
 * A copy of any JSON value that PostgreSQL's jsonb takes: without NUL characters and halves of
 * surrogate pairs, and cut off where it is nested absurdly deep.
 */
export function storableJson(value: unknown, levels = MOST_LEVELS): unknown {
  if (typeof value === "string") return cleanText(value);
  if (typeof value !== "object" || value === null) return value ?? null;
  if (levels === 0) return null;
  if (Array.isArray(value)) return value.map((item) => storableJson(item, levels - 1));
  return Object.fromEntries(
    Object.entries(value).map(([key, item]) => [
      String(storableJson(key)),
      storableJson(item, levels - 1),
    ]),
  );
}

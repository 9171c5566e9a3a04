import { z } from "zod";

/** Rows on one page of a list. */
export const PAGE_SIZE = 100;

/**
 * What stands in a list's address. Addresses are typed, shared and cut off: what makes no
 * sense falls back to the default instead of failing.
 */
export const listEntries = {
  search: z.string().trim().max(100).catch(""),
  descending: z.boolean().catch(false),
  page: z.coerce.number().int().min(1).max(100_000).catch(1),
};

/** A filter by id; null or nonsense: not filtered. */
export const filterId = z.uuid().nullable().catch(null);

/** A filter by one of these words; null or nonsense: not filtered. */
export function filterWord<const Words extends readonly string[]>(words: Words) {
  return z.enum(words).nullable().catch(null);
}

/** Which rows a page holds. */
export function pageWindow(page: number): { readonly limit: number; readonly offset: number } {
  return { limit: PAGE_SIZE, offset: (page - 1) * PAGE_SIZE };
}

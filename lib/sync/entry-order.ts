/**
 * Which entries must keep their order. Entries about one thing (an asset, a stop, a round)
 * depend on each other; entries about different things do not.
 */

/** As much of an entry's body as the order depends on. */
interface Ordered {
  readonly kind: string;
  readonly assetId?: unknown;
  readonly stopId?: unknown;
  readonly roundId?: unknown;
}

const AT_STOP = new Set(["cannot", "stop-done", "note"]);
const ON_ROUND = new Set(["round", "load-check", "reorder"]);

/** What an entry is about: entries with the same subject are applied in the order made. */
export function subjectOf(body: unknown): string | null {
  if (typeof body !== "object" || body === null || !("kind" in body)) return null;
  const { kind, assetId, stopId, roundId } = body as Ordered;
  if (kind === "reading" || kind === "swap") return named("asset", assetId);
  if (AT_STOP.has(kind)) return named("stop", stopId);
  return ON_ROUND.has(kind) ? named("round", roundId) : null;
}

function named(what: string, id: unknown): string | null {
  return typeof id === "string" ? `${what}:${id}` : null;
}

/** The pack an entry takes for granted: it must be known before the entry can be applied. */
export function packNeeded(body: unknown): string | null {
  if (typeof body !== "object" || body === null || !("kind" in body)) return null;
  const { kind, packId, oldPackId } = body as Ordered & { packId?: unknown; oldPackId?: unknown };
  const id = kind === "reading" ? packId : kind === "swap" ? oldPackId : null;
  return typeof id === "string" ? id : null;
}

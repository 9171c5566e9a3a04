/**
 * The outbox of a phone as pure functions: which entries go next, and what becomes of them.
 *
 *   kept --take--> sending --applied--> applied (until a day pack that holds it arrives)
 *    ^                |------refused--> refused --mend or discard--> gone
 *    '---later/cut----'
 *
 * Nothing leaves the outbox but by `prune` (the server has it) and `discard` (the person says so).
 */
import type { EntryBody, EntryOutcome, Refusal } from "./entries";
import { packNeeded, subjectOf } from "./entry-order";

export type EntryState = "kept" | "sending" | "applied" | "refused";

export interface OutboxEntry {
  /** Order of making on this phone. */
  readonly seq: number;
  readonly id: string;
  readonly personId: string;
  /** By the phone's own clock. */
  readonly happenedAt: string;
  /** The refused entry in whose place this one stands. */
  readonly mends?: string | null;
  readonly body: EntryBody;
  readonly state: EntryState;
  readonly attempts: number;
  readonly refusal: Refusal | null;
  /** By the server's clock. */
  readonly appliedAt: string | null;
}

/** Small enough for a weak signal, large enough for a day's work in a few calls. */
export const ENTRIES_A_CALL = 20;
const FIRST_WAIT_MS = 2_000;
const LONGEST_WAIT_MS = 5 * 60_000;

/**
 * The next entries of this person to send, in the order made. What depends on a refused entry
 * waits with it, and so does what is about a subject in `waiting`; everything else goes.
 */
export function nextBatch(
  entries: readonly OutboxEntry[],
  personId: string,
  waiting: ReadonlySet<string> = new Set(),
  most = ENTRIES_A_CALL,
): OutboxEntry[] {
  const missing = packsNotGiven(entries);
  return inOrder(entries)
    .filter((entry) => entry.personId === personId && entry.state === "kept")
    .filter((entry) => !missing.has(packNeeded(entry.body) ?? ""))
    .filter((entry) => !waiting.has(subjectOf(entry.body) ?? entry.id))
    .slice(0, most);
}

function inOrder(entries: readonly OutboxEntry[]): OutboxEntry[] {
  return [...entries].sort((a, b) => a.seq - b.seq);
}

/** Packs that only a refused swap, or one that waits behind such a swap, would have fitted. */
function packsNotGiven(entries: readonly OutboxEntry[]): Set<string> {
  const missing = new Set<string>();
  for (const { body, state } of inOrder(entries)) {
    if (body.kind !== "swap") continue;
    const waits = state === "kept" && missing.has(body.oldPackId ?? "");
    if (state === "refused" || waits) missing.add(body.newPackId);
  }
  return missing;
}

/** An entry with all that cannot stand without it, for discarding it. */
export function withDependents(entries: readonly OutboxEntry[], entry: OutboxEntry): OutboxEntry[] {
  const gone = [entry];
  const packs = new Set(entry.body.kind === "swap" ? [entry.body.newPackId] : []);
  for (const other of inOrder(entries)) {
    if (other.seq <= entry.seq || other.state === "applied") continue;
    if (!packs.has(packNeeded(other.body) ?? "")) continue;
    gone.push(other);
    if (other.body.kind === "swap") packs.add(other.body.newPackId);
  }
  return gone;
}

/** Why a kept entry does not go although there is signal; null when it does. */
export function heldBy(entries: readonly OutboxEntry[], entry: OutboxEntry): OutboxEntry | null {
  const needed = packNeeded(entry.body);
  if (entry.state !== "kept" || !needed) return null;
  return (
    entries.find(
      ({ body, state }) => state === "refused" && body.kind === "swap" && body.newPackId === needed,
    ) ?? null
  );
}

export function taken(entry: OutboxEntry): OutboxEntry {
  return { ...entry, state: "sending", attempts: entry.attempts + 1 };
}

/** After a cut or a killed page: whether it arrived is not known, so it is sent again. */
export function released(entry: OutboxEntry): OutboxEntry {
  return entry.state === "sending" ? { ...entry, state: "kept" } : entry;
}

/** What the server said. An outcome that was settled before never changes again. */
export function settled(
  entry: OutboxEntry,
  outcome: EntryOutcome,
  receivedAt: string,
  notYours: string,
): OutboxEntry {
  if (entry.state === "applied" || entry.id !== outcome.id) return entry;
  if (outcome.outcome === "applied") {
    return { ...entry, state: "applied", refusal: null, appliedAt: receivedAt };
  }
  const keeps = outcome.outcome === "later" || outcome.refusal?.code === notYours;
  return keeps
    ? { ...entry, state: "kept", refusal: outcome.refusal }
    : { ...entry, state: "refused", refusal: outcome.refusal };
}

/** Entries that the server's day holds by now need not be kept any longer. */
export function prunable(entry: OutboxEntry, dayMadeAt: string, personId: string): boolean {
  return (
    entry.state === "applied" &&
    entry.personId === personId &&
    entry.appliedAt !== null &&
    Date.parse(entry.appliedAt) < Date.parse(dayMadeAt)
  );
}

/**
 * How long to wait after so many failures in a row: doubling, with the upper half left to chance
 * so that phones coming back into signal do not call at once.
 * @param chance a number from 0 to 1
 */
export function waitMs(failures: number, chance: number): number {
  if (failures <= 0) return 0;
  const whole = Math.min(LONGEST_WAIT_MS, FIRST_WAIT_MS * 2 ** (failures - 1));
  return Math.round(whole / 2 + (whole / 2) * chance);
}

export interface OutboxCount {
  /** Kept on this phone and still to be sent, of this person. */
  readonly toSend: number;
  readonly refused: number;
  /** Kept for somebody else, who must sign in to send them. */
  readonly others: number;
}

export function countOutbox(entries: readonly OutboxEntry[], personId: string): OutboxCount {
  const open = entries.filter((entry) => entry.state === "kept" || entry.state === "sending");
  return {
    toSend: open.filter((entry) => entry.personId === personId).length,
    refused: entries.filter((e) => e.state === "refused" && e.personId === personId).length,
    others: open.filter((entry) => entry.personId !== personId).length,
  };
}

/**
 * What a phone may send. Every entry carries an id made on the phone and the time it
 * happened there; it is applied once however often it is sent.
 */
import { z } from "zod";
import { cleanText } from "./clean-text";

const millivolts = z.number().int().min(0).max(60_000);
const text = (max: number) =>
  z
    .string()
    .transform((typed) => cleanText(typed).trim())
    .pipe(z.string().max(max))
    .default("");
const note = text(1000);
/** The stop at which it was done; null for work on the way. It only says what to tick off. */
const atStop = z.uuid().nullable().default(null);

export const CANNOT_REASONS = [
  "no_access",
  "flooded",
  "not_found",
  "unsafe",
  "no_cells",
  "other",
] as const;
export type CannotReason = (typeof CANNOT_REASONS)[number];

export const LOOKS = ["sound", "leaking", "swollen", "corroded", "damaged"] as const;

const readingBody = z.object({
  kind: z.literal("reading"),
  assetId: z.uuid(),
  millivolts,
  mode: z.enum(["resting", "loaded"]),
  loadUa: z.number().int().positive().max(100_000_000).nullable().default(null),
  temperatureDc: z.number().int().min(-600).max(1000).nullable().default(null),
  /**
   * The pack the technician had before them. A reading is never put down to another one:
   * where the packs differ it waits for the swap that is still under way, or is refused.
   */
  packId: z.uuid().nullable().default(null),
  stopId: atStop,
  instrument: text(80),
  note,
});

const swapBody = z.object({
  kind: z.literal("swap"),
  assetId: z.uuid(),
  /** The pack the technician took out; null when the phone knew of none. */
  oldPackId: z.uuid().nullable(),
  newPackId: z.uuid(),
  cellTypeId: z.uuid(),
  lotId: z.uuid().nullable(),
  /** The van the cells came from. */
  fromPlaceId: z.uuid().nullable(),
  reason: z.enum(["due", "early", "found_stopped", "fault", "other"]),
  voltageOutMv: millivolts.nullable(),
  voltageInMv: millivolts.nullable(),
  look: z.enum(LOOKS).default("sound"),
  /** Old cells put into the return box; null: the whole pack, as apps before this one meant it. */
  cellsOut: z.number().int().min(0).max(288).nullable().default(null),
  /** When the device had last been heard, for one found stopped. */
  stoppedAt: z.iso.datetime().nullable().default(null),
  stopId: atStop,
  note,
});

const cannotBody = z.object({
  kind: z.literal("cannot"),
  stopId: z.uuid(),
  reason: z.enum(CANNOT_REASONS),
  returnOn: z.iso.date().nullable().default(null),
  note,
});

/** Something seen at a stop: words, and the photos that name this entry. */
const noteBody = z.object({ kind: z.literal("note"), stopId: z.uuid(), text: text(1000) });

/** What was counted in the van in the morning against what the round needs. */
const loadCheckBody = z.object({
  kind: z.literal("load-check"),
  roundId: z.uuid(),
  lines: z
    .array(
      z.object({
        cellTypeId: z.uuid(),
        needed: z.number().int().min(0).max(100_000),
        found: z.number().int().min(0).max(100_000),
        packsShort: z.number().int().min(0).max(10_000),
      }),
    )
    .max(100),
  /** Stops that what is in the van does not reach to. */
  stopsShort: z.array(z.uuid()).max(200).default([]),
  note,
});

/** The order in which the technician means to go round. */
const reorderBody = z.object({
  kind: z.literal("reorder"),
  roundId: z.uuid(),
  stopIds: z.array(z.uuid()).min(1).max(200),
});

const stopDoneBody = z.object({ kind: z.literal("stop-done"), stopId: z.uuid() });
const roundBody = z.object({
  kind: z.literal("round"),
  roundId: z.uuid(),
  act: z.enum(["started", "done"]),
});

export const entryBody = z.discriminatedUnion("kind", [
  readingBody,
  swapBody,
  cannotBody,
  stopDoneBody,
  noteBody,
  loadCheckBody,
  reorderBody,
  roundBody,
]);
export type EntryBody = z.output<typeof entryBody>;
export type EntryKind = EntryBody["kind"];

/** Bodies are checked one by one, so that a bad one does not hold up the others. */
export const entryEnvelope = z.object({
  id: z.uuid(),
  happenedAt: z.iso.datetime(),
  /** Whose entry it is: another person on the same phone never sends it as theirs. */
  personId: z.uuid(),
  /** The refused entry in whose place this one stands. */
  mends: z.uuid().nullable().default(null),
  body: z.unknown(),
});

export const MAX_ENTRIES_A_CALL = 100;

export const syncRequest = z.object({
  deviceId: z.string().trim().min(8).max(80),
  /** The phone's clock when it sent: the difference to ours is its skew. */
  sentAt: z.iso.datetime(),
  entries: z.array(entryEnvelope).min(1).max(MAX_ENTRIES_A_CALL),
});
export type SyncRequest = z.output<typeof syncRequest>;

export interface Refusal {
  readonly code: string;
  readonly message: string;
  readonly faults: readonly { readonly field: string; readonly message: string }[];
}

/** The code of an entry that another person made: it is neither applied nor recorded. */
export const NOT_YOURS = "not_yours";

/**
 * `later`: nothing was applied or recorded, and sending it again may succeed (it waits for an
 * earlier entry, or the server had trouble). `refusal` says why.
 */
export interface EntryOutcome {
  readonly id: string;
  readonly outcome: "applied" | "refused" | "later";
  readonly refusal: Refusal | null;
}

export interface SyncResponse {
  readonly receivedAt: string;
  /** When the last entry was through: a day made later holds what was applied. */
  readonly answeredAt: string;
  /** Who is signed in, so that a phone that changed hands notices. */
  readonly personId: string;
  readonly outcomes: readonly EntryOutcome[];
}

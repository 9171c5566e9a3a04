/**
 * What a phone may send. Every entry carries an id made on the phone and the time it
 * happened there; it is applied once however often it is sent.
 */
import { z } from "zod";

const millivolts = z.number().int().min(0).max(60_000);
const note = z.string().trim().max(1000).default("");

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
  loadUa: z.number().int().positive().nullable().default(null),
  temperatureDc: z.number().int().min(-600).max(1000).nullable().default(null),
  instrument: z.string().trim().max(80).default(""),
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
  /** When the device had last been heard, for one found stopped. */
  stoppedAt: z.iso.datetime().nullable().default(null),
  note,
});

const cannotBody = z.object({
  kind: z.literal("cannot"),
  stopId: z.uuid(),
  reason: z.enum(CANNOT_REASONS),
  returnOn: z.iso.date().nullable().default(null),
  note,
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

export interface EntryOutcome {
  readonly id: string;
  readonly outcome: "applied" | "refused";
  readonly refusal: Refusal | null;
}

export interface SyncResponse {
  readonly receivedAt: string;
  readonly outcomes: readonly EntryOutcome[];
}

/**
 * The photos of the outbox as pure functions. A photo follows its entry: it goes when the server has
 * the entry, waits while that is kept or refused, and goes with it when it is discarded.
 */
import type { Refusal } from "./entries";
import type { OutboxEntry } from "./outbox";
import type { PhotoPosition } from "./photos";

export interface KeptPhoto {
  readonly id: string;
  readonly entryId: string;
  readonly personId: string;
  /** By the phone's own clock. */
  readonly takenAt: string;
  /** Only where the organisation's photos keep it. */
  readonly position?: PhotoPosition | null;
  readonly attempts: number;
  /** Why the server will never have it; null while it may still go. */
  readonly refusal: Refusal | null;
}

/** A person's photos whose entries the server has: those it said so of, and those no longer kept. */
export function photosToSend(
  photos: readonly KeptPhoto[],
  entries: readonly OutboxEntry[],
  personId: string,
): KeptPhoto[] {
  const waiting = new Set(entries.filter((e) => e.state !== "applied").map((entry) => entry.id));
  return photos
    .filter((photo) => photo.personId === personId && photo.refusal === null)
    .filter((photo) => !waiting.has(photo.entryId))
    .sort((a, b) => (a.takenAt < b.takenAt ? -1 : 1));
}

/** How many of a person's photos are still to be sent. */
export function countPhotos(photos: readonly KeptPhoto[], personId: string): number {
  return photos.filter((p) => p.personId === personId && p.refusal === null).length;
}

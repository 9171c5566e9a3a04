import type { PhotoPosition } from "@/lib/sync/photos";
import { type FieldDatabase, isFull } from "./database";
import { keepEntries, type NewEntry } from "./outbox-store";

/** A photo as it was just taken, made small already. */
export interface Picture {
  readonly id: string;
  readonly takenAt: string;
  readonly position?: PhotoPosition | null;
  readonly bytes: ArrayBuffer;
}

/** Makes a picture smaller; the longer edge in pixels. */
export type Shrink = (bytes: ArrayBuffer, edgePx: number) => Promise<ArrayBuffer>;

/** What a phone without room tries before it does without the photos. */
const SMALLER_EDGES_PX = [1000, 600];

/**
 * Keeps an entry with its photos, all or none. Where the phone has no room the photos are made
 * smaller, and left out in the end: what was entered counts for more than how it looked.
 * @returns what to say about the photos; null when they are kept as they are
 * @throws what the store throws, when not even the entry can be kept
 */
export async function keepWithPhotos(
  db: FieldDatabase,
  entry: NewEntry,
  pictures: readonly Picture[],
  shrink: Shrink,
): Promise<string | null> {
  const { id: entryId, personId } = entry;
  const photos = pictures.map((picture) => ({ ...picture, entryId, personId }));
  if (await fits(db, entry, photos)) return null;
  for (const edge of SMALLER_EDGES_PX) {
    const smaller = await Promise.all(
      photos.map(async (photo) => ({ ...photo, bytes: await shrink(photo.bytes, edge) })),
    );
    if (await fits(db, entry, smaller)) {
      return "This phone is nearly full: the entry is kept, its photos smaller than usual. Free some space.";
    }
  }
  await keepEntries(db, [entry]);
  return photos.length === 1
    ? "This phone is full: the entry is kept, but without its photo. Free some space, then add it at the stop."
    : "This phone is full: the entry is kept, but without its photos. Free some space, then add them at the stop.";
}

/** @returns false when the phone has no room; without photos that is not to be helped, and thrown */
async function fits(
  db: FieldDatabase,
  entry: NewEntry,
  photos: Parameters<typeof keepEntries>[2],
): Promise<boolean> {
  try {
    await keepEntries(db, [entry], photos);
    return true;
  } catch (error) {
    if (isFull(error) && photos && photos.length > 0) return false;
    throw error;
  }
}

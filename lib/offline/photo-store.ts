import type { Refusal } from "@/lib/sync/entries";
import type { KeptPhoto } from "@/lib/sync/outbox-photos";
import type { PhotoPosition } from "@/lib/sync/photos";
import type { FieldDatabase } from "./database";

export interface NewPhoto {
  readonly id: string;
  readonly entryId: string;
  readonly personId: string;
  readonly takenAt: string;
  readonly position?: PhotoPosition | null;
  readonly bytes: ArrayBuffer;
}

export async function allPhotos(db: FieldDatabase): Promise<KeptPhoto[]> {
  return db.getAll("photos");
}

/** The picture of a photo; null when it is gone. */
export async function readPicture(db: FieldDatabase, id: string): Promise<ArrayBuffer | null> {
  return (await db.get("pictures", id)) ?? null;
}

/** Drops a photo: the server has it, or the person gave it up. */
export async function dropPhoto(db: FieldDatabase, id: string): Promise<void> {
  const tx = db.transaction(["photos", "pictures"], "readwrite");
  await tx.objectStore("photos").delete(id);
  await tx.objectStore("pictures").delete(id);
  await tx.done;
}

/** Notes an attempt, and why the server will never have the photo where it said so. */
export async function notePhoto(
  db: FieldDatabase,
  id: string,
  refusal: Refusal | null,
): Promise<void> {
  const tx = db.transaction("photos", "readwrite");
  const photo = await tx.store.get(id);
  if (photo) await tx.store.put({ ...photo, attempts: photo.attempts + 1, refusal });
  await tx.done;
}

import type { EntryBody, EntryOutcome } from "@/lib/sync/entries";
import {
  nextBatch,
  type OutboxEntry,
  prunable,
  released,
  settled,
  taken,
  withDependents,
} from "@/lib/sync/outbox";
import type { FieldDatabase } from "./database";
import type { NewPhoto } from "./photo-store";

/** The same word as NOT_YOURS in lib/sync/entries, without the schemas that come with it. */
const NOT_YOURS = "not_yours";

export interface NewEntry {
  readonly id: string;
  readonly mends?: string;
  readonly personId: string;
  readonly happenedAt: string;
  readonly body: EntryBody;
}

type Stored = Omit<OutboxEntry, "seq">;

function fresh(entry: NewEntry): Stored {
  return { ...entry, state: "kept", attempts: 0, refusal: null, appliedAt: null };
}

/**
 * Keeps entries, all or none, each under the next number. When this returns they are on disk
 * as far as the browser can say.
 */
export async function keepEntries(
  db: FieldDatabase,
  entries: readonly NewEntry[],
  photos: readonly NewPhoto[] = [],
): Promise<void> {
  const stores = ["entries", "photos", "pictures"] as const;
  const tx = db.transaction(stores, "readwrite", { durability: "strict" });
  try {
    for (const entry of entries) await tx.objectStore("entries").add(fresh(entry) as OutboxEntry);
    for (const { bytes, ...photo } of photos) {
      await tx.objectStore("photos").add({ ...photo, attempts: 0, refusal: null });
      await tx.objectStore("pictures").add(bytes, photo.id);
    }
  } catch (error) {
    // All or none: what fitted before the store was full goes too. The reason is told, not the end.
    tx.done.catch(() => undefined);
    tx.abort();
    throw error;
  }
  await tx.done;
}

export async function allEntries(db: FieldDatabase): Promise<OutboxEntry[]> {
  return db.getAll("entries");
}

/** Marks the next entries as being sent, and returns them. */
export async function takeBatch(
  db: FieldDatabase,
  personId: string,
  waiting: ReadonlySet<string>,
  most: number,
): Promise<OutboxEntry[]> {
  const tx = db.transaction("entries", "readwrite", { durability: "strict" });
  const batch = nextBatch(await tx.store.getAll(), personId, waiting, most).map(taken);
  for (const entry of batch) await tx.store.put(entry);
  await tx.done;
  return batch;
}

/** Puts what the server said beside each entry it spoke of. */
export async function settleEntries(
  db: FieldDatabase,
  outcomes: readonly EntryOutcome[],
  answeredAt: string,
): Promise<void> {
  const tx = db.transaction("entries", "readwrite", { durability: "strict" });
  for (const outcome of outcomes) {
    const entry = await tx.store.index("id").get(outcome.id);
    if (entry) await tx.store.put(settled(entry, outcome, answeredAt, NOT_YOURS));
  }
  await tx.done;
}

/** Gives back what was being sent when the signal, the tab or the phone went. */
export async function releaseEntries(db: FieldDatabase): Promise<void> {
  const tx = db.transaction("entries", "readwrite");
  for (const entry of await tx.store.getAll()) {
    if (entry.state === "sending") await tx.store.put(released(entry));
  }
  await tx.done;
}

/** Drops what the day just loaded holds already. */
export async function pruneEntries(
  db: FieldDatabase,
  dayMadeAt: string,
  personId: string,
): Promise<void> {
  const tx = db.transaction("entries", "readwrite");
  for (const entry of await tx.store.getAll()) {
    if (prunable(entry, dayMadeAt, personId)) await tx.store.delete(entry.seq);
  }
  await tx.done;
}

/** Drops an entry the person gave up, with all that cannot stand without it. */
export async function discardEntry(db: FieldDatabase, id: string): Promise<void> {
  const stores = ["entries", "photos", "pictures"] as const;
  const tx = db.transaction(stores, "readwrite", { durability: "strict" });
  const entries = await tx.objectStore("entries").getAll();
  const entry = entries.find((candidate) => candidate.id === id);
  // What is under way, or has arrived, can no longer be taken back here.
  if (entry?.state === "refused" || entry?.state === "kept") {
    for (const gone of withDependents(entries, entry)) {
      await tx.objectStore("entries").delete(gone.seq);
      for (const photo of await tx.objectStore("photos").index("entryId").getAllKeys(gone.id)) {
        await tx.objectStore("photos").delete(photo);
        await tx.objectStore("pictures").delete(photo);
      }
    }
  }
  await tx.done;
}

/**
 * Puts a mended entry in the place of a refused one: under an id of its own, since the old one
 * has its answer, and in the old one's order, so that what came after still comes after. Its
 * photos follow it.
 */
export async function mendEntry(
  db: FieldDatabase,
  refusedId: string,
  entry: NewEntry,
): Promise<void> {
  const tx = db.transaction(["entries", "photos"], "readwrite", { durability: "strict" });
  const entries = tx.objectStore("entries");
  const photos = tx.objectStore("photos");
  const old = await entries.index("id").get(refusedId);
  if (old?.state === "refused") {
    await entries.put({ ...fresh({ ...entry, mends: refusedId }), seq: old.seq });
    for (const photo of await photos.index("entryId").getAll(refusedId)) {
      await photos.put({ ...photo, entryId: entry.id });
    }
  }
  await tx.done;
}

import { type DBSchema, type IDBPDatabase, openDB } from "idb";
import { DAY_PACK_VERSION, type DayPack } from "@/lib/sync/day-pack";
import type { OutboxEntry } from "@/lib/sync/outbox";
import type { KeptPhoto } from "@/lib/sync/outbox-photos";

const NAME = "wanewright-field";
const VERSION = 2;

export interface KnownPerson {
  readonly id: string;
  readonly name: string;
}

interface FieldSchema extends DBSchema {
  /** One day pack a person. */
  days: { key: string; value: DayPack };
  /** The outbox; `seq` is given by the database, in the order made. */
  entries: { key: number; value: OutboxEntry; indexes: { id: string } };
  meta: { key: string; value: unknown };
  /** What is known of each photo that is still to be sent ... */
  photos: { key: string; value: KeptPhoto; indexes: { entryId: string } };
  /** ... and the pictures themselves, by the photo's id: read only to be sent or shown. */
  pictures: { key: string; value: ArrayBuffer };
}

export type FieldDatabase = IDBPDatabase<FieldSchema>;

/**
 * Opens the phone's store, making it on first use and bringing an older one up to date.
 * @param outdated called when a newer page wants the store: this one has let go of it
 */
export function openFieldDatabase(name = NAME, outdated?: () => void): Promise<FieldDatabase> {
  return openDB<FieldSchema>(name, VERSION, {
    upgrade(db, before) {
      if (before < 1) {
        db.createObjectStore("days");
        const entries = db.createObjectStore("entries", { keyPath: "seq", autoIncrement: true });
        entries.createIndex("id", "id", { unique: true });
        db.createObjectStore("meta");
      }
      if (before < 2) {
        const photos = db.createObjectStore("photos", { keyPath: "id" });
        photos.createIndex("entryId", "entryId");
        db.createObjectStore("pictures");
      }
    },
    blocking: (_current, _blocked, event) => {
      (event.target as IDBDatabase).close();
      outdated?.();
    },
  });
}

export async function readPerson(db: FieldDatabase): Promise<KnownPerson | null> {
  return ((await db.get("meta", "person")) as KnownPerson | undefined) ?? null;
}

/** How far this phone's clock is ahead of the server's, in ms, when they last spoke; 0: not known. */
export async function readSkew(db: FieldDatabase): Promise<number> {
  return ((await db.get("meta", "skew")) as number | undefined) ?? 0;
}

export async function keepSkew(db: FieldDatabase, skewMs: number): Promise<void> {
  await db.put("meta", skewMs, "skew");
}

/** A name of this phone's own, the same for ever, so that the office can tell phones apart. */
export async function deviceId(db: FieldDatabase, newId: () => string): Promise<string> {
  const tx = db.transaction("meta", "readwrite");
  const known = (await tx.store.get("device")) as string | undefined;
  const id = known ?? newId();
  if (!known) await tx.store.put(id, "device");
  await tx.done;
  return id;
}

/** The kept day of a person; one of an older shape counts as none. */
export async function readDay(db: FieldDatabase, personId: string): Promise<DayPack | null> {
  const day = await db.get("days", personId);
  return day?.version === DAY_PACK_VERSION ? day : null;
}

/** Keeps a day just loaded, as that of whoever is signed in now; other people's days go. */
export async function keepDay(db: FieldDatabase, day: DayPack): Promise<void> {
  const tx = db.transaction(["days", "meta"], "readwrite");
  await tx.objectStore("days").clear();
  await tx.objectStore("days").put(day, day.person.id);
  await tx.objectStore("meta").put(day.person, "person");
  await tx.done;
}

/** Forgets who was signed in and their day. Entries stay until they are sent. */
export async function forgetPerson(db: FieldDatabase): Promise<void> {
  const tx = db.transaction(["days", "meta"], "readwrite");
  await tx.objectStore("days").clear();
  await tx.objectStore("meta").delete("person");
  await tx.done;
}

export function isFull(error: unknown): boolean {
  return error instanceof Error && error.name === "QuotaExceededError";
}

/** Says plainly why the phone could not keep something. */
export function storageFault(error: unknown): string {
  if (isFull(error)) {
    return "This phone has no room left, so it was not kept. Free some space (photos, apps), then press again. What you typed still stands here.";
  }
  return "This phone could not keep it. Press again; if it happens again, write the value down and tell the office. What you typed still stands here.";
}

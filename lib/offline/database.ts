import { type DBSchema, type IDBPDatabase, openDB } from "idb";
import { DAY_PACK_VERSION, type DayPack } from "@/lib/sync/day-pack";
import type { OutboxEntry } from "@/lib/sync/outbox";

const NAME = "wanewright-field";
const VERSION = 1;

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
}

export type FieldDatabase = IDBPDatabase<FieldSchema>;

/** Opens the phone's store, making it on first use. */
export function openFieldDatabase(name = NAME): Promise<FieldDatabase> {
  return openDB<FieldSchema>(name, VERSION, {
    upgrade(db) {
      db.createObjectStore("days");
      const entries = db.createObjectStore("entries", { keyPath: "seq", autoIncrement: true });
      entries.createIndex("id", "id", { unique: true });
      db.createObjectStore("meta");
    },
    // Another tab wants a newer shape: let it, and load anew.
    blocking: (_current, _blocked, event) => (event.target as IDBDatabase).close(),
  });
}

export async function readPerson(db: FieldDatabase): Promise<KnownPerson | null> {
  return ((await db.get("meta", "person")) as KnownPerson | undefined) ?? null;
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

/** Says plainly why the phone could not keep something. */
export function storageFault(error: unknown): string {
  const name = error instanceof Error ? error.name : "";
  if (name === "QuotaExceededError") {
    return "This phone has no room left, so it was not kept. Free some space (photos, apps), then press again. What you typed still stands here.";
  }
  return "This phone could not keep it. Press again; if it happens again, write the value down and tell the office. What you typed still stands here.";
}

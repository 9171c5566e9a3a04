/**
 * The phone's store against a server that fails in every way the issue names: no signal, lost
 * answers, a session that ran out, another person, a killed page. The store is IndexedDB's own
 * behaviour as fake-indexeddb implements it (W3C Indexed Database API 3.0); the server is a small
 * model that applies each id once.
 */
import "fake-indexeddb/auto";
import { randomUUID } from "node:crypto";
import { openDB } from "idb";
import { beforeEach, describe, expect, it, vi } from "vitest";
import { openFieldDatabase } from "@/lib/offline/database";
import { FieldStore } from "@/lib/offline/field-store";
import type { Answer, Transport } from "@/lib/offline/transport";
import type { SyncResponse } from "@/lib/sync/entries";
import type { OutboxEntry } from "@/lib/sync/outbox";
import type { KeptPhoto } from "@/lib/sync/outbox-photos";
import { BODY, dayPack, outboxEntry } from "../sync/day-fixture";

type Fate = "good" | "cut" | "lost" | "signed-out" | "too-large" | "poison";

class Server {
  fate: Fate = "good";
  signedIn = "me";
  refuse = new Set<string>();
  readonly applied: string[] = [];
  /** Whether the swap that fits the pack "new" has been applied. */
  private fitted = false;
  clock = Date.parse("2026-12-01T12:00:00Z");

  transport(): Transport {
    return {
      loadDay: async () => this.loadDay(),
      send: async (_, e) => this.send(e),
      sendPhoto: async (photo, bytes) => this.sendPhoto(photo, bytes),
    };
  }

  private loadDay(): Answer<ReturnType<typeof dayPack>> {
    if (this.fate === "signed-out") return { kind: "signed-out" };
    if (this.fate === "cut") return { kind: "cut" };
    const madeAt = new Date((this.clock += 1000)).toISOString();
    return {
      kind: "good",
      value: { ...dayPack(), madeAt, person: { id: this.signedIn, name: "" } },
    };
  }

  readonly photos = new Map<string, { entryId: string; bytes: number; times: number }>();
  photoFate: Fate = "good";

  /** Keeps a photo whose entry it has, once. */
  private sendPhoto(photo: KeptPhoto, bytes: ArrayBuffer): Answer<unknown> {
    if (this.fate === "cut" || this.photoFate === "cut") return { kind: "cut" };
    if (this.photoFate === "poison") return { kind: "refused", message: "no photo" };
    if (photo.personId !== this.signedIn) return { kind: "cut" };
    if (!this.applied.includes(photo.entryId)) return { kind: "cut" };
    const times = (this.photos.get(photo.id)?.times ?? 0) + 1;
    this.photos.set(photo.id, { entryId: photo.entryId, bytes: bytes.byteLength, times });
    return this.photoFate === "lost" ? { kind: "cut" } : { kind: "good", value: {} };
  }

  private send(entries: readonly OutboxEntry[]): Answer<SyncResponse> {
    if (this.fate === "cut") return { kind: "cut" };
    if (this.fate === "signed-out") return { kind: "signed-out" };
    if (this.fate === "too-large" && entries.length > 1) return { kind: "refused", message: "big" };
    if (this.fate === "poison" && entries.some((e) => e.body.kind === "cannot")) {
      return { kind: "refused", message: "unreadable" };
    }
    const outcomes = entries.map(({ id, personId, body }) => {
      const refusal = { code: "conflict", message: "no", faults: [] };
      if (personId !== this.signedIn) {
        return { id, outcome: "refused" as const, refusal: { ...refusal, code: "not_yours" } };
      }
      if (this.refuse.has(body.kind)) return { id, outcome: "refused" as const, refusal };
      const needsSwap = body.kind === "reading" && body.packId === "new" && !this.fitted;
      if (needsSwap) return { id, outcome: "later" as const, refusal };
      if (body.kind === "swap") this.fitted = true;
      if (!this.applied.includes(id)) this.applied.push(id);
      return { id, outcome: "applied" as const, refusal: null };
    });
    if (this.fate === "lost") return { kind: "cut" };
    const receivedAt = new Date((this.clock += 1000)).toISOString();
    const personId = this.signedIn;
    return { kind: "good", value: { receivedAt, answeredAt: receivedAt, personId, outcomes } };
  }
}

let server: Server;
let name: string;
let retries: (() => void)[];

beforeEach(() => {
  vi.stubGlobal("navigator", { onLine: true });
  server = new Server();
  name = `field-${randomUUID()}`;
  retries = [];
});

/** A model of the camera's work: a picture takes as many bytes as its edge has pixels. */
const shrink = async (_: ArrayBuffer, edgePx: number) => new ArrayBuffer(edgePx);

const picture = (bytes = 1600) => ({
  ...{ id: randomUUID(), takenAt: "2026-12-01T10:00:00Z", bytes: new ArrayBuffer(bytes) },
});

/** A phone that takes pictures up to so many bytes and says what browsers say beyond. */
function fullPhone(room: number): void {
  const add = IDBObjectStore.prototype.add;
  vi.spyOn(IDBObjectStore.prototype, "add").mockImplementation(function (
    this: IDBObjectStore,
    ...given: Parameters<typeof add>
  ) {
    const [value] = given;
    if (value instanceof ArrayBuffer && value.byteLength > room) {
      throw new DOMException("full", "QuotaExceededError");
    }
    return add.apply(this, given);
  });
}

/** A page opened on this phone; the store beneath outlives it. */
async function openPage(): Promise<FieldStore> {
  const store = new FieldStore({
    open: (outdated) => openFieldDatabase(name, outdated),
    transport: server.transport(),
    now: () => new Date("2026-12-01T10:00:00Z"),
    newId: randomUUID,
    chance: () => 0,
    later: (work) => void retries.push(work),
    announce: () => undefined,
    sendInBackground: () => undefined,
    shrink,
  });
  await store.start();
  return store;
}

const settledDown = (store: FieldStore) =>
  vi.waitFor(() => expect(store.getSnapshot().busy).toBe(false));

describe("without signal", () => {
  it("keeps everything over a killed page and sends it once, in order, when signal returns", async () => {
    let store = await openPage();
    server.fate = "cut";
    expect(await store.keep(BODY.reading)).toBeNull();
    expect(await store.keep(BODY.swap)).toBeNull();
    await settledDown(store);
    store = await openPage();
    expect(store.getSnapshot()).toMatchObject({ signal: false, count: { toSend: 2 } });
    expect(store.getSnapshot().day?.rounds[0]?.stops[0]?.state).toBe("done");
    const made = store.getSnapshot().entries.map((entry) => entry.id);
    server.fate = "good";
    await store.exchange();
    expect(server.applied).toEqual(made);
    expect(store.getSnapshot()).toMatchObject({ signal: true, entries: [] });
  });

  it("sends again what was applied when only the answer was lost", async () => {
    const store = await openPage();
    server.fate = "lost";
    await store.keep(BODY.reading);
    await settledDown(store);
    expect(store.getSnapshot().count.toSend).toBe(1);
    expect(retries.length).toBeGreaterThan(0);
    server.fate = "good";
    await store.exchange();
    expect(server.applied).toHaveLength(1);
    expect(store.getSnapshot().count.toSend).toBe(0);
  });
});

describe("people", () => {
  it("a session that ran out keeps everything and says so", async () => {
    const store = await openPage();
    server.fate = "signed-out";
    await store.keep(BODY.reading);
    await settledDown(store);
    expect(store.getSnapshot()).toMatchObject({ signedOut: true, count: { toSend: 1 } });
    server.fate = "good";
    await store.exchange();
    expect(store.getSnapshot()).toMatchObject({ signedOut: false, count: { toSend: 0 } });
  });

  it("another person never sends the first one's, and the first one does on return", async () => {
    const store = await openPage();
    server.fate = "cut";
    await store.keep(BODY.reading);
    await settledDown(store);
    server.fate = "good";
    server.signedIn = "other";
    await store.exchange();
    expect(server.applied).toEqual([]);
    expect(store.getSnapshot()).toMatchObject({
      person: { id: "other" },
      count: { toSend: 0, refused: 0, others: 1 },
    });
    server.signedIn = "me";
    await store.exchange();
    expect(server.applied).toHaveLength(1);
  });

  it("signing out forgets the day and keeps the entries", async () => {
    const store = await openPage();
    server.fate = "cut";
    await store.keep(BODY.reading);
    await settledDown(store);
    await store.forget();
    expect(store.getSnapshot()).toMatchObject({ person: null, day: null, count: { others: 1 } });
    expect(await store.keep(BODY.reading)).toContain("Sign in");
  });
});

describe("refusals", () => {
  it("hold up only what rests on them; mended, they go under a new id in the old place", async () => {
    const store = await openPage();
    server.refuse.add("swap");
    server.fate = "cut";
    await store.keep(BODY.swap);
    await store.keep({ ...BODY.reading, packId: "new" });
    await store.keep(BODY.done);
    await settledDown(store);
    server.fate = "good";
    await store.exchange();
    expect(store.getSnapshot().entries.map((e) => e.state)).toEqual(["refused", "kept"]);
    const [refused] = store.getSnapshot().entries;
    if (!refused) throw new Error("nothing was refused");
    server.refuse.clear();
    expect(await store.mend(refused, BODY.swap)).toBeNull();
    await settledDown(store);
    await store.exchange();
    expect(server.applied).toHaveLength(3);
    expect(server.applied).not.toContain(refused.id);
    expect(store.getSnapshot().entries).toEqual([]);
  });

  it("discarded, take with them what cannot stand without them", async () => {
    const store = await openPage();
    server.refuse.add("swap");
    server.fate = "cut";
    await store.keep(BODY.swap);
    await store.keep({ ...BODY.reading, packId: "new" });
    await settledDown(store);
    server.fate = "good";
    await store.exchange();
    await store.discard(store.getSnapshot().entries[0]?.id ?? "");
    await settledDown(store);
    expect(store.getSnapshot().entries).toEqual([]);
    expect(server.applied).toEqual([]);
  });

  it("a request that is too large is halved; one that cannot be read is found and refused", async () => {
    const store = await openPage();
    server.fate = "cut";
    for (const body of [BODY.reading, BODY.cannot, BODY.done, BODY.finish]) await store.keep(body);
    await settledDown(store);
    server.fate = "poison";
    await store.exchange();
    expect(server.applied).toHaveLength(3);
    expect(store.getSnapshot().entries).toMatchObject([
      { state: "refused", body: { kind: "cannot" }, refusal: { message: "unreadable" } },
    ]);
    server.fate = "cut";
    await store.keep(BODY.reading, BODY.done);
    await settledDown(store);
    server.fate = "too-large";
    await store.exchange();
    expect(server.applied).toHaveLength(5);
  });
});

describe("photos", () => {
  it("follow their entry once it is through, and leave the phone when the server has them", async () => {
    let store = await openPage();
    server.fate = "cut";
    expect(await store.keepSeen(BODY.cannot, [picture(), picture(900)])).toBeNull();
    await settledDown(store);
    expect(store.getSnapshot()).toMatchObject({ count: { toSend: 1, photos: 2 } });
    store = await openPage();
    server.fate = "good";
    await store.exchange();
    const sent = [...server.photos.values()];
    expect(sent.map((photo) => photo.bytes).sort()).toEqual([1600, 900].sort());
    expect(new Set(sent.map((photo) => photo.entryId))).toEqual(new Set(server.applied));
    expect(store.getSnapshot()).toMatchObject({ photos: [], count: { photos: 0 } });
  });

  it("go again under the same id when the answer was lost, after their entry has left", async () => {
    const store = await openPage();
    server.photoFate = "lost";
    await store.keepSeen(BODY.reading, [picture()]);
    await settledDown(store);
    expect(store.getSnapshot()).toMatchObject({ entries: [], count: { photos: 1 } });
    expect(retries.length).toBeGreaterThan(0);
    server.photoFate = "good";
    await store.exchange();
    expect([...server.photos.values()]).toMatchObject([{ times: 2 }]);
    expect(store.getSnapshot().photos).toEqual([]);
  });

  it("wait with a refused entry and follow the one that mends it", async () => {
    const store = await openPage();
    server.refuse.add("cannot");
    await store.keepSeen(BODY.cannot, [picture()]);
    await settledDown(store);
    expect(server.photos.size).toBe(0);
    const [refused] = store.getSnapshot().entries;
    if (!refused) throw new Error("nothing was refused");
    server.refuse.clear();
    await store.mend(refused, BODY.cannot);
    await settledDown(store);
    await store.exchange();
    expect([...server.photos.values()]).toMatchObject([{ entryId: server.applied[0] }]);
    expect(server.applied).not.toContain(refused.id);
  });

  it("go with a discarded entry", async () => {
    const store = await openPage();
    server.refuse.add("cannot");
    await store.keepSeen(BODY.cannot, [picture()]);
    await settledDown(store);
    await store.discard(store.getSnapshot().entries[0]?.id ?? "");
    expect(store.getSnapshot().photos).toEqual([]);
  });

  it("that the server will never have stay until the person gives them up, and block nothing", async () => {
    const store = await openPage();
    server.photoFate = "poison";
    await store.keepSeen(BODY.cannot, [picture()]);
    await settledDown(store);
    expect(store.getSnapshot().photos).toMatchObject([{ refusal: { message: "no photo" } }]);
    server.photoFate = "good";
    await store.keepSeen(BODY.reading, [picture()]);
    await settledDown(store);
    expect(server.photos.size).toBe(1);
    await store.discardPhoto(store.getSnapshot().photos[0]?.id ?? "");
    expect(store.getSnapshot().photos).toEqual([]);
  });

  it("of one person never go as another's", async () => {
    const store = await openPage();
    server.fate = "cut";
    await store.keepSeen(BODY.reading, [picture()]);
    await settledDown(store);
    server.fate = "good";
    server.signedIn = "other";
    await store.exchange();
    expect(server.photos.size).toBe(0);
    expect(store.getSnapshot().count).toMatchObject({ photos: 0, others: 1 });
    server.signedIn = "me";
    await store.exchange();
    expect(server.photos.size).toBe(1);
  });
});

describe("a full phone", () => {
  it("keeps photos smaller, and says so", async () => {
    const store = await openPage();
    server.fate = "cut";
    fullPhone(700);
    expect(await store.keepSeen(BODY.cannot, [picture(), picture()])).toBeNull();
    await settledDown(store);
    vi.restoreAllMocks();
    expect(store.getSnapshot().told).toContain("smaller");
    server.fate = "good";
    await store.exchange();
    expect([...server.photos.values()].map((photo) => photo.bytes)).toEqual([600, 600]);
    expect(server.applied).toHaveLength(1);
  });

  it("keeps the entry without photos rather than nothing, once, and says so", async () => {
    const store = await openPage();
    server.fate = "cut";
    fullPhone(10);
    expect(await store.keepSeen(BODY.cannot, [picture()])).toBeNull();
    await settledDown(store);
    vi.restoreAllMocks();
    expect(store.getSnapshot()).toMatchObject({ photos: [], count: { toSend: 1 } });
    expect(store.getSnapshot().told).toContain("without its photo");
    await store.keep(BODY.done);
    expect(store.getSnapshot().told).toBeNull();
  });
});

describe("an older app on the phone", () => {
  it("leaves its entries to the newer one, and is told that it is old", async () => {
    const old = await openDB(name, 1, {
      upgrade(db) {
        db.createObjectStore("days");
        const entries = db.createObjectStore("entries", { keyPath: "seq", autoIncrement: true });
        entries.createIndex("id", "id", { unique: true });
        db.createObjectStore("meta");
      },
      blocking: (_c, _b, event) => (event.target as IDBDatabase).close(),
    });
    await old.put("meta", { id: "me", name: "Jo" }, "person");
    await old.put("entries", { ...outboxEntry(1, BODY.cannot), id: "from-before" });
    const store = await openPage();
    expect(server.applied).toEqual(["from-before"]);
    // And the other way round: a page of today hears when a later one takes the store over.
    const later = await openDB(name, 99);
    await vi.waitFor(() => expect(store.getSnapshot().outdated).toBe(true));
    later.close();
  });
});

it("a phone's clock that is a day off is measured when the day is loaded", async () => {
  const store = await openPage();
  // The page's clock stands at ten, the server's just after noon.
  expect(Math.round(store.getSnapshot().skewMs / 60_000)).toBe(-120);
});

/**
 * The phone's store against a server that fails in every way the issue names: no signal, lost
 * answers, a session that ran out, another person, a killed page. The store is IndexedDB's own
 * behaviour as fake-indexeddb implements it (W3C Indexed Database API 3.0); the server is a small
 * model that applies each id once.
 */
import "fake-indexeddb/auto";
import { randomUUID } from "node:crypto";
import { beforeEach, describe, expect, it, vi } from "vitest";
import { openFieldDatabase } from "@/lib/offline/database";
import { FieldStore } from "@/lib/offline/field-store";
import type { Answer, Transport } from "@/lib/offline/transport";
import type { SyncResponse } from "@/lib/sync/entries";
import type { OutboxEntry } from "@/lib/sync/outbox";
import { BODY, dayPack } from "../sync/day-fixture";

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
    return { loadDay: async () => this.loadDay(), send: async (_, e) => this.send(e) };
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

/** A page opened on this phone; the store beneath outlives it. */
async function openPage(): Promise<FieldStore> {
  const store = new FieldStore({
    open: () => openFieldDatabase(name),
    transport: server.transport(),
    now: () => new Date("2026-12-01T10:00:00Z"),
    newId: randomUUID,
    chance: () => 0,
    later: (work) => void retries.push(work),
    announce: () => undefined,
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

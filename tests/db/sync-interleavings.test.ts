/**
 * Two phones and the office at the same assets, the phones' requests cut off, repeated and interleaved
 * at will, against a model that only counts: whatever happened on the way, the tables hold each
 * entry that either phone counts as applied exactly once, with its photos, and nothing else. The
 * truths are arithmetic on what was entered (a swap is one pack more, two cells fewer, one first
 * voltage; the last order of a round stands), not the code's own words.
 */
import { randomUUID } from "node:crypto";
import fc from "fast-check";
import { beforeAll, expect, it } from "vitest";
import { AppError } from "@/lib/errors";
import type { EntryBody } from "@/lib/sync/entries";
import { type KeptPhoto, photosToSend } from "@/lib/sync/outbox-photos";
import { nextBatch, type OutboxEntry, released, settled, taken } from "@/lib/sync/outbox";
import { keepPhoto } from "@/lib/usecases/keep-photo";
import { recordSwap } from "@/lib/usecases/record-swap";
import { syncEntries } from "@/lib/usecases/sync-entries";
import type { PersonActor } from "@/lib/usecases/use-case";
import { testDatabase } from "../support/database";
import { testDeps } from "../support/deps";
import { type PhoneRound, phoneRound } from "../support/phone-round";
import { type SmallRegister, smallRegister } from "../support/small-register";

const { db } = await testDatabase();
const stored = new Map<string, Uint8Array>();
const deps = {
  ...testDeps(db, new Date("2026-12-01T18:00:00Z")),
  storage: {
    put: async (key: string, bytes: Uint8Array) => void stored.set(key, bytes),
    get: async () => null,
  },
  // What becomes of a picture has tests of its own; here only how often it is kept counts.
  cleanImage: async (bytes: Uint8Array) => ({
    ok: true as const,
    image: { bytes, width: 4, height: 3 },
  }),
};
/** What was played in all runs together: a property of nothing would hold. */
const played = { swaps: 0, extra: 0, office: 0, photos: 0, orders: 0 };
let register: SmallRegister;
let office: PersonActor;

beforeAll(async () => {
  register = await smallRegister(db);
  office = await register.actor(["dispatcher"]);
});

interface Phone {
  readonly actor: PersonActor;
  entries: OutboxEntry[];
  photos: KeptPhoto[];
  /** The pack this phone believes to be in each asset. */
  readonly believes: Map<string, string>;
}

/** What is done on a phone, on the way to the server, or in the office. */
const step = fc.record({
  phone: fc.constantFrom(0, 1),
  act: fc.constantFrom(
    ...(["swap", "reading", "photo", "reorder", "office swap", "kill"] as const),
    ...(["send", "send cut", "send twice", "photos", "photos cut", "photos twice"] as const),
  ),
  /** The first two are planned, the third is extra work beside them. */
  asset: fc.constantFrom(0, 1, 2),
  most: fc.integer({ min: 1, max: 4 }),
  order: fc.shuffledSubarray([0, 1, 2], { minLength: 3, maxLength: 3 }),
});
type Step = typeof step extends fc.Arbitrary<infer T> ? T : never;

interface World {
  readonly base: PhoneRound;
  /** Stops of the first phone's round, as planned. */
  readonly stops: readonly string[];
  readonly phones: readonly Phone[];
  /** Packs the office put in. */
  readonly officePacks: string[];
}

function bodyOf(phone: Phone, { base, stops }: World, { act, asset, order }: Step): EntryBody {
  const assetId = base.assets[asset] ?? "";
  const known = phone.believes.get(assetId) ?? null;
  const shared = { assetId, stopId: null, note: "" };
  if (act === "reorder") {
    const stopIds = order.map((n) => stops[n] ?? "");
    return { kind: "reorder", roundId: base.roundId, stopIds };
  }
  if (act === "reading") {
    return {
      ...{ ...shared, kind: "reading", millivolts: 2700, mode: "resting", packId: known },
      ...{ loadUa: null, temperatureDc: null, instrument: "" },
    };
  }
  const newPackId = randomUUID();
  phone.believes.set(assetId, newPackId);
  return {
    ...{ ...shared, kind: "swap", oldPackId: known, newPackId, reason: "due", look: "sound" },
    ...{ cellTypeId: register.lr20, lotId: register.lotId, fromPlaceId: base.vanPlaceId },
    ...{ voltageOutMv: known ? 2300 : null, voltageInMv: 3100, stoppedAt: null, cellsOut: null },
  };
}

function enter(phone: Phone, world: World, one: Step, minute: number): void {
  const happenedAt = new Date(Date.parse("2026-12-01T08:00:00Z") + minute * 60_000).toISOString();
  const { personId } = phone.actor;
  phone.entries.push({
    ...{ seq: minute, id: randomUUID(), personId, happenedAt, body: bodyOf(phone, world, one) },
    ...{ state: "kept", attempts: 0, refusal: null, appliedAt: null },
  });
}

/** A photo for what was swapped or measured last. */
function photograph(phone: Phone): void {
  const entry = phone.entries.findLast(({ body }) => body.kind !== "reorder");
  if (!entry) return;
  const { id: entryId, personId, happenedAt: takenAt } = entry;
  phone.photos.push({
    ...{ id: randomUUID(), entryId, personId, takenAt },
    attempts: 0,
    refusal: null,
  });
}

/** Sends photos whose entries the server has; heard or not, repeated or not. */
async function sendPhotos(phone: Phone, { act }: Step): Promise<void> {
  for (const photo of photosToSend(phone.photos, phone.entries, phone.actor.personId)) {
    const { id, entryId, personId, takenAt } = photo;
    const request = { ...{ id, entryId, personId, takenAt }, sentAt: deps.now().toISOString() };
    const once = () => keepPhoto(deps, phone.actor, { ...request, bytes: new Uint8Array([7]) });
    await (act === "photos twice" ? Promise.all([once(), once()]) : once());
    if (act !== "photos cut") phone.photos = phone.photos.filter((other) => other !== photo);
  }
}

/** The office writes a swap that nobody's phone knows of yet. */
async function swapInOffice({ base, officePacks }: World, { asset }: Step): Promise<void> {
  const assetId = base.assets[asset] ?? "";
  const installed = await db
    .selectFrom("pack")
    .select("id")
    .where("assetId", "=", assetId)
    .where("removedAt", "is", null)
    .executeTakeFirst();
  if (!installed) return;
  const packId = randomUUID();
  const took = { lotId: register.lotId, fromPlaceId: base.vanPlaceId };
  try {
    await recordSwap(deps, office, {
      ...{ assetId, at: "2026-12-01T17:30", oldPackId: installed.id, reason: "due" },
      ...{ packId, cellTypeId: register.lr20, ...took },
    } as never);
    officePacks.push(packId);
  } catch (error) {
    // A phone was quicker, or what it did is later than what the office says: told, not applied.
    if (!(error instanceof AppError) || !["conflict", "invalid"].includes(error.code)) throw error;
  }
}

async function call(phone: Phone, batch: OutboxEntry[]) {
  const { response } = await syncEntries(deps, phone.actor, {
    ...{ deviceId: "phone-0001", sentAt: deps.now().toISOString() },
    entries: batch.map(({ id, happenedAt, personId, body }) => ({
      ...{ id, happenedAt, personId, body },
    })),
  });
  return response;
}

async function transmit(phone: Phone, { act, most }: Step): Promise<void> {
  const batch = nextBatch(phone.entries, phone.actor.personId, new Set(), most).map(taken);
  if (batch.length === 0) return;
  const sending = new Map(batch.map((entry) => [entry.id, entry]));
  phone.entries = phone.entries.map((entry) => sending.get(entry.id) ?? entry);
  const answers =
    act === "send twice"
      ? await Promise.all([call(phone, batch), call(phone, batch)])
      : [await call(phone, batch)];
  const heard = act === "send cut" ? [] : answers;
  for (const { outcomes, answeredAt } of heard) {
    for (const outcome of outcomes) {
      phone.entries = phone.entries.map((entry) =>
        settled(entry, outcome, answeredAt, "not_yours"),
      );
    }
  }
  phone.entries = phone.entries.map(released);
}

async function addStop(roundId: string, position: number): Promise<string> {
  const [id, siteId] = [randomUUID(), randomUUID()];
  const site = { id: siteId, code: siteId, name: "Weir", latitude: 52.5, longitude: 0.2 };
  await db.insertInto("site").values(site).execute();
  const arrivesAt = new Date(`2026-12-01T1${position}:00:00Z`);
  const departsAt = new Date(arrivesAt.getTime() + 600_000);
  await db
    .insertInto("stop")
    .values({ id, roundId, siteId, position, arrivesAt, departsAt })
    .execute();
  return id;
}

async function newWorld(): Promise<World> {
  await db.deleteFrom("plan").execute();
  const base = await phoneRound(db, register);
  const other = await register.actor(["technician"]);
  const phones = [base.technician, other].map((actor): Phone => {
    const believes = new Map(base.packs.map((pack, n) => [base.assets[n] ?? "", pack]));
    return { actor, entries: [], photos: [], believes };
  });
  const stops = [base.stopId, await addStop(base.roundId, 2), await addStop(base.roundId, 3)];
  stored.clear();
  return { base, stops, phones, officePacks: [] };
}

async function take(world: World, one: Step, minute: number): Promise<void> {
  const phone = world.phones[one.phone];
  if (!phone) return;
  if (one.act === "swap" || one.act === "reading" || one.act === "reorder") {
    return enter(phone, world, one, minute);
  }
  if (one.act === "photo") return photograph(phone);
  if (one.act === "office swap") return swapInOffice(world, one);
  if (one.act === "kill") return void (phone.entries = phone.entries.map(released));
  return one.act.startsWith("photos") ? sendPhotos(phone, one) : transmit(phone, one);
}

async function play(steps: readonly Step[]): Promise<void> {
  const world = await newWorld();
  for (const [minute, one] of steps.entries()) await take(world, one, minute);
  const whole: Step = { phone: 0, act: "send", asset: 0, most: 20, order: [] };
  const photos: Step = { ...whole, act: "photos" };
  for (let n = 0; n < 4; n++) {
    await Promise.all(world.phones.map((phone) => transmit(phone, whole)));
  }
  const taken = world.phones.flatMap((phone) => phone.photos);
  await Promise.all(world.phones.map((phone) => sendPhotos(phone, photos)));
  const entries = world.phones.flatMap((phone) => phone.entries);
  await check(world, entries);
  await checkPhotos(world, entries, taken);
  await checkOrder(world);
  const applied = entries.filter((entry) => entry.state === "applied");
  const swaps = applied.flatMap(({ body }) => (body.kind === "swap" ? [body] : []));
  played.swaps += swaps.length;
  played.extra += swaps.filter((swap) => swap.assetId === world.base.assets[2]).length;
  played.office += world.officePacks.length;
  played.photos += stored.size;
  played.orders += applied.filter(({ body }) => body.kind === "reorder").length;
}

/** A photo is there once when its entry is, and waits on the phone when it is not. */
async function checkPhotos(
  { phones }: World,
  entries: readonly OutboxEntry[],
  lastTaken: readonly KeptPhoto[],
): Promise<void> {
  const ids = entries.map((entry) => entry.id);
  const applied = new Set(entries.filter((e) => e.state === "applied").map((entry) => entry.id));
  const rows = await db
    .selectFrom("photo")
    .select(["id", "entryId", "objectKey"])
    .where("entryId", "in", [...ids, randomUUID()])
    .execute();
  expect(rows.every((row) => applied.has(row.entryId))).toBe(true);
  expect(rows.map((row) => row.objectKey).sort()).toEqual([...stored.keys()].sort());
  const there = new Set(rows.map((row) => row.id));
  const waiting = phones.flatMap((phone) => phone.photos);
  expect(waiting.filter((photo) => there.has(photo.id) || applied.has(photo.entryId))).toEqual([]);
  const lost = lastTaken.filter((photo) => !there.has(photo.id) && !waiting.includes(photo));
  expect(lost).toEqual([]);
}

/** The order is the last that its technician gave and the server has; the other phone gives none. */
async function checkOrder({ base, stops, phones }: World): Promise<void> {
  const rows = await db
    .selectFrom("stop")
    .select("id")
    .where("roundId", "=", base.roundId)
    .orderBy("position")
    .execute();
  const [own, other] = phones;
  const orders = (phone: Phone | undefined) =>
    (phone?.entries ?? [])
      .filter((entry) => entry.state === "applied")
      .flatMap(({ body }) => (body.kind === "reorder" ? [body.stopIds] : []));
  expect(rows.map((row) => row.id)).toEqual(orders(own).at(-1) ?? stops);
  expect(orders(other)).toEqual([]);
}

async function check({ base, officePacks }: World, entries: readonly OutboxEntry[]): Promise<void> {
  const assets = [...base.assets];
  const packs = await db.selectFrom("pack").selectAll().where("assetId", "in", assets).execute();
  const packIds = packs.map((pack) => pack.id);
  const readings = await db
    .selectFrom("reading")
    .select(["id", "packId"])
    .where("packId", "in", packIds)
    .execute();
  const applied = entries.filter((entry) => entry.state === "applied");
  const swaps = applied.flatMap(({ body }) => (body.kind === "swap" ? [body] : []));
  const voltages = applied.filter(({ body }) => body.kind === "reading");
  expect(packIds.sort()).toEqual(
    [...base.packs, ...officePacks, ...swaps.map((s) => s.newPackId)].sort(),
  );
  // A phone that knew of no pack takes out whatever it finds; a pack that is named goes once.
  const replaced = swaps.flatMap((s) => s.oldPackId ?? []);
  expect(new Set(replaced).size).toBe(replaced.length);
  expect(readings).toHaveLength(voltages.length + swaps.length);
  for (const { id, body } of voltages) {
    const row = readings.find((reading) => reading.id === id);
    const named = body.kind === "reading" ? body.packId : "";
    if (named) expect(row?.packId).toBe(named);
    else expect(row).toBeDefined();
  }
  expect(await base.cellsInVan()).toBe(20 - 2 * (swaps.length + officePacks.length));
  // What is neither applied nor refused rests on a swap that was refused.
  const refused = entries.filter((entry) => entry.state === "refused");
  const open = entries.filter((entry) => entry.state === "kept");
  if (open.length > 0) expect(refused.length).toBeGreaterThan(0);
  expect(entries.some((entry) => entry.state === "sending")).toBe(false);
  const recorded = await db
    .selectFrom("syncEntry")
    .select(["id", "outcome"])
    .where("id", "in", [...entries.map((entry) => entry.id), randomUUID()])
    .execute();
  const said = [...applied, ...refused].map(({ id, state }) => `${id} ${state}`).sort();
  expect(recorded.map(({ id, outcome }) => `${id} ${outcome}`).sort()).toEqual(said);
}

it("two phones and the office, cut off and repeated at will, leave what was entered exactly once", async () => {
  await fc.assert(fc.asyncProperty(fc.array(step, { minLength: 5, maxLength: 30 }), play), {
    numRuns: 40,
    endOnFailure: true,
  });
  for (const [what, times] of Object.entries(played)) expect(times, what).toBeGreaterThan(0);
}, 120_000);

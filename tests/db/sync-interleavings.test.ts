/**
 * Two phones at the same assets, their requests cut off, repeated and interleaved at will, against
 * a model that only counts: whatever happened on the way, the tables hold each entry that either
 * phone counts as applied exactly once, and nothing else. The truths are arithmetic on what was
 * entered (a swap is one pack more, two cells fewer, one first voltage), not the code's own words.
 */
import { randomUUID } from "node:crypto";
import fc from "fast-check";
import { beforeAll, expect, it } from "vitest";
import type { EntryBody } from "@/lib/sync/entries";
import { nextBatch, type OutboxEntry, released, settled, taken } from "@/lib/sync/outbox";
import { syncEntries } from "@/lib/usecases/sync-entries";
import type { PersonActor } from "@/lib/usecases/use-case";
import { testDatabase } from "../support/database";
import { testDeps } from "../support/deps";
import { type PhoneRound, phoneRound } from "../support/phone-round";
import { type SmallRegister, smallRegister } from "../support/small-register";

const { db } = await testDatabase();
const deps = testDeps(db, new Date("2026-12-01T18:00:00Z"));
let register: SmallRegister;

beforeAll(async () => {
  register = await smallRegister(db);
});

interface Phone {
  readonly actor: PersonActor;
  entries: OutboxEntry[];
  /** The pack this phone believes to be in each asset. */
  readonly believes: Map<string, string>;
}

/** What is done on a phone, or on the way to the server. */
const step = fc.record({
  phone: fc.constantFrom(0, 1),
  act: fc.constantFrom("swap", "reading", "send", "send cut", "send twice", "kill"),
  asset: fc.constantFrom(0, 1),
  most: fc.integer({ min: 1, max: 4 }),
});
type Step = typeof step extends fc.Arbitrary<infer T> ? T : never;

function enter(phone: Phone, base: PhoneRound, { act, asset }: Step, minute: number): void {
  const assetId = base.assets[asset] ?? "";
  const known = phone.believes.get(assetId) ?? "";
  const shared = { assetId, stopId: null, note: "" };
  const newPackId = randomUUID();
  const body: EntryBody =
    act === "swap"
      ? {
          ...{ ...shared, kind: "swap", oldPackId: known, newPackId, reason: "due" },
          ...{ cellTypeId: register.lr20, lotId: register.lotId, fromPlaceId: base.vanPlaceId },
          ...{
            voltageOutMv: 2300,
            voltageInMv: 3100,
            look: "sound",
            stoppedAt: null,
            cellsOut: null,
          },
        }
      : {
          ...{ ...shared, kind: "reading", millivolts: 2700, mode: "resting", packId: known },
          ...{ loadUa: null, temperatureDc: null, instrument: "" },
        };
  if (act === "swap") phone.believes.set(assetId, newPackId);
  const happenedAt = new Date(Date.parse("2026-12-01T08:00:00Z") + minute * 60_000).toISOString();
  const { personId } = phone.actor;
  phone.entries.push({
    ...{ seq: minute, id: randomUUID(), personId, happenedAt, body },
    ...{ state: "kept", attempts: 0, refusal: null, appliedAt: null },
  });
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

async function play(steps: readonly Step[]): Promise<void> {
  await db.deleteFrom("plan").execute();
  const base = await phoneRound(db, register);
  const other = await register.actor(["technician"]);
  const phones = [base.technician, other].map((actor): Phone => {
    const believes = new Map(base.packs.map((pack, n) => [base.assets[n] ?? "", pack]));
    return { actor, entries: [], believes };
  });
  for (const [minute, one] of steps.entries()) {
    const phone = phones[one.phone];
    if (!phone) continue;
    if (one.act === "swap" || one.act === "reading") enter(phone, base, one, minute);
    else if (one.act === "kill") phone.entries = phone.entries.map(released);
    else await transmit(phone, one);
  }
  const whole: Step = { phone: 0, act: "send", asset: 0, most: 20 };
  for (let n = 0; n < 4; n++) await Promise.all(phones.map((phone) => transmit(phone, whole)));
  await check(
    base,
    phones.flatMap((phone) => phone.entries),
  );
}

async function check(base: PhoneRound, entries: readonly OutboxEntry[]): Promise<void> {
  const assets = base.assets.slice(0, 2);
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
  expect(packIds.sort()).toEqual([...base.packs, ...swaps.map((s) => s.newPackId)].sort());
  expect(new Set(swaps.map((s) => s.oldPackId)).size).toBe(swaps.length);
  expect(readings).toHaveLength(voltages.length + swaps.length);
  for (const { id, body } of voltages) {
    const row = readings.find((reading) => reading.id === id);
    expect(row?.packId).toBe(body.kind === "reading" ? body.packId : "");
  }
  expect(await base.cellsInVan()).toBe(20 - 2 * swaps.length);
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

it("two phones, cut off and repeated at will, leave what was entered exactly once", async () => {
  await fc.assert(fc.asyncProperty(fc.array(step, { minLength: 5, maxLength: 24 }), play), {
    numRuns: 25,
    endOnFailure: true,
  });
}, 120_000);

/**
 * The rules are the product's own, from the wording ("applied once however often sent",
 * "one refused entry does not block the others", "another person signing in never sends the first
 * one's"); PostgreSQL is the outside judge of what is there afterwards: rows are counted in the
 * tables, never asked of the code under test.
 */
import { randomUUID } from "node:crypto";
import { beforeEach, describe, expect, it } from "vitest";
import { readFieldDay } from "@/lib/usecases/read-field-day";
import { syncEntries } from "@/lib/usecases/sync-entries";
import type { PersonActor } from "@/lib/usecases/use-case";
import { testDatabase } from "../support/database";
import { testDeps } from "../support/deps";
import { type PhoneRound, phoneRound } from "../support/phone-round";
import { type SmallRegister, smallRegister } from "../support/small-register";

const { db } = await testDatabase();
const NOW = new Date("2026-12-01T12:00:00Z");
const deps = testDeps(db, NOW);
let register: SmallRegister;
let phone: PhoneRound;

beforeEach(async () => {
  register ??= await smallRegister(db);
  await db.deleteFrom("syncEntry").execute();
  await db.deleteFrom("plan").execute();
  phone = await phoneRound(db, register);
});

interface Made {
  readonly id: string;
  readonly happenedAt: string;
  readonly personId: string;
  readonly body: unknown;
}

function made(body: unknown, more: Partial<Made> = {}): Made {
  const happenedAt = "2026-12-01T11:00:00.000Z";
  return { id: randomUUID(), happenedAt, personId: phone.technician.personId, body, ...more };
}

const send = async (entries: Made[], actor: PersonActor = phone.technician, sentAt = NOW) =>
  (
    await syncEntries(deps, actor, {
      ...{ deviceId: "phone-one", sentAt: sentAt.toISOString(), entries },
    })
  ).response.outcomes;

const reading = (more: object = {}) => ({
  ...{ kind: "reading", assetId: phone.assets[0], millivolts: 2700, mode: "resting" },
  ...{ packId: phone.packs[0], stopId: phone.stopId },
  ...more,
});

const swap = (more: object = {}) => ({
  ...{ kind: "swap", assetId: phone.assets[0], oldPackId: phone.packs[0] },
  ...{ newPackId: randomUUID(), cellTypeId: register.lr20, lotId: register.lotId },
  ...{ fromPlaceId: phone.vanPlaceId, reason: "due", voltageOutMv: 2300, voltageInMv: 3100 },
  ...{ stopId: phone.stopId, ...more },
});

const packsOf = (n: number) =>
  db
    .selectFrom("pack")
    .selectAll()
    .where("assetId", "=", phone.assets[n] ?? "")
    .orderBy("installedAt")
    .execute();
const readingsOf = (packId: string) =>
  db.selectFrom("reading").selectAll().where("packId", "=", packId).orderBy("at").execute();
const stop = () =>
  db.selectFrom("stop").selectAll().where("id", "=", phone.stopId).executeTakeFirstOrThrow();
const words = (outcomes: readonly { readonly outcome: string }[]) => outcomes.map((o) => o.outcome);

describe("each entry once", () => {
  it("however often it is sent, one after the other", async () => {
    const entries = [made(reading()), made(swap(), { happenedAt: "2026-12-01T11:05:00Z" })];
    for (let n = 0; n < 3; n++) expect(words(await send(entries))).toEqual(["applied", "applied"]);
    expect(await readingsOf(phone.packs[0] ?? "")).toHaveLength(1);
    const packs = await packsOf(0);
    expect(packs).toHaveLength(2);
    expect(await readingsOf(packs[1]?.id ?? "")).toMatchObject([{ millivolts: 3100 }]);
    // Two cells in series left the van, once.
    expect(await phone.cellsInVan()).toBe(18);
  });

  it("however many requests carry it at the same moment", async () => {
    const entries = [made(swap()), made(reading({ assetId: phone.assets[1], packId: null }))];
    const answers = await Promise.all(Array.from({ length: 5 }, () => send(entries)));
    for (const answer of answers) expect(words(answer)).toEqual(["applied", "applied"]);
    expect(await packsOf(0)).toHaveLength(2);
    expect(await readingsOf(phone.packs[1] ?? "")).toHaveLength(1);
    expect(await phone.cellsInVan()).toBe(18);
    expect(await db.selectFrom("syncEntry").select("id").execute()).toHaveLength(2);
  });

  it("ticks off the tasks, the stop with its last, and starts the round", async () => {
    await send([made(swap())]);
    expect((await stop()).state).toBe("planned");
    const second = swap({ assetId: phone.assets[1], oldPackId: phone.packs[1] });
    await send([made(second, { happenedAt: "2026-12-01T11:20:00Z" })]);
    expect(await stop()).toMatchObject({ state: "done", doneAt: new Date("2026-12-01T11:20:00Z") });
    const round = await db.selectFrom("round").select("state").executeTakeFirstOrThrow();
    expect(round.state).toBe("started");
  });

  it("two tasks ticked at the same moment finish the stop between them", async () => {
    const second = swap({ assetId: phone.assets[1], oldPackId: phone.packs[1] });
    await Promise.all([send([made(swap())]), send([made(second)])]);
    expect((await stop()).state).toBe("done");
  });
});

describe("refusals", () => {
  it("do not block what comes after, and are remembered", async () => {
    const bad = made(reading({ millivolts: 59_000 }));
    const outcomes = await send([bad, made(reading())]);
    expect(words(outcomes)).toEqual(["refused", "applied"]);
    expect(outcomes[0]?.refusal?.faults[0]?.field).toBe("millivolts");
    expect(words(await send([bad]))).toEqual(["refused"]);
  });

  it("leave nothing of a swap behind when its last part is refused", async () => {
    const outcomes = await send([made(swap({ voltageInMv: 59_000 }))]);
    expect(outcomes[0]?.refusal?.faults[0]?.field).toBe("voltageInMv");
    expect(await packsOf(0)).toMatchObject([{ removedAt: null }]);
    expect(await phone.cellsInVan()).toBe(20);
  });

  it("names an entry that breaks a rule of the database, and goes on", async () => {
    const unknownCells = made(swap({ cellTypeId: randomUUID(), lotId: null, fromPlaceId: null }));
    const unknownPlace = made(swap({ fromPlaceId: randomUUID() }));
    const outcomes = await send([unknownCells, unknownPlace, made(reading())]);
    expect(words(outcomes)).toEqual(["refused", "refused", "applied"]);
  });

  it("takes hostile bodies for what they are", async () => {
    const deep = Array.from({ length: 2000 }).reduce<unknown>((inner) => [inner], "\u0000");
    const bodies = [
      ...[null, 7, "\ud800", { kind: "reading" }, { kind: "\u0000" }, { kind: "swap", x: deep }],
      reading({ millivolts: 1e12 }),
      reading({ loadUa: 9e15 }),
    ];
    const outcomes = await send(bodies.map((body) => made(body)));
    expect(new Set(words(outcomes))).toEqual(new Set(["refused"]));
    const kept = await send([made(reading({ note: "a\u0000b\ud800" }))]);
    expect(words(kept)).toEqual(["applied"]);
    const [row] = await readingsOf(phone.packs[0] ?? "");
    expect(row?.note).toBe("ab\ufffd");
  });
});

describe("a request", () => {
  const whole = async (change: object) =>
    syncEntries(deps, phone.technician, {
      ...{ deviceId: "phone-one", sentAt: NOW.toISOString(), entries: [made(reading())] },
      ...change,
    } as never);

  it("of another shape is refused as a whole, and nothing of it is recorded", async () => {
    const { personId } = phone.technician;
    const hostile: object[] = [
      { entries: [] },
      { entries: "all" },
      { entries: Array.from({ length: 101 }, () => made(reading())) },
      { entries: [made(reading()), { id: "1; drop table reading", personId, body: {} }] },
      { entries: [made(reading(), { happenedAt: "tomorrow" })] },
      { entries: [made(reading(), { happenedAt: "+275760-09-13T00:00:00.001Z" })] },
      { sentAt: "1e99" },
      { deviceId: "x" },
      { deviceId: { $gt: "" } },
    ];
    for (const change of hostile) {
      await expect(whole(change), JSON.stringify(change).slice(0, 80)).rejects.toMatchObject({
        code: "invalid",
      });
    }
    expect(await db.selectFrom("syncEntry").select("id").execute()).toEqual([]);
    expect(await readingsOf(phone.packs[0] ?? "")).toEqual([]);
  });

  it("that names an entry twice applies it once; a body that changed on the way changes nothing", async () => {
    const entry = made(reading());
    const other = { ...entry, body: reading({ millivolts: 2500 }) };
    expect(words(await send([entry, entry, other]))).toEqual(["applied", "applied", "applied"]);
    expect(await readingsOf(phone.packs[0] ?? "")).toMatchObject([{ millivolts: 2700 }]);
  });
});

describe("whose entry it is", () => {
  it("is never sent as somebody else's, and stays sendable by its owner", async () => {
    const other = await register.actor(["technician"]);
    const entry = made(reading());
    const [outcome] = await send([entry], other);
    expect(outcome).toMatchObject({ outcome: "refused", refusal: { code: "not_yours" } });
    expect(await db.selectFrom("syncEntry").select("id").execute()).toHaveLength(0);
    expect(words(await send([entry]))).toEqual(["applied"]);
    // The same id from another person tells them nothing and changes nothing.
    const [again] = await send([{ ...entry, personId: other.personId }], other);
    expect(again?.refusal?.code).toBe("not_yours");
  });

  it("keeps what was measured when the round is another's now, and refuses what is said of it", async () => {
    const other = await phoneRoundOfAnother();
    await db.updateTable("round").set({ technicianId: other }).execute();
    const outcomes = await send([
      made(swap()),
      made({ kind: "stop-done", stopId: phone.stopId }),
      made({ kind: "cannot", stopId: phone.stopId, reason: "flooded" }),
      made({ kind: "round", roundId: phone.roundId, act: "done" }),
    ]);
    expect(words(outcomes)).toEqual(["applied", "refused", "refused", "refused"]);
    expect(outcomes[1]?.refusal?.message).toContain("somebody else");
    expect(await packsOf(0)).toHaveLength(2);
    expect((await stop()).state).toBe("planned");
  });

  async function phoneRoundOfAnother(): Promise<string> {
    const person = await register.actor(["technician"]);
    const id = randomUUID();
    const crew = await db.selectFrom("crew").select("id").executeTakeFirstOrThrow();
    await db
      .insertInto("technician")
      .values({ id, personId: person.personId, crewId: crew.id })
      .execute();
    return id;
  }
});

describe("conflicts", () => {
  it("a pack swapped by two phones counts for the first; the second is told", async () => {
    const [first, second] = await Promise.all([send([made(swap())]), send([made(swap())])]);
    expect([...words(first), ...words(second)].sort()).toEqual(["applied", "refused"]);
    const refusal = [...first, ...second].find((o) => o.refusal)?.refusal;
    expect(refusal?.message).toContain("somebody else");
    expect(await packsOf(0)).toHaveLength(2);
    expect(await phone.cellsInVan()).toBe(18);
  });

  it("an asset retired meanwhile takes a voltage of its pack, but no new pack", async () => {
    const id = phone.assets[0] ?? "";
    await db.updateTable("asset").set({ state: "retired" }).where("id", "=", id).execute();
    expect(words(await send([made(reading()), made(swap())]))).toEqual(["applied", "refused"]);
  });

  it("a reading of a pack that was taken out before is not put down to its successor", async () => {
    await send([made(swap(), { happenedAt: "2026-12-01T10:00:00Z" })]);
    const [outcome] = await send([made(reading())]);
    expect(outcome).toMatchObject({ outcome: "refused", refusal: { code: "conflict" } });
    // Taken before the swap, it belongs to the old pack, however late it comes.
    const early = made(reading(), { happenedAt: "2026-12-01T09:30:00Z" });
    expect(words(await send([early]))).toEqual(["applied"]);
  });

  it("a reading of the new pack counts as its own though the phone's clock went back", async () => {
    const order = swap();
    const back = made(reading({ packId: order.newPackId, millivolts: 3050 }), {
      happenedAt: "2026-12-01T10:40:00Z",
    });
    expect(words(await send([made(order), back]))).toEqual(["applied", "applied"]);
    expect(await readingsOf(order.newPackId)).toHaveLength(2);
    expect(await readingsOf(phone.packs[0] ?? "")).toHaveLength(0);
  });

  it("what overtakes its swap waits for it, and holds up only the same asset", async () => {
    const order = swap();
    const after = made(reading({ packId: order.newPackId, millivolts: 3050 }), {
      happenedAt: "2026-12-01T11:30:00Z",
    });
    const elsewhere = made(reading({ assetId: phone.assets[1], packId: phone.packs[1] }));
    const third = made(reading(), { happenedAt: "2026-12-01T10:59:00Z" });
    expect(words(await send([after, third, elsewhere]))).toEqual(["later", "later", "applied"]);
    expect(words(await send([made(order), after, third]))).toEqual([
      ...["applied", "applied", "applied"],
    ]);
    expect(await readingsOf(order.newPackId)).toHaveLength(2);
  });

  it("puts a first pack into an empty asset", async () => {
    const order = swap({ assetId: phone.assets[2], oldPackId: null, voltageOutMv: null });
    expect(words(await send([made(order), made(order)]))).toEqual(["applied", "applied"]);
    expect(await packsOf(2)).toHaveLength(1);
  });
});

describe("the phone's clock", () => {
  it("a day ahead or behind is measured, recorded and taken out", async () => {
    for (const days of [1, -1]) {
      const shift = (iso: string) => new Date(Date.parse(iso) + days * 86_400_000);
      const entry = made(reading(), { happenedAt: shift("2026-12-01T11:00:00Z").toISOString() });
      expect(words(await send([entry], phone.technician, shift(NOW.toISOString())))).toEqual([
        "applied",
      ]);
      const row = await db
        .selectFrom("syncEntry")
        .selectAll()
        .where("id", "=", entry.id)
        .executeTakeFirstOrThrow();
      expect(row.clockSkewMs).toBe(days * 86_400_000);
    }
    const readings = await readingsOf(phone.packs[0] ?? "");
    expect(readings.map((r) => r.at.toISOString())).toEqual([
      ...["2026-12-01T11:00:00.000Z", "2026-12-01T11:00:00.000Z"],
    ]);
  });
});

describe("a clock that jumps", () => {
  it("between two entries of one phone leaves their order and never dates them ahead of us", async () => {
    // The phone was switched on a year ahead, put right, and then sent: its stamps contradict.
    const order = swap();
    const ahead = made(order, { happenedAt: "2027-12-01T11:00:00.000Z" });
    const after = made(reading({ packId: order.newPackId, millivolts: 3050 }));
    expect(words(await send([ahead, after]))).toEqual(["applied", "applied"]);
    const [packs, readings] = [await packsOf(0), await readingsOf(order.newPackId)];
    expect(packs).toHaveLength(2);
    expect(readings).toHaveLength(2);
    for (const at of [...packs.map((p) => p.installedAt), ...readings.map((r) => r.at)]) {
      expect(at.getTime()).toBeLessThanOrEqual(NOW.getTime());
    }
  });
});

describe("the day a phone loads", () => {
  it("holds the technician's own rounds only, with what is in their van", async () => {
    const day = await readFieldDay(deps, phone.technician, {});
    expect(day.rounds.map((round) => round.id)).toEqual([phone.roundId]);
    expect(day.van?.lots).toMatchObject([{ code: "LOT-1", cells: 20 }]);
    expect(day.assets.find((a) => a.id === phone.assets[0])?.pack?.id).toBe(phone.packs[0]);
    const other = await register.actor(["technician"]);
    expect((await readFieldDay(deps, other, {})).rounds).toEqual([]);
    await expect(
      readFieldDay(deps, other, { technicianId: phone.technician.technicianId }),
    ).rejects.toMatchObject({ code: "forbidden" });
  });
});

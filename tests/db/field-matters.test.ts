/**
 * Photos, orders, load checks, the return box and what the office decides about them. The rules are
 * the product's own, from the wording; PostgreSQL is the outside judge of what is there
 * afterwards, and an image library makes the pictures.
 */
import { randomUUID } from "node:crypto";
import sharp from "sharp";
import { beforeEach, describe, expect, it } from "vitest";
import { cleanImage } from "@/lib/server/clean-image";
import { closeMatter } from "@/lib/usecases/close-matter";
import { keepPhoto } from "@/lib/usecases/keep-photo";
import { listFieldMatters } from "@/lib/usecases/list-field-matters";
import { planStopAgain } from "@/lib/usecases/plan-stop-again";
import { readFieldDay } from "@/lib/usecases/read-field-day";
import { readPhoto } from "@/lib/usecases/read-photo";
import { collectReturnedCells, readReturnBox } from "@/lib/usecases/return-box";
import { sendEntryAgain } from "@/lib/usecases/send-entry-again";
import { syncEntries } from "@/lib/usecases/sync-entries";
import type { PersonActor } from "@/lib/usecases/use-case";
import { testDatabase } from "../support/database";
import { testDeps } from "../support/deps";
import { type PhoneRound, phoneRound } from "../support/phone-round";
import { type SmallRegister, smallRegister } from "../support/small-register";

const { db } = await testDatabase();
const NOW = new Date("2026-12-01T12:00:00Z");
const kept = new Map<string, Uint8Array>();
const storage = {
  put: async (key: string, bytes: Uint8Array) => void kept.set(key, bytes),
  get: async (key: string) => {
    const bytes = kept.get(key);
    return bytes ? { body: new Blob([new Uint8Array(bytes)]).stream(), bytes: bytes.length } : null;
  },
};
const deps = { ...testDeps(db, NOW), storage, cleanImage };
let register: SmallRegister;
let phone: PhoneRound;
let office: PersonActor;

beforeEach(async () => {
  register ??= await smallRegister(db);
  office ??= await register.actor(["dispatcher"]);
  kept.clear();
  await db.deleteFrom("syncEntry").execute();
  await db.deleteFrom("plan").execute();
  await db.deleteFrom("returnedCells").execute();
  phone = await phoneRound(db, register);
});

const AT = "2026-12-01T11:00:00.000Z";

async function send(body: unknown, more: { id?: string; mends?: string } = {}) {
  const { personId } = phone.technician;
  const entry = { id: randomUUID(), mends: null, happenedAt: AT, personId, body, ...more };
  const { response } = await syncEntries(deps, phone.technician, {
    ...{ deviceId: "phone-one", sentAt: NOW.toISOString(), entries: [entry] },
  });
  const [outcome] = response.outcomes;
  if (!outcome) throw new Error("no outcome");
  return outcome;
}

const cannot = (more: object = {}) => ({
  ...{
    kind: "cannot",
    stopId: phone.stopId,
    reason: "flooded",
    returnOn: "2026-12-10",
    note: "Deep",
  },
  ...more,
});
const swap = (more: object = {}) => ({
  ...{ kind: "swap", assetId: phone.assets[0], oldPackId: phone.packs[0], newPackId: randomUUID() },
  ...{ cellTypeId: register.lr20, lotId: register.lotId, fromPlaceId: phone.vanPlaceId },
  ...{ reason: "due", voltageOutMv: 2300, voltageInMv: 3100, stopId: phone.stopId, ...more },
});
const matters = async () => (await listFieldMatters(deps, office, {})).open;

const jpeg = async () =>
  new Uint8Array(
    await sharp({ create: { width: 64, height: 48, channels: 3, background: "#385" } })
      .withExif({ IFD0: { Make: "Secret maker" } })
      .jpeg()
      .toBuffer(),
  );

async function photo(entryId: string, more: { id?: string; bytes?: Uint8Array<ArrayBuffer> } = {}) {
  const { personId } = phone.technician;
  return {
    ...{ id: randomUUID(), entryId, personId, takenAt: AT, sentAt: NOW.toISOString() },
    bytes: await jpeg(),
    ...more,
  };
}

describe("photos", () => {
  it("are kept once however often they are sent, also at the same moment, without metadata", async () => {
    const entry = await send(swap());
    const one = await photo(entry.id);
    const results = await Promise.all([1, 2, 3].map(() => keepPhoto(deps, phone.technician, one)));
    expect(results.filter((result) => !result.repeated)).toHaveLength(1);
    const rows = await db.selectFrom("photo").selectAll().execute();
    expect(rows).toMatchObject([
      { id: one.id, assetId: phone.assets[0], siteId: register.siteId, width: 64, height: 48 },
    ]);
    expect(kept.size).toBe(1);
    const [bytes] = kept.values();
    expect(Buffer.from(bytes ?? []).includes("Secret maker")).toBe(false);
  });

  it("wait for their entry, and for one that was refused", async () => {
    const early = await photo(randomUUID());
    await expect(keepPhoto(deps, phone.technician, early)).rejects.toMatchObject({
      code: "unavailable",
    });
    const refused = await send(cannot({ stopId: randomUUID() }));
    expect(refused.outcome).toBe("refused");
    const after = await photo(refused.id);
    await expect(keepPhoto(deps, phone.technician, after)).rejects.toMatchObject({
      code: "unavailable",
    });
    expect(kept.size).toBe(0);
  });

  it("that are none are refused for good, and nothing is stored", async () => {
    const entry = await send(cannot());
    const hostile = [
      Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"><script>alert(1)</script></svg>'),
      Buffer.from("GIF89a"),
      Buffer.alloc(8_000_001, 0xff),
    ];
    for (const file of hostile) {
      const bytes = new Uint8Array(file);
      await expect(
        keepPhoto(deps, phone.technician, await photo(entry.id, { bytes })),
      ).rejects.toMatchObject({ code: "invalid" });
    }
    expect(kept.size).toBe(0);
    expect(await db.selectFrom("photo").select("id").execute()).toEqual([]);
  });

  it("leave no row when they cannot be stored, and go in when they are sent again", async () => {
    const entry = await send(cannot());
    const one = await photo(entry.id);
    const broken = { ...storage, put: async () => Promise.reject(new Error("no answer")) };
    await expect(keepPhoto({ ...deps, storage: broken }, phone.technician, one)).rejects.toThrow(
      "no answer",
    );
    expect(await db.selectFrom("photo").select("id").execute()).toEqual([]);
    expect(await keepPhoto(deps, phone.technician, one)).toMatchObject({ repeated: false });
  });

  it("are never sent as somebody else's, and shown to their maker and the office only", async () => {
    const entry = await send(swap());
    const one = await photo(entry.id);
    const other = await register.actor(["technician"]);
    await expect(keepPhoto(deps, other, one)).rejects.toMatchObject({ code: "forbidden" });
    const stolen = { ...one, personId: other.personId };
    await expect(keepPhoto(deps, other, stolen)).rejects.toMatchObject({ code: "forbidden" });
    await keepPhoto(deps, phone.technician, one);
    await expect(keepPhoto(deps, other, stolen)).rejects.toMatchObject({ code: "forbidden" });
    await expect(readPhoto(deps, other, { id: one.id })).rejects.toMatchObject({
      code: "forbidden",
    });
    const { bytes } = await readPhoto(deps, office, { id: one.id });
    expect(bytes).toBeGreaterThan(0);
    await readPhoto(deps, phone.technician, { id: one.id });
  });

  it("keep where they were taken only when the organisation wants it, and the picture never does", async () => {
    const entry = await send(swap());
    const position = { latitude: 52.501, longitude: -0.102 };
    const places = async () => {
      const one = { ...(await photo(entry.id)), position };
      await keepPhoto(deps, phone.technician, one);
      return db
        .selectFrom("photo")
        .select(["latitude", "longitude"])
        .where("id", "=", one.id)
        .executeTakeFirstOrThrow();
    };
    expect(await places()).toEqual({ latitude: null, longitude: null });
    await db.updateTable("organisation").set({ keepPhotoPosition: true }).execute();
    expect((await readFieldDay(deps, phone.technician, {})).organisation.keepPhotoPosition).toBe(
      true,
    );
    expect(await places()).toEqual(position);
    for (const bytes of kept.values()) expect(Buffer.from(bytes).includes("Exif")).toBe(false);
    const wrong = { ...(await photo(entry.id)), position: { latitude: 91, longitude: Number.NaN } };
    await expect(keepPhoto(deps, phone.technician, wrong as never)).rejects.toMatchObject({
      code: "invalid",
    });
    await db.updateTable("organisation").set({ keepPhotoPosition: false }).execute();
  });

  it("say when they were taken by our clock though the phone's is a day off", async () => {
    const entry = await send(swap());
    const day = 86_400_000;
    const shift = (at: string) => new Date(Date.parse(at) + day).toISOString();
    const one = {
      ...(await photo(entry.id)),
      takenAt: shift(AT),
      sentAt: shift(NOW.toISOString()),
    };
    await keepPhoto(deps, phone.technician, one);
    const row = await db.selectFrom("photo").selectAll().executeTakeFirstOrThrow();
    expect(row.takenAt.toISOString()).toBe(AT);
    expect(row.clockSkewMs).toBe(day);
  });
});

describe("matters for the office", () => {
  it("a stop that could not be done, with its day; left to the next plan", async () => {
    await send(cannot());
    const [matter] = await matters();
    expect(matter).toMatchObject({ kind: "cannot", returnOn: "2026-12-10", siteName: "Sluice 9" });
    await planStopAgain(deps, office, { id: matter?.id ?? "", returnOn: "2026-12-14" });
    expect(await matters()).toEqual([]);
    const stop = await db.selectFrom("stop").select("returnOn").executeTakeFirstOrThrow();
    expect(stop.returnOn).toBe("2026-12-14");
    await expect(
      closeMatter(deps, office, { id: matter?.id ?? "", reason: "late" }),
    ).rejects.toMatchObject({ code: "conflict" });
  });

  it("done after all closes by itself", async () => {
    await send(cannot());
    await send({ kind: "stop-done", stopId: phone.stopId });
    expect(await matters()).toEqual([]);
  });

  it("a conflict, sent again once the office has put right what stood in its way", async () => {
    const id = phone.assets[0] ?? "";
    await db.updateTable("asset").set({ state: "retired" }).where("id", "=", id).execute();
    const outcome = await send(swap());
    expect(outcome.outcome).toBe("refused");
    const [matter] = await matters();
    expect(matter).toMatchObject({ kind: "conflict", entryId: outcome.id });
    const again = () => sendEntryAgain(deps, office, { id: matter?.id ?? "" });
    await expect(again()).rejects.toMatchObject({ code: "conflict" });
    expect(await matters()).toHaveLength(1);
    await db.updateTable("asset").set({ state: "in_service" }).where("id", "=", id).execute();
    await again();
    expect(await matters()).toEqual([]);
    const packs = await db
      .selectFrom("pack")
      .select(["installedBy", "installedAt"])
      .where("assetId", "=", id)
      .where("removedAt", "is", null)
      .execute();
    expect(packs).toEqual([{ installedBy: phone.technician.personId, installedAt: new Date(AT) }]);
    // The phone asks again and hears that it counts; nothing is done twice.
    const { response } = await syncEntries(deps, phone.technician, {
      ...{ deviceId: "phone-one", sentAt: NOW.toISOString() },
      entries: [{ id: outcome.id, happenedAt: AT, personId: phone.technician.personId, body: {} }],
    });
    expect(response.outcomes[0]?.outcome).toBe("applied");
    expect(await phone.cellsInVan()).toBe(18);
  });

  it("a refused entry closes when the phone mends it, and only for its own maker", async () => {
    const bad = await send({ ...swap({ voltageInMv: 59_000 }) });
    expect((await matters()).map((matter) => matter.kind)).toEqual(["refused"]);
    expect((await send(swap(), { mends: bad.id })).outcome).toBe("applied");
    expect(await matters()).toEqual([]);
    const { closed } = await listFieldMatters(deps, office, {});
    expect(closed.find((matter) => matter.entryId === bad.id)?.outcome).toBe("mended");
  });

  it("a shortage at the load check; a load that is right raises nothing", async () => {
    const line = { cellTypeId: register.lr20, needed: 4, found: 2, packsShort: 1 };
    const check = { kind: "load-check", roundId: phone.roundId, stopsShort: [phone.stopId] };
    await send({ ...check, lines: [{ ...line, found: 4, packsShort: 0 }], stopsShort: [] });
    expect(await matters()).toEqual([]);
    await send({ ...check, lines: [line] });
    expect(await matters()).toMatchObject([{ kind: "shortage", roundId: phone.roundId }]);
  });

  it("hostile entries are matters too, and break nothing", async () => {
    for (const body of [null, 7, { kind: "swap", assetId: "x" }, { kind: "cannot", stopId: {} }]) {
      expect((await send(body)).outcome).toBe("refused");
    }
    expect(await matters()).toHaveLength(4);
  });
});

describe("the technician's order", () => {
  it("is kept by the server and seen in the next day that is loaded", async () => {
    const second = await addStop(2, "09:30");
    const third = await addStop(3, "10:30");
    const order = [third, phone.stopId, second];
    expect((await send({ kind: "reorder", roundId: phone.roundId, stopIds: order })).outcome).toBe(
      "applied",
    );
    const day = await readFieldDay(deps, phone.technician, {});
    const [round] = day.rounds;
    expect(round?.stops.map((stop) => stop.id)).toEqual(order);
    expect(round?.reorderedAt).toBe(AT);
    const times = round?.stops.map((stop) => stop.arrivesAt) ?? [];
    expect([...times].sort()).toEqual(times);
  });

  async function addStop(position: number, time: string): Promise<string> {
    const [id, siteId] = [randomUUID(), randomUUID()];
    await db
      .insertInto("site")
      .values({ id: siteId, code: siteId, name: "Weir", latitude: 52.5, longitude: 0.1 })
      .execute();
    const arrivesAt = new Date(`2026-12-01T${time}:00Z`);
    await db
      .insertInto("stop")
      .values({
        ...{ id, roundId: phone.roundId, siteId, position, arrivesAt },
        departsAt: new Date(arrivesAt.getTime() + 600_000),
      })
      .execute();
    return id;
  }
});

describe("the return box", () => {
  it("holds what came out, by type and lot, until it is collected", async () => {
    await send(swap({ cellsOut: 1, look: "leaking" }));
    await send(swap({ assetId: phone.assets[1], oldPackId: phone.packs[1], cellsOut: null }));
    const box = await readReturnBox(deps, office, {});
    expect(box.rows).toMatchObject([
      { designation: "LR20", lotCode: "LOT-1", cells: 3, damaged: 1, packs: 2 },
    ]);
    const given = { cellTypeId: register.lr20, until: NOW.toISOString() };
    expect(await collectReturnedCells(deps, office, given)).toEqual({ cells: 3 });
    expect((await readReturnBox(deps, office, {})).rows).toEqual([]);
    expect(await collectReturnedCells(deps, office, given)).toEqual({ cells: 0 });
  });
});

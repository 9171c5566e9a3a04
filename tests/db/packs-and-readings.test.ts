/**
 * The rules under test are the product's own (PRODUCT.md's objects and the wording:
 * "one installed pack per asset", "readings append-only", "impossible values are refused with
 * the reason, unlikely ones are kept and marked"); PostgreSQL 15 is the outside judge of the
 * constraints. Voltages: a fresh alkaline cell rests near 1.6 V (IEC 60086-1, highest
 * open-circuit voltage of system L 1.65 V; from memory).
 */
import { randomUUID } from "node:crypto";
import { beforeAll, describe, expect, it } from "vitest";
import { installPack } from "@/lib/usecases/install-pack";
import { giveVerdict } from "@/lib/usecases/give-verdict";
import { postReadings } from "@/lib/usecases/post-readings";
import { recordReading } from "@/lib/usecases/record-reading";
import { recordSwap } from "@/lib/usecases/record-swap";
import type { Actor, PersonActor } from "@/lib/usecases/use-case";
import { testDatabase } from "../support/database";
import { testDeps } from "../support/deps";
import { type SmallRegister, smallRegister } from "../support/small-register";

const { db } = await testDatabase();
const deps = testDeps(db);
let register: SmallRegister;
let dispatcher: PersonActor;
const key: Actor = { kind: "api-key", apiKeyId: randomUUID(), scopes: ["readings:write"] };
const firstPack = randomUUID();

beforeAll(async () => {
  register = await smallRegister(db);
  dispatcher = await register.actor(["dispatcher"]);
  await db
    .insertInto("apiKey")
    .values({
      id: key.kind === "api-key" ? key.apiKeyId : "",
      name: "gateway",
      prefix: "ww_",
      keyHash: "x",
      scopes: ["readings:write"],
      createdAt: deps.now(),
    })
    .execute();
});

const assetId = (n: number) => register.assets[n] ?? "";
const packIn = () => ({
  packId: randomUUID(),
  cellTypeId: register.lr20,
  lotId: register.lotId,
  madeOn: "",
  fromPlaceId: register.storesId,
});
const cellsInStores = async () =>
  (await db.selectFrom("lotStock").select("cells").executeTakeFirstOrThrow()).cells;

describe("a pack's life", () => {
  it("goes in once however often it is sent, and takes its cells out of stock", async () => {
    const order = {
      ...packIn(),
      packId: firstPack,
      assetId: assetId(0),
      at: "2026-06-01T10:00",
    };
    expect((await installPack(deps, dispatcher, order)).repeated).toBe(false);
    expect((await installPack(deps, dispatcher, order)).repeated).toBe(true);
    const pack = await db.selectFrom("pack").selectAll().executeTakeFirstOrThrow();
    // 10:00 British Summer Time is 09:00 UTC; series and parallel are the model's.
    expect(pack.installedAt.toISOString()).toBe("2026-06-01T09:00:00.000Z");
    expect([pack.series, pack.parallel, pack.madeOn]).toEqual([2, 1, "2025-06-01"]);
    expect(await cellsInStores()).toBe(8);
  });

  it("refuses a second pack, cells the device does not take, and a moment to come", async () => {
    const again = { ...packIn(), assetId: assetId(0), at: "2026-06-02T10:00" };
    await expect(installPack(deps, dispatcher, again)).rejects.toMatchObject({ code: "conflict" });
    const other = {
      ...packIn(),
      assetId: assetId(1),
      at: "2026-06-02T10:00",
      cellTypeId: register.er34615,
    };
    await expect(installPack(deps, dispatcher, other)).rejects.toMatchObject({
      code: "invalid",
      faults: [{ field: "cellTypeId" }],
    });
    const tomorrow = { ...packIn(), assetId: assetId(1), at: "2026-12-02T10:00" };
    await expect(installPack(deps, dispatcher, tomorrow)).rejects.toMatchObject({
      faults: [{ field: "at" }],
    });
  });

  it("lets one of two swaps at once win and tells the other", async () => {
    await standingForecast(firstPack);
    const swap = () =>
      recordSwap(deps, dispatcher, {
        ...packIn(),
        assetId: assetId(0),
        at: "2026-11-30T09:00",
        oldPackId: firstPack,
        reason: "due",
        voltageOut: "2,31",
        stoppedAt: "",
        look: "clean",
      });
    const ends = await Promise.allSettled([swap(), swap()]);
    const lost = ends.filter((e) => e.status === "rejected");
    expect(ends.filter((e) => e.status === "fulfilled")).toHaveLength(1);
    expect(lost[0]?.reason).toMatchObject({ code: "conflict" });
    expect(String(lost[0]?.reason.message)).toContain("somebody else");
    const packs = await db.selectFrom("pack").selectAll().orderBy("installedAt").execute();
    expect(packs.map((p) => [p.reasonOut, p.voltageOutMv])).toEqual([
      ["due", 2310],
      [null, null],
    ]);
    expect(await cellsInStores()).toBe(6);
  });

  it("keeps the forecast that stood beside what happened", async () => {
    const outcome = await db.selectFrom("forecastOutcome").selectAll().executeTakeFirstOrThrow();
    expect(outcome.packId).toBe(firstPack);
    expect(outcome.censored).toBe(true);
    expect(outcome.endedAt.toISOString()).toBe("2026-11-30T09:00:00.000Z");
    expect(await db.selectFrom("forecast").selectAll().execute()).toEqual([]);
  });

  it("has the database refuse what would overlap, whoever asks", async () => {
    const overlapping = db
      .insertInto("pack")
      .values({
        id: randomUUID(),
        assetId: assetId(0),
        cellTypeId: register.lr20,
        series: 2,
        parallel: 1,
        installedAt: new Date("2026-07-01T00:00:00Z"),
        removedAt: new Date("2026-08-01T00:00:00Z"),
        reasonOut: "due",
      })
      .execute();
    await expect(overlapping).rejects.toMatchObject({
      code: "23P01",
      constraint: "one_pack_at_a_time",
    });
  });
});

describe("readings", () => {
  const reading = (more: object) => ({
    id: randomUUID(),
    tag: "QF-0001",
    at: "2026-10-01T12:00:00Z",
    millivolts: 2900,
    kind: "resting",
    ...more,
  });

  it("judges each of a batch by itself and takes a repeat for what it is", async () => {
    const batch = [
      reading({}),
      reading({ millivolts: 6000 }),
      reading({ tag: "QF-9999" }),
      reading({ at: "2026-12-24T12:00:00Z" }),
      reading({ at: "2020-01-01T12:00:00Z" }),
      reading({ at: "2026-10-02T12:00:00Z", millivolts: 3330 }),
      { id: "no uuid", tag: "QF-0001" },
      reading({ at: "2026-10-03T12:00:00Z", millivolts: -5 }),
    ];
    const first = await postReadings(deps, key, { readings: batch });
    expect([first.logged, first.refused]).toEqual([2, 6]);
    expect(first.results.map((r) => r.faults[0]?.field ?? r.status)).toEqual([
      "logged",
      "millivolts",
      "tag",
      "at",
      "at",
      "logged",
      "id",
      "millivolts",
    ]);
    expect(first.results[5]?.doubt).toContain("does not gain charge");
    const again = await postReadings(deps, key, { readings: batch });
    expect([again.logged, again.repeated, again.refused]).toEqual([0, 2, 6]);
    expect(await db.selectFrom("reading").select("id").execute()).toHaveLength(2);
  });

  it("gives a reading to the pack that was in the asset at the time", async () => {
    const now = await postReadings(deps, key, {
      readings: [reading({ at: "2026-11-30T12:00:00Z", millivolts: 3190 })],
    });
    expect(now.logged).toBe(1);
    const row = await db
      .selectFrom("reading")
      .select("packId")
      .where("millivolts", "=", 3190)
      .executeTakeFirstOrThrow();
    expect(row.packId).not.toBe(firstPack);
  });

  it("logs from a form with comma or point and names the field that cannot be", async () => {
    const form = {
      id: randomUUID(),
      assetId: assetId(0),
      at: "2026-11-30T13:00",
      volts: "3,18",
      kind: "loaded" as const,
      loadMilliamps: "12.5",
      temperatureC: "-3,5",
      accuracyMv: "",
    };
    expect((await recordReading(deps, dispatcher, form)).status).toBe("logged");
    const row = await db
      .selectFrom("reading")
      .selectAll()
      .where("id", "=", form.id)
      .executeTakeFirstOrThrow();
    expect([row.millivolts, row.loadUa, row.temperatureDc]).toEqual([3180, 12_500, -35]);
    const tooHigh = recordReading(deps, dispatcher, { ...form, id: randomUUID(), volts: "31.8" });
    await expect(tooHigh).rejects.toMatchObject({ faults: [{ field: "volts" }] });
  });

  it("never changes: the database refuses, and a correction stands beside it", async () => {
    const { id } = await db.selectFrom("reading").select("id").executeTakeFirstOrThrow();
    const change = db.updateTable("reading").set({ millivolts: 1 }).where("id", "=", id).execute();
    await expect(change).rejects.toThrow("reading is append-only");
    await giveVerdict(deps, dispatcher, {
      id: randomUUID(),
      readingId: id,
      verdict: "corrected",
      correctedVolts: "2.81",
    });
    const verdict = await db.selectFrom("readingVerdict").selectAll().executeTakeFirstOrThrow();
    expect([verdict.readingId, verdict.correctedMv]).toEqual([id, 2810]);
    expect(deps.enqueued.at(-1)?.name).toBe("forecast");
  });
});

async function standingForecast(packId: string): Promise<void> {
  const at = new Date("2026-12-20T00:00:00Z");
  await db
    .insertInto("forecast")
    .values({
      packId,
      computedAt: new Date("2026-11-29T00:00:00Z"),
      ...{ p05: at, p20: at, p50: at, p80: at, p95: at },
      cdfDays: Array.from({ length: 50 }, () => 20_800),
      shareLeftPermille: 60,
      shareLeftLowPermille: 20,
      shareLeftHighPermille: 120,
      drawUa: 900,
      outNowPermille: 10,
      basis: "{}",
    })
    .execute();
}

/**
 * Why a forecast says so, what it would say, which cell, and readings in doubt, on PostgreSQL.
 * Truths: charge is current times time (twice the draw, half the days left, leak aside); what was
 * asked and not saved leaves every table as it was.
 */
import { randomUUID } from "node:crypto";
import { beforeAll, describe, expect, it } from "vitest";
import { MS_PER_DAY } from "@/lib/units";
import { compareCells } from "@/lib/usecases/compare-cells";
import { explainForecast } from "@/lib/usecases/explain-forecast";
import { exportReadingsInDoubt } from "@/lib/usecases/export-readings-in-doubt";
import { forecastWhatIf } from "@/lib/usecases/forecast-what-if";
import { giveVerdict } from "@/lib/usecases/give-verdict";
import { listReadingsInDoubt } from "@/lib/usecases/list-readings-in-doubt";
import { readAsset } from "@/lib/usecases/read-asset";
import { refreshForecasts } from "@/lib/usecases/refresh-forecasts";
import type { PersonActor } from "@/lib/usecases/use-case";
import { testDatabase } from "../support/database";
import { systemActor, testDeps } from "../support/deps";
import { type SmallRegister, smallRegister } from "../support/small-register";

const { db } = await testDatabase();
const deps = testDeps(db);
const tag = "QF-0001";
const packId = randomUUID();
const slip = randomUUID();
let register: SmallRegister;
let dispatcher: PersonActor;
let supervisor: PersonActor;

async function log(id: string, daysAgo: number, millivolts: number, doubt: string | null = null) {
  const at = new Date(deps.now().getTime() - daysAgo * MS_PER_DAY);
  const reading = { id, packId, at, millivolts, doubt, receivedAt: at };
  await db
    .insertInto("reading")
    .values({ ...reading, kind: "resting", source: "form" })
    .execute();
}

beforeAll(async () => {
  register = await smallRegister(db);
  dispatcher = await register.actor(["dispatcher"]);
  supervisor = await register.actor(["supervisor"]);
  await db
    .insertInto("dutyState")
    .values([
      {
        ...{ deviceModelId: register.modelId, position: 1, name: "sleep" },
        ...{ currentUa: 200, durationMs: 895_000 },
      },
      {
        ...{ deviceModelId: register.modelId, position: 2, name: "send" },
        ...{ currentUa: 100_000, durationMs: 5000 },
      },
    ])
    .execute();
  await db
    .insertInto("deviceModelCellType")
    .values({ deviceModelId: register.modelId, cellTypeId: register.er34615, preferred: false })
    .execute();
  const pack = { id: packId, assetId: register.assets[0] ?? "", cellTypeId: register.lr20 };
  const installedAt = new Date(deps.now().getTime() - 300 * MS_PER_DAY);
  await db
    .insertInto("pack")
    .values({ ...pack, series: 2, parallel: 1, installedAt })
    .execute();
  await log(randomUUID(), 120, 2760);
  await log(slip, 60, 1150, "far below the cut-off of 2.20 V: a poor contact?");
  await log(randomUUID(), 10, 2640);
  await refreshForecasts(deps, systemActor, { packIds: [packId] });
});

const rows = async () =>
  Promise.all([
    db.selectFrom("reading").selectAll().execute(),
    db.selectFrom("forecast").selectAll().execute(),
    db.selectFrom("auditEntry").selectAll().execute(),
  ]);
const daysLeft = (p50: Date) => (p50.getTime() - deps.now().getTime()) / MS_PER_DAY;

describe("why a forecast says so", () => {
  it("names the last reading, its shift, and the shift of each", async () => {
    const why = await explainForecast(deps, supervisor, { tag });
    expect(why?.moved).toMatchObject({ kind: "reading", reading: { millivolts: 2640 } });
    const readings = (await readAsset(deps, supervisor, { tag })).readings;
    expect(Object.keys(why?.movedByReading ?? {}).sort()).toEqual(readings.map((r) => r.id).sort());
    // A slip that hardly counts hardly moves anything.
    expect(Math.abs(why?.movedByReading[slip] ?? 99)).toBeLessThan(10);
    const expected = why?.expected ?? [];
    expect(expected[0]!.midMv).toBeGreaterThan(expected.at(-1)!.midMv);
    for (const band of expected) expect(band.lowMv).toBeLessThan(band.highMv);
  });

  it("says nothing of an asset without a pack, and not found of one there is not", async () => {
    expect(await explainForecast(deps, supervisor, { tag: "QF-0002" })).toBeNull();
    await expect(explainForecast(deps, supervisor, { tag: "NO" })).rejects.toMatchObject({
      code: "not_found",
    });
  });
});

describe("what if", () => {
  it("a low voltage today brings the likely day forward; nothing is kept", async () => {
    const before = await rows();
    const answer = await forecastWhatIf(deps, supervisor, { tag, volts: "2.58" });
    expect(daysLeft(answer.then.p50)).toBeLessThan(daysLeft(answer.now.p50));
    expect(answer.given).toMatchObject({ volts: 2580, kind: "resting" });
    expect(await rows()).toEqual(before);
    expect(deps.enqueued).toEqual([]);
  });

  it("every 5 minutes instead of 15: the days left shrink with the draw", async () => {
    const answer = await forecastWhatIf(deps, supervisor, { tag, periodMinutes: "5" });
    // (0.2 mA × 895 s + 100 mA × 5 s) / 900 s = 754 µA; (0.2 × 295 + 500) / 300 = 1863 µA
    const ratio = 1863 / 754;
    expect(answer.then.drawUa / answer.now.drawUa).toBeCloseTo(ratio, 2);
    const shrunk = daysLeft(answer.now.p50) / daysLeft(answer.then.p50);
    expect(shrunk).toBeGreaterThan(ratio * 0.95);
    expect(shrunk).toBeLessThanOrEqual(ratio);
  });

  it("other cells that the model lists, as if they had gone in on the same day", async () => {
    const answer = await forecastWhatIf(deps, supervisor, { tag, cellTypeId: register.er34615 });
    expect(answer.given.designation).toBe("ER34615");
    expect(answer.then.p05.getTime()).toBeLessThan(answer.then.p95.getTime());
    expect(answer.then.p50.getTime()).not.toBe(answer.now.p50.getTime());
  });

  it.each([
    [{}, "volts"],
    [{ volts: "abc" }, "volts"],
    [{ volts: "9.9" }, "volts"],
    [{ periodMinutes: "0.05" }, "periodMinutes"],
    [{ stateMilliamps: "1", stateName: "nap" }, "stateName"],
    [{ cellTypeId: "00000000-0000-4000-8000-000000000000" }, "cellTypeId"],
  ])("refuses %o by its field", async (given, field) => {
    await expect(forecastWhatIf(deps, supervisor, { tag, ...given })).rejects.toMatchObject({
      code: "invalid",
      faults: [{ field }],
    });
  });

  it("refuses a voltage of today together with other cells", async () => {
    const both = { tag, volts: "2.4", cellTypeId: register.er34615 };
    await expect(forecastWhatIf(deps, supervisor, both)).rejects.toMatchObject({ code: "invalid" });
  });
});

describe("which cell", () => {
  it("for the asset and for its model: what fits with life and cost, what does not with why", async () => {
    for (const of of [{ tag }, { modelId: register.modelId }]) {
      const { choice } = await compareCells(deps, supervisor, of);
      const alkaline = choice.fitting.find((o) => o.cell.designation === "LR20");
      expect(alkaline?.fit.holder).toBe("held");
      // 15 Ah at 0.754 mA is 2.27 years at most.
      expect(alkaline?.lifeDays.p50).toBeLessThan(2.27 * 366 * 1.05);
      expect(alkaline?.lifeDays.p50).toBeGreaterThan(365);
      expect(alkaline?.costPerYear.likely).toBeGreaterThan(0);
    }
  });

  it("says not found of a model that is gone", async () => {
    await expect(compareCells(deps, supervisor, { modelId: randomUUID() })).rejects.toMatchObject({
      code: "not_found",
    });
  });
});

describe("readings in doubt", () => {
  it("lists what the forecast hardly counts, until somebody says what to make of it", async () => {
    const list = await listReadingsInDoubt(deps, supervisor, {});
    expect(list.rows.map((row) => row.id)).toEqual([slip]);
    expect(list.rows[0]).toMatchObject({ tag, millivolts: 1150, total: 1 });
    expect(list.rows[0]?.weight).toBeLessThan(0.5);
    const csv = await exportReadingsInDoubt(deps, supervisor, {});
    expect(csv.trim().split("\r\n")).toHaveLength(2);
    expect(csv).toMatch(/,1\.15,resting,/);
    await giveVerdict(deps, dispatcher, {
      ...{ id: randomUUID(), readingId: slip, verdict: "corrected", correctedVolts: "2.70" },
      note: "Read on the wrong range.",
    });
    expect((await listReadingsInDoubt(deps, supervisor, {})).rows).toEqual([]);
    const original = await db
      .selectFrom("reading")
      .select("millivolts")
      .where("id", "=", slip)
      .executeTakeFirstOrThrow();
    expect(original.millivolts).toBe(1150);
    expect(deps.enqueued.at(-1)).toEqual({ name: "forecast", data: { packIds: [packId] } });
    await refreshForecasts(deps, systemActor, { packIds: [packId] });
    const { forecast } = await readAsset(deps, supervisor, { tag });
    expect(forecast?.weights.find((w) => w.readingId === slip)?.weight).toBeGreaterThan(0.5);
  });
});

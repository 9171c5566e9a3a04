/**
 * The job that renews forecasts, on PostgreSQL. Outside truths: capacity is current times time
 * (15 Ah at an average of 1 mA cannot last longer than 15,000 h, nor much less than half), and
 * a pack read near its cut-off is due before one read fresh. The forecast's own numbers are
 * checked in tests/unit/battery.
 */
import { randomUUID } from "node:crypto";
import { beforeAll, describe, expect, it } from "vitest";
import { MS_PER_DAY } from "@/lib/units";
import { dismissFinding } from "@/lib/usecases/dismiss-finding";
import { judgeHistory } from "@/lib/usecases/judge-history";
import { readHorizon } from "@/lib/usecases/read-horizon";
import { refreshForecasts } from "@/lib/usecases/refresh-forecasts";
import { touchForecasts } from "@/lib/usecases/touch-forecasts";
import type { PersonActor } from "@/lib/usecases/use-case";
import { testDatabase } from "../support/database";
import { systemActor, testDeps } from "../support/deps";
import { type SmallRegister, smallRegister } from "../support/small-register";

const { db } = await testDatabase();
const deps = testDeps(db);
const fresh = randomUUID();
const worn = randomUUID();
let register: SmallRegister;
let supervisor: PersonActor;

async function install(packId: string, assetId: string, days: number, millivolts: number) {
  const now = deps.now().getTime();
  await db
    .insertInto("pack")
    .values({
      id: packId,
      assetId,
      cellTypeId: register.lr20,
      series: 2,
      parallel: 1,
      installedAt: new Date(now - days * MS_PER_DAY),
    })
    .execute();
  await db
    .insertInto("reading")
    .values({
      id: randomUUID(),
      packId,
      at: new Date(now - MS_PER_DAY),
      millivolts,
      kind: "resting",
      source: "form",
      receivedAt: deps.now(),
    })
    .execute();
}

beforeAll(async () => {
  register = await smallRegister(db);
  supervisor = await register.actor(["supervisor"]);
  await db
    .insertInto("dutyState")
    .values({
      deviceModelId: register.modelId,
      position: 1,
      name: "run",
      currentUa: 1000,
      durationMs: 1000,
    })
    .execute();
  await install(fresh, register.assets[0] ?? "", 30, 3150);
  await install(worn, register.assets[1] ?? "", 500, 2300);
});

const forecastOf = (packId: string) =>
  db.selectFrom("forecast").selectAll().where("packId", "=", packId).executeTakeFirstOrThrow();

describe("refreshing forecasts", () => {
  it("writes one row a pack, and again the same when it runs twice", async () => {
    expect(await refreshForecasts(deps, systemActor, { packIds: null })).toEqual({ refreshed: 2 });
    const first = await forecastOf(fresh);
    await refreshForecasts(deps, systemActor, { packIds: [fresh] });
    expect(await forecastOf(fresh)).toEqual(first);
  });

  it("keeps within capacity = current × time, and a worn pack ends first", async () => {
    const [young, old] = [await forecastOf(fresh), await forecastOf(worn)];
    const hours = (young.p50.getTime() - deps.now().getTime()) / 3_600_000 + 30 * 24;
    // One cell in twenty may hold a tenth more than its rating (common practice, no source).
    expect(hours).toBeLessThan(15_000 * 1.1);
    expect(hours).toBeGreaterThan(15_000 / 2);
    expect(old.p95.getTime()).toBeLessThan(young.p05.getTime());
    expect(old.waitingCostMinorPerWeek).toBeGreaterThan(young.waitingCostMinorPerWeek);
  });

  it("stays stale when something changed after the reading of its inputs", async () => {
    const before = deps.now();
    deps.setNow(new Date(before.getTime() + 60_000));
    await db.transaction().execute((trx) => touchForecasts(trx, deps, [fresh]));
    expect(deps.enqueued.at(-1)).toEqual({ name: "forecast", data: { packIds: [fresh] } });
    deps.setNow(before);
    await refreshForecasts(deps, systemActor, { packIds: [fresh] });
    expect((await forecastOf(fresh)).staleSince).not.toBeNull();
    deps.setNow(new Date(before.getTime() + 120_000));
    await refreshForecasts(deps, systemActor, { packIds: [fresh] });
    expect((await forecastOf(fresh)).staleSince).toBeNull();
    deps.setNow(before);
  });

  it("leaves out packs that came out meanwhile and a deployment without an organisation", async () => {
    expect(await refreshForecasts(deps, systemActor, { packIds: [randomUUID()] })).toEqual({
      refreshed: 0,
    });
  });
});

describe("a found shift of a model's draw", () => {
  const found = (foundAt: Date) =>
    db
      .insertInto("finding")
      .values({
        ...{ id: randomUUID(), kind: "draw-shift", deviceModelId: register.modelId },
        ...{ since: "2026-11-15", factor: 1.5, relativeSd: 0.05, chance: 1e-9, packsBehind: 20 },
        ...{ foundAt, seenAt: foundAt },
      })
      .execute();
  const daysLeft = async () => {
    await refreshForecasts(deps, systemActor, { packIds: [fresh] });
    return ((await forecastOf(fresh)).p50.getTime() - deps.now().getTime()) / MS_PER_DAY;
  };

  it("brings dates forward by about the factor, and back again when it is dismissed", async () => {
    const before = await daysLeft();
    await found(deps.now());
    // charge left over draw: half as much again is drawn (current x time)
    expect((await daysLeft()) * 1.5).toBeGreaterThan(before * 0.85);
    expect((await daysLeft()) * 1.5).toBeLessThan(before * 1.15);
    const { id } = await db.selectFrom("finding").select("id").executeTakeFirstOrThrow();
    const dispatcher = await register.actor(["dispatcher"]);
    await dismissFinding(deps, dispatcher, { id, because: "Known." });
    expect(deps.enqueued.at(-1)?.name).toBe("forecast");
    expect(deps.enqueued.at(-1)?.data.packIds).toContain(fresh);
    expect(await daysLeft()).toBe(before);
    await db.deleteFrom("finding").execute();
  });

  it("is not known to a forecast of a day before it was found", async () => {
    const before = await daysLeft();
    await found(new Date(deps.now().getTime() + MS_PER_DAY));
    expect(await daysLeft()).toBe(before);
    await db.deleteFrom("finding").execute();
  });
});

describe("packs that came out", () => {
  /** Packs one after another in one device, each stopped after so many days. */
  async function livedThrough(days: readonly number[]) {
    let from = deps.now().getTime() - 3000 * MS_PER_DAY;
    const lives = days.map((life) => {
      const installedAt = new Date(from);
      const end = new Date(from + life * MS_PER_DAY);
      from = end.getTime() + MS_PER_DAY;
      return { installedAt, removedAt: end, stoppedAt: end };
    });
    await db
      .insertInto("pack")
      .values(
        lives.map((life) => ({
          ...life,
          id: randomUUID(),
          assetId: register.assets[2] ?? "",
          cellTypeId: register.lr20,
          series: 2,
          parallel: 1,
          reasonOut: "found_stopped",
        })),
      )
      .execute();
  }

  it("teach those still in: lives shorter than promised bring the dates forward", async () => {
    const before = await forecastOf(fresh);
    // 15 Ah at 1 mA is 625 days: these lived well short of it.
    await livedThrough([360, 380, 400, 420, 440]);
    expect(await judgeHistory(deps, systemActor, {})).toMatchObject({ judged: 5 });
    expect(await judgeHistory(deps, systemActor, {})).toEqual({ judged: 0, claims: 0 });
    await refreshForecasts(deps, systemActor, { packIds: [fresh] });
    const after = await forecastOf(fresh);
    expect(after.p50.getTime()).toBeLessThan(before.p50.getTime());
    expect(after.basis).toMatchObject({ fleetPacks: 5 });
  });

  it("are held against what was known at the visit before, not on the day they stopped", async () => {
    const outcomes = await db.selectFrom("forecastOutcome").selectAll().execute();
    expect(outcomes).toHaveLength(5);
    for (const outcome of outcomes) {
      expect(outcome.inHindsight).toBe(true);
      expect(outcome.forecastAt.getTime()).toBeLessThan(outcome.endedAt.getTime());
      // Without a voltage the last visit is the installation.
      const ahead = (outcome.endedAt.getTime() - outcome.forecastAt.getTime()) / MS_PER_DAY;
      expect([360, 380, 400, 420, 440]).toContain(Math.round(ahead));
    }
  });
});

const everything = {
  within: "all",
  crew: null,
  chemistry: null,
  notBooked: false,
  search: "",
  order: "waiting",
  descending: true,
  page: 1,
  pageSize: 100,
} as const;

describe("the Horizon", () => {
  it("lists what is dearest to leave first, with its figures", async () => {
    const view = await readHorizon(deps, supervisor, everything);
    expect(view.rows.map((row) => row.packId)).toEqual([worn, fresh]);
    expect(view.rows[0]?.total).toBe(2);
    expect(view.rows[0]?.readAt).toHaveLength(1);
    expect(view.figures.dueSoon.low).toBeLessThanOrEqual(view.figures.dueSoon.mean);
    // Each pack reaches cut-off once: the weeks' sums never exceed the number of packs.
    expect(view.weeks.reduce((sum, week) => sum + week.mean, 0)).toBeLessThanOrEqual(2.0001);
  });

  it("searches literally: % and _ are no wildcards", async () => {
    const find = async (search: string) =>
      (await readHorizon(deps, supervisor, { ...everything, search })).rows.length;
    expect(await find("qf-0001")).toBe(1);
    expect(await find("%")).toBe(0);
    expect(await find("_")).toBe(0);
  });

  it("falls back to something sensible when the address holds nonsense", async () => {
    const view = await readHorizon(deps, supervisor, {
      ...everything,
      order: "; drop table pack" as never,
      page: "minus one" as never,
    });
    expect(view.input).toMatchObject({ order: "waiting", page: 1 });
  });
});

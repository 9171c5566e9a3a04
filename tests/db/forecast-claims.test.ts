/**
 * Forecasts put on record each quarter, on PostgreSQL. Outside truth: what is said on a day can
 * only rest on what was known on that day, so nothing that is logged later may move it.
 */
import { randomUUID } from "node:crypto";
import { beforeAll, describe, expect, it } from "vitest";
import { MS_PER_DAY } from "@/lib/units";
import { exportClaims } from "@/lib/usecases/export-claims";
import { judgeHistory } from "@/lib/usecases/judge-history";
import { readTrust } from "@/lib/usecases/read-trust";
import type { PersonActor } from "@/lib/usecases/use-case";
import { testDatabase } from "../support/database";
import { systemActor, testDeps } from "../support/deps";
import { type SmallRegister, smallRegister } from "../support/small-register";

const { db } = await testDatabase();
const NOW = new Date("2026-12-01T09:00:00Z");
const deps = testDeps(db, NOW);
let register: SmallRegister;
let supervisor: PersonActor;
const running = randomUUID();
const stopped = randomUUID();
const silent = randomUUID();
const YEAR = { days: 365, group: "chemistry", crew: null } as const;

const at = (text: string) => new Date(`${text}T10:00:00Z`);

async function install(id: string, asset: number, from: string, until?: string) {
  const assetId = register.assets[asset] ?? "";
  const out = until
    ? { removedAt: at(until), stoppedAt: at(until), reasonOut: "found_stopped" }
    : {};
  const cells = { cellTypeId: register.lr20, series: 2, parallel: 1 };
  await db
    .insertInto("pack")
    .values({ id, assetId, ...cells, installedAt: at(from), ...out })
    .execute();
}

async function read(packId: string, day: string, millivolts: number, receivedAt = at(day)) {
  const taken = { at: at(day), millivolts, kind: "resting", source: "form", receivedAt };
  await db
    .insertInto("reading")
    .values({ id: randomUUID(), packId, ...taken })
    .execute();
}

const claims = () =>
  db.selectFrom("forecastClaim").selectAll().orderBy("quarter").orderBy("packId").execute();
const ofPack = async (packId: string) => (await claims()).filter((row) => row.packId === packId);

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
  await install(running, 0, "2026-02-10");
  await install(stopped, 1, "2025-05-20", "2026-08-15");
  await install(silent, 2, "2026-05-05");
  await db
    .insertInto("deviceEvent")
    .values({
      ...{ id: randomUUID(), assetId: register.assets[2] ?? "", at: at("2026-11-01") },
      ...{ kind: "stopped", lastHeardAt: at("2026-10-31"), note: "" },
    })
    .execute();
  await read(running, "2026-03-20", 3050);
  await read(stopped, "2026-06-01", 2500);
  await judgeHistory(deps, systemActor, {});
});

describe("forecasts on record", () => {
  it("are kept of each pack for every quarter at whose start it ran", async () => {
    const quarters = async (packId: string) => (await ofPack(packId)).map((row) => row.quarter);
    expect(await quarters(running)).toEqual(["2026-04-01", "2026-07-01", "2026-10-01"]);
    expect(await quarters(stopped)).toEqual([
      ...["2025-07-01", "2025-10-01", "2026-01-01", "2026-04-01", "2026-07-01"],
    ]);
    expect(await quarters(silent)).toEqual(["2026-07-01", "2026-10-01"]);
  });

  it("give no chance to a stop before the day they were made: the device ran then", async () => {
    for (const { cdfDays, madeAt } of await claims()) {
      expect(cdfDays[0]).toBeGreaterThanOrEqual(madeAt.getTime() / MS_PER_DAY - 0.01);
    }
  });

  it("rest on nothing that became known later", async () => {
    const before = await claims();
    await read(running, "2026-10-20", 2150);
    await db
      .insertInto("drawMeasurement")
      .values({
        ...{ id: randomUUID(), assetId: register.assets[0] ?? "", at: at("2026-10-21") },
        ...{ averageUa: 3000, method: "clamp" },
      })
      .execute();
    // packs that failed early teach the fleet, but only from then on
    for (const [from, until] of [
      ["2026-10-03", "2026-10-20"],
      ["2026-10-21", "2026-11-03"],
      ["2026-11-04", "2026-11-20"],
    ] as const) {
      await install(randomUUID(), 1, from, until);
    }
    await db.deleteFrom("forecastClaim").execute();
    await judgeHistory(deps, systemActor, {});
    expect((await claims()).map(({ cdfDays }) => cdfDays)).toEqual(
      before.map(({ cdfDays }) => cdfDays),
    );
  });

  it("stay when nothing new is known, and follow voltages that an import brings late", async () => {
    expect(await judgeHistory(deps, systemActor, {})).toEqual({ judged: 0, claims: 0 });
    const [spring, summer] = await ofPack(running);
    deps.setNow(new Date(NOW.getTime() + 3_600_000));
    await read(running, "2026-06-10", 2400, new Date(NOW.getTime() + 1_800_000));
    await judgeHistory(deps, systemActor, {});
    const [springNow, summerNow] = await ofPack(running);
    expect(springNow?.cdfDays).toEqual(spring?.cdfDays);
    expect(summerNow?.cdfDays[25]).toBeLessThan(summer?.cdfDays[25] ?? 0);
    deps.setNow(NOW);
  });
});

describe("the Record", () => {
  it("counts packs that run and those that stopped, once each", async () => {
    const view = await readTrust(deps, supervisor, YEAR);
    expect(view.since).toBe("2025-10-01");
    expect(view.whole).toMatchObject({ packs: 3, stopped: 2 });
    expect(view.inHindsight).toBe(1);
    expect(view.predictions).toHaveLength(3);
    // its first forecast of the time shown stood on 1 October 2025
    const days = view.predictions.find(({ key }) => key === stopped)?.foundDays;
    expect(days).toBeCloseTo(
      (at("2026-08-15").getTime() - Date.UTC(2025, 9, 1, 3)) / MS_PER_DAY,
      1,
    );
  });

  it("puts a stop into the quarter it came in", async () => {
    const view = await readTrust(deps, supervisor, { ...YEAR, group: "quarter" });
    const stops = Object.fromEntries(view.groups.map((row) => [row.name, row.stopped]));
    expect(stops).toEqual({
      ...{ "2025 Q4": 0, "2026 Q1": 0, "2026 Q2": 0 },
      ...{ "2026 Q3": 1, "2026 Q4": 1 },
    });
  });

  it("writes one line a forecast", async () => {
    const text = await exportClaims(deps, supervisor, { days: 365, crew: null });
    const lines = text.trim().split("\r\n");
    expect(lines).toHaveLength(1 + 9);
    expect(lines.filter((line) => line.includes("still running"))).toHaveLength(3);
  });
});

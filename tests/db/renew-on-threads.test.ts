/** The nightly renewal on threads: the same forecasts, to the last figure, as on one. */
import { randomUUID } from "node:crypto";
import { beforeAll, expect, it } from "vitest";
import { renewForecasts } from "@/lib/server/threads/renew-forecasts";
import { MS_PER_DAY } from "@/lib/units";
import { testDatabase } from "../support/database";
import { testDeps } from "../support/deps";
import { smallRegister } from "../support/small-register";

const { db, url } = await testDatabase();
const deps = testDeps(db);
const ASSETS = 1100;

beforeAll(async () => {
  const register = await smallRegister(db);
  const state = { deviceModelId: register.modelId, position: 1, name: "run" };
  await db
    .insertInto("dutyState")
    .values({ ...state, currentUa: 1000, durationMs: 1000 })
    .execute();
  const place = { name: "Gauge", siteId: register.siteId, deviceModelId: register.modelId };
  const assets = Array.from({ length: ASSETS }, (_, n) => ({
    ...{ id: randomUUID(), tag: `MANY-${n}` },
    ...place,
  }));
  await db.insertInto("asset").values(assets).execute();
  await db
    .insertInto("pack")
    .values(
      assets.map(({ id }, n) => ({
        ...{ id: randomUUID(), assetId: id, cellTypeId: register.lr20, series: 2, parallel: 1 },
        installedAt: new Date(deps.now().getTime() - (n % 400) * MS_PER_DAY - MS_PER_DAY),
      })),
    )
    .execute();
  process.env.WANEWRIGHT_NOW = deps.now().toISOString();
  return () => delete process.env.WANEWRIGHT_NOW;
});

const stored = () => db.selectFrom("forecast").selectAll().orderBy("packId").execute();

it("writes what one thread writes", async () => {
  expect(await renewForecasts(deps, url, { threads: 1 })).toEqual({ refreshed: ASSETS });
  const alone = await stored();
  await db.deleteFrom("forecast").execute();
  expect(await renewForecasts(deps, url, { threads: 2, worthPacks: 1 })).toEqual({
    refreshed: ASSETS,
  });
  expect(await stored()).toEqual(alone);
}, 60_000);

it("fails, and writes nothing, when the threads cannot reach the database", async () => {
  await db.deleteFrom("forecast").execute();
  const nowhere = new URL(url);
  nowhere.port = "1";
  const renewal = renewForecasts(deps, nowhere.href, { threads: 2, worthPacks: 1 });
  await expect(renewal).rejects.toThrow("ECONNREFUSED");
  expect(await stored()).toEqual([]);
}, 60_000);

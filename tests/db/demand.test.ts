import { randomUUID } from "node:crypto";
import { expect, it } from "vitest";
import { exportDemand } from "@/lib/usecases/export-demand";
import { readDemand } from "@/lib/usecases/read-demand";
import { testDatabase } from "../support/database";
import { testDeps } from "../support/deps";
import { smallRegister } from "../support/small-register";

const { db } = await testDatabase();
const register = await smallRegister(db);
const deps = testDeps(db, new Date("2026-12-01T09:00:00Z"));
const supervisor = await register.actor(["supervisor"]);

/** A pack of two LR20 in the n-th asset, whose device stops that many days from now, surely. */
async function packStopping(n: number, days: number) {
  const packId = randomUUID();
  const at = new Date(Date.UTC(2026, 11, 1 + days, 12));
  const epochDay = at.getTime() / 86_400_000;
  await db
    .insertInto("pack")
    .values({
      ...{ id: packId, assetId: register.assets[n]!, cellTypeId: register.lr20 },
      ...{ lotId: register.lotId, series: 2, parallel: 1 },
      installedAt: new Date("2024-12-01T00:00:00Z"),
    })
    .execute();
  await db
    .insertInto("forecast")
    .values({
      ...{ packId, computedAt: deps.now(), p05: at, p20: at, p50: at, p80: at, p95: at },
      ...{ cdfDays: Array.from({ length: 50 }, () => epochDay), drawUa: 900, basis: "{}" },
      ...{ shareLeftPermille: 40, shareLeftLowPermille: 10, shareLeftHighPermille: 80 },
      outNowPermille: 0,
    })
    .execute();
}

it("is empty, not wrong, before the first forecast", async () => {
  const { rows, months } = await readDemand(deps, supervisor, { months: 3 });
  expect(months).toEqual(["2026-12-01", "2027-01-01", "2027-02-01"]);
  expect(rows.every((row) => row.total.mean === 0 && row.order.orderSize === 0)).toBe(true);
});

it("counts cells in the month of the organisation's calendar, and orders by lead time", async () => {
  await packStopping(0, 20);
  await packStopping(1, 40);
  await packStopping(2, 300);
  await db.updateTable("lotStock").set({ cells: 3 }).execute();
  await db.updateTable("cellType").set({ leadTimeDays: 10 }).execute();
  const { rows } = await readDemand(deps, supervisor, { months: 3 });
  const lr20 = rows.find((row) => row.type.designation === "LR20")!;
  expect(lr20.byMonth.map((month) => month.mean)).toEqual([2, 2, 0]);
  // 3 cells serve the pack of 21 December; the one of 10 January finds one cell.
  expect(lr20.order).toMatchObject({ shortFrom: "2027-01-10", orderBy: "2026-12-31", orderNow: 0 });
  expect(lr20.order.orderSize).toBe(1);

  const csv = await exportDemand(deps, supervisor, { months: 3 });
  const [head, ...lines] = csv.trim().split("\r\n");
  const cells = lines.find((line) => line.includes("LR20"))!.split(",");
  const figure = (name: string) => cells[head!.replace("\uFEFF", "").split(",").indexOf(name)];
  expect([figure("2026-12"), figure("2027-01"), figure("order by")]).toEqual([
    "2",
    "2",
    "2026-12-31",
  ]);
});

it("leaves packs of retired assets out", async () => {
  await db.updateTable("asset").set({ state: "retired" }).where("tag", "=", "QF-0001").execute();
  const { rows } = await readDemand(deps, supervisor, { months: 3 });
  expect(rows.find((row) => row.type.designation === "LR20")!.byMonth[0]!.mean).toBe(0);
});

/**
 * The nightly look at the fleet, kept on PostgreSQL: what is found, what stays dismissed, what
 * goes. Truth: packs made here, one lot of which lived two thirds as long as the others.
 */
import { randomUUID } from "node:crypto";
import { beforeAll, describe, expect, it } from "vitest";
import { normalQuantile } from "@/lib/stats/normal";
import { MS_PER_DAY } from "@/lib/units";
import { dismissFinding, reopenFinding } from "@/lib/usecases/dismiss-finding";
import { judgeHistory } from "@/lib/usecases/judge-history";
import { listAssetFindings, listFindings } from "@/lib/usecases/list-findings";
import { lookForFindings } from "@/lib/usecases/look-for-findings";
import { readHorizon } from "@/lib/usecases/read-horizon";
import { listLotsInStores } from "@/lib/usecases/read-stores";
import type { PersonActor } from "@/lib/usecases/use-case";
import { replaceFindings } from "@/db/queries/findings";
import { testDatabase } from "../support/database";
import { systemActor, testDeps } from "../support/deps";
import { type SmallRegister, smallRegister } from "../support/small-register";

const { db } = await testDatabase();
const deps = testDeps(db);
let register: SmallRegister;
let dispatcher: PersonActor;
const weakLot = randomUUID();
const soundLot = randomUUID();
const stillIn = randomUUID();

/** Assets of their own, each with one pack of a lot that lived so long. */
async function lived(lotId: string, packs: number, meanDays: number) {
  const end = deps.now().getTime() - 10 * MS_PER_DAY;
  for (let i = 0; i < packs; i++) {
    const assetId = randomUUID();
    const days = meanDays * Math.exp(0.1 * normalQuantile((i + 0.5) / packs));
    const stoppedAt = new Date(end);
    const asset = { id: assetId, tag: `L${lotId.slice(0, 4)}-${i}`, name: "Gauge" };
    await db
      .insertInto("asset")
      .values({ ...asset, siteId: register.siteId, deviceModelId: register.modelId })
      .execute();
    const pack = { id: randomUUID(), assetId, cellTypeId: register.lr20, lotId };
    await db
      .insertInto("pack")
      .values({
        ...pack,
        ...{ series: 2, parallel: 1, reasonOut: "found_stopped", stoppedAt },
        installedAt: new Date(end - days * MS_PER_DAY),
        removedAt: new Date(end + MS_PER_DAY),
      })
      .execute();
  }
}

beforeAll(async () => {
  register = await smallRegister(db);
  dispatcher = await register.actor(["dispatcher"]);
  await db
    .insertInto("dutyState")
    .values({
      ...{ deviceModelId: register.modelId, position: 1, name: "run" },
      ...{ currentUa: 1000, durationMs: 1000 },
    })
    .execute();
  const lot = { cellTypeId: register.lr20, receivedOn: "2024-01-01", cellsReceived: 200 };
  await db
    .insertInto("lot")
    .values([
      { ...lot, id: weakLot, code: "WEAK" },
      { ...lot, id: soundLot, code: "SOUND" },
    ])
    .execute();
  await lived(soundLot, 24, 560);
  await lived(weakLot, 12, 360);
  const pack = { id: stillIn, assetId: register.assets[0] ?? "", cellTypeId: register.lr20 };
  await db
    .insertInto("pack")
    .values({
      ...{ ...pack, lotId: weakLot, series: 2, parallel: 1 },
      installedAt: new Date(deps.now().getTime() - 30 * MS_PER_DAY),
    })
    .execute();
  await judgeHistory(deps, systemActor, {});
});

const found = async () => (await listFindings(deps, dispatcher, {})).findings;

describe("the nightly look", () => {
  it("finds the weak lot, by how much, and the pack in service that is of it", async () => {
    expect(await lookForFindings(deps, systemActor, {})).toEqual({ findings: 1 });
    const [finding] = await found();
    expect(finding).toMatchObject({ kind: "bad-lot", lotCode: "WEAK", packsConcerned: 1 });
    expect(finding?.factor).toBeGreaterThan(0.55);
    expect(finding?.factor).toBeLessThan(0.75);
    expect(finding?.packs.map((p) => p.tag)).toEqual(["QF-0001"]);
  });

  it("run again changes nothing but the day it was seen", async () => {
    const [before] = await found();
    deps.setNow(new Date(deps.now().getTime() + MS_PER_DAY));
    await lookForFindings(deps, systemActor, {});
    const [after] = await found();
    expect(after).toMatchObject({ id: before?.id, foundAt: before?.foundAt });
  });

  it("marks the asset, the lot and the Horizon", async () => {
    const assetId = register.assets[0] ?? "";
    const own = await listAssetFindings(deps, dispatcher, { assetId });
    expect(own.map((f) => f.lotCode)).toEqual(["WEAK"]);
    const other = await listAssetFindings(deps, dispatcher, { assetId: register.assets[1] ?? "" });
    expect(other).toEqual([]);
    const lots = await listLotsInStores(deps, dispatcher, { cellTypeId: null, all: true, page: 1 });
    expect([...lots.weakLots]).toEqual([weakLot]);
    const horizon = await readHorizon(deps, dispatcher, {
      ...{ within: "all", crew: null, chemistry: null, notBooked: false, search: "" },
      ...{ order: "tag", descending: false, page: 1, pageSize: 10 },
    });
    expect([...horizon.findings]).toEqual([[stillIn, ["bad-lot"]]]);
  });
});

describe("a dismissal", () => {
  it("needs a reason, is kept with who and why, and takes the marks away", async () => {
    const id = (await found())[0]?.id ?? "";
    await expect(dismissFinding(deps, dispatcher, { id, because: " " })).rejects.toMatchObject({
      code: "invalid",
      faults: [{ field: "because" }],
    });
    await dismissFinding(deps, dispatcher, { id, because: "Supplier took the rest back." });
    expect((await found())[0]).toMatchObject({
      dismissedBecause: "Supplier took the rest back.",
      dismissedByName: dispatcher.name,
    });
    const assetId = register.assets[0] ?? "";
    expect(await listAssetFindings(deps, dispatcher, { assetId })).toEqual([]);
    const audit = await db
      .selectFrom("auditEntry")
      .select(["act", "subjectId", "personId"])
      .where("subjectKind", "=", "finding")
      .execute();
    expect(audit).toEqual([
      { act: "dismiss-finding", subjectId: id, personId: dispatcher.personId },
    ]);
  });

  it("outlives the next look, and can be taken back", async () => {
    deps.setNow(new Date(deps.now().getTime() + MS_PER_DAY));
    await lookForFindings(deps, systemActor, {});
    const [finding] = await found();
    expect(finding?.dismissedAt).not.toBeNull();
    await reopenFinding(deps, dispatcher, { id: finding?.id ?? "" });
    expect((await found())[0]?.dismissedAt).toBeNull();
  });

  it("of what is gone says so", async () => {
    const gone = dismissFinding(deps, dispatcher, { id: randomUUID(), because: "x" });
    await expect(gone).rejects.toMatchObject({ code: "not_found" });
  });
});

describe("what is no longer found", () => {
  const shift = (since: string) => ({
    ...{ id: randomUUID(), kind: "draw-shift" as const, lotId: null, since },
    ...{ deviceModelId: register.modelId, factor: 1.3, chance: 1e-9, packsBehind: 20 },
    relativeSd: 0.1,
  });
  const look = async (rows: Parameters<typeof replaceFindings>[1]) => {
    deps.setNow(new Date(deps.now().getTime() + MS_PER_DAY));
    await db.transaction().execute((trx) => replaceFindings(trx, rows, deps.now()));
  };

  it("goes when it was open", async () => {
    await look([]);
    expect(await found()).toEqual([]);
  });

  it("a later shift of a model is another one: it is not covered by the old dismissal", async () => {
    await look([shift("2026-03-01")]);
    const id = (await found())[0]?.id ?? "";
    await dismissFinding(deps, dispatcher, { id, because: "Known firmware." });
    await look([shift("2026-03-20")]);
    expect((await found())[0]?.dismissedAt).not.toBeNull();
    await look([shift("2026-09-01")]);
    expect((await found())[0]?.dismissedAt).toBeNull();
  });
});

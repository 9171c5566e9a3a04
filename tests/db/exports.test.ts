/**
 * What goes out comes in again: the exported files, imported into the register they came from,
 * find nothing to do. That is the requirement's own check ("export of every list"; "repeated
 * without doubling"), with the importer as the reader. CSV injection: OWASP's list of signs.
 */
import { randomUUID } from "node:crypto";
import { sql } from "kysely";
import { beforeAll, describe, expect, it } from "vitest";
import type { ImportReport } from "@/db/queries/import-runs";
import { applyImport, checkImport } from "@/lib/usecases/change-import";
import { countCells } from "@/lib/usecases/count-cells";
import { exportList } from "@/lib/usecases/export-list";
import { installPack } from "@/lib/usecases/install-pack";
import { moveCells } from "@/lib/usecases/move-cells";
import { postReadings } from "@/lib/usecases/post-readings";
import { readImport } from "@/lib/usecases/read-import";
import { receiveLot } from "@/lib/usecases/receive-lot";
import { runImportApply, runImportCheck } from "@/lib/usecases/run-import";
import { saveAsset } from "@/lib/usecases/save-asset";
import { saveDeviceModel } from "@/lib/usecases/save-device-model";
import { saveSite } from "@/lib/usecases/save-site";
import { uploadImport } from "@/lib/usecases/upload-import";
import type { PersonActor } from "@/lib/usecases/use-case";
import { testDatabase } from "../support/database";
import { systemActor, testDeps } from "../support/deps";
import { type SmallRegister, smallRegister } from "../support/small-register";

const { db } = await testDatabase();
const deps = testDeps(db);
let register: SmallRegister;
let dispatcher: PersonActor;

beforeAll(async () => {
  register = await smallRegister(db);
  dispatcher = await register.actor(["dispatcher"]);
  await saveSite(deps, dispatcher, {
    ...{
      id: register.siteId,
      code: "S-1",
      name: "Sluice 9; east",
      latitude: "52,5",
      longitude: 0.1,
    },
    ...{ noticeDays: "10", opens: "08:00", closes: "16:00", hazards: ["water"] },
    ...{
      tickets: ["boat"],
      keyCode: "=7",
      contactName: "Ada Reed",
      contactPhone: "+44 1632 960000",
    },
    ...{ contactEmail: "ada@mere.example", driveUpNotes: 'By the weir; "left", then on.' },
    closures: [
      { firstMonthDay: "12-20", lastMonthDay: "01-06", reason: "closed over the holidays" },
    ],
  });
  await saveDeviceModel(deps, dispatcher, {
    ...{ id: register.modelId, name: "Gauge M1", cutoffVolts: "2.2", series: "2", parallel: "1" },
    ...{ swapMinutes: 15, readMinutes: 5, silenceCostPerHour: "1,20", habitIntervalDays: "" },
    states: [
      { name: "sleep", currentMilliamps: "0,09", seconds: "592,7" },
      { name: "transmit", currentMilliamps: "210", seconds: "3.8" },
    ],
    ...{ cellTypeIds: [register.lr20], preferredId: register.lr20 },
  });
  const assetId = register.assets[0] ?? "";
  await installPack(deps, dispatcher, {
    ...{ assetId, at: "2026-06-01T10:00", packId: randomUUID(), cellTypeId: register.lr20 },
    ...{ lotId: register.lotId, fromPlaceId: register.storesId },
  });
  await postReadings(deps, dispatcher, {
    readings: [
      {
        ...{ id: randomUUID(), tag: "QF-0001", at: "2026-10-25T00:30:00Z", kind: "loaded" },
        ...{ millivolts: 2905, loadUa: 210_000, temperatureDc: -35, note: "=cmd|' /C calc'!A0" },
      },
    ],
  });
});

async function exported(list: Parameters<typeof exportList>[2]["list"]): Promise<string> {
  const filters = { search: "", descending: false, page: 1, crewId: null };
  const { text } = await exportList(deps, dispatcher, {
    list,
    assets: {
      ...filters,
      modelId: null,
      chemistry: null,
      state: null,
      siteCode: null,
      order: "tag",
    },
    sites: { ...filters, order: "code" },
  });
  return text;
}

/** Uploads a file and has it checked. @returns the import's id */
async function check(
  fileName: string,
  kind: Parameters<typeof uploadImport>[2]["kind"],
  text: string,
): Promise<string> {
  const importId = randomUUID();
  const bytes = new TextEncoder().encode(text);
  await uploadImport(deps, dispatcher, { id: importId, kind, fileName, bytes });
  const { run } = await readImport(deps, dispatcher, {
    ...{ importId, delimiter: null, show: null, page: 1 },
  });
  await checkImport(deps, dispatcher, { importId, ...run.settings });
  await runImportCheck(deps, systemActor, { importId });
  return importId;
}

describe("files that go out", () => {
  it.each([
    ["cell-types", "cell_types", 2],
    ["device-models", "device_models", 1],
    ["assets", "assets", 3],
    ["installs", "installs", 1],
  ] as const)("%s come in again and change nothing", async (list, kind, rows) => {
    const importId = await check(list, kind, await exported(list));
    const row = await db
      .selectFrom("importRun")
      .select("report")
      .where("id", "=", importId)
      .executeTakeFirstOrThrow();
    const { counts, faults } = row.report as unknown as ImportReport;
    expect(faults).toEqual([]);
    expect(counts).toEqual({ new: 0, changed: 0, same: rows, refused: 0 });
  });

  it("keep text from being run, numbers as numbers, and the hour that comes twice apart", async () => {
    const [, line = ""] = (await exported("readings")).split("\r\n");
    // 00:30 UTC on 25 October 2026 is the first 01:30 in London, one hour ahead of UTC.
    expect(line).toContain("QF-0001,2026-10-25T01:30:00+01:00,2.905,loaded,210,-3.5,");
    expect(line).toContain("'=cmd");
  });

  it("follow the organisation's decimal sign", async () => {
    await db.updateTable("organisation").set({ locale: "de-DE" }).execute();
    const [head = "", line = ""] = (await exported("readings")).split("\r\n");
    expect(head.split(";").length).toBeGreaterThan(5);
    expect(line).toContain(";2,905;loaded;");
    await db.updateTable("organisation").set({ locale: "en-GB" }).execute();
  });
});

describe("forms", () => {
  it("name the field that another asset has taken", async () => {
    const twice = saveAsset(deps, dispatcher, {
      ...{ id: randomUUID(), tag: "QF-0001", name: "Twice", siteCode: "S-1" },
      deviceModelId: register.modelId,
    });
    await expect(twice).rejects.toMatchObject({ code: "conflict", faults: [{ field: "tag" }] });
  });
});

describe("assets with their sites", () => {
  const columns = [
    ...(["asset.tag", "asset.name", "asset.state", "asset.firmware", "asset.note"] as const),
    ...(["asset.silenceCostMinorPerHour", "asset.deviceModelId", "site.code"] as const),
    ...(["site.name as siteName", "site.latitude", "site.longitude", "site.noticeDays"] as const),
    ...(["site.opens", "site.closes", "site.keyCode", "site.contactName"] as const),
    ...(["site.contactEmail", "site.contactPhone", "site.hazards", "site.tickets"] as const),
    ...(["site.driveUpNotes", "closure.firstMonthDay", "closure.reason"] as const),
  ];
  const registered = () =>
    db
      .selectFrom("asset")
      .innerJoin("site", "site.id", "asset.siteId")
      .leftJoin("siteClosure as closure", "closure.siteId", "site.id")
      .select(columns)
      .where("asset.tag", "like", "QF-%")
      .orderBy("asset.tag")
      .execute();

  it("make the same register where there is none", async () => {
    await saveAsset(deps, dispatcher, {
      ...{ id: register.assets[1] ?? "", tag: "QF-0002", name: "Gauge, lower", siteCode: "S-1" },
      ...{ deviceModelId: register.modelId, silenceCostPerHour: "2,40", firmware: "4.1" },
      note: "-behind the second gate",
    });
    const before = await registered();
    expect(before[1]).toMatchObject({ silenceCostMinorPerHour: 240, keyCode: "=7" });
    const text = await exported("assets");
    // The old ones step aside, so that the file finds neither its tags nor its site.
    await db
      .updateTable("asset")
      .set({ tag: sql`'OLD-' || tag` })
      .execute();
    await db.updateTable("site").set({ code: "OLD" }).where("code", "=", "S-1").execute();
    const importId = await check("assets", "assets", text);
    await applyImport(deps, dispatcher, { importId });
    await runImportApply(deps, systemActor, { importId });
    expect(await registered()).toEqual(before);
  });
});

describe("stock", () => {
  it("receives, moves and counts by moves that are never changed", async () => {
    const van = randomUUID();
    await db.insertInto("stockPlace").values({ id: van, kind: "stores", name: "Van 1" }).execute();
    const id = randomUUID();
    const lot = {
      ...{ id, code: "LOT-2", cellTypeId: register.lr20, placeId: register.storesId, cells: "40" },
      ...{ receivedOn: "2026-11-30", unitCost: "1.10" },
    };
    await receiveLot(deps, dispatcher, lot);
    await receiveLot(deps, dispatcher, lot);
    const { id: lotId } = await db
      .selectFrom("lot")
      .select("id")
      .where("code", "=", "LOT-2")
      .executeTakeFirstOrThrow();
    const move = { id: randomUUID(), lotId, fromPlaceId: register.storesId, toPlaceId: van };
    await moveCells(deps, dispatcher, { ...move, cells: 12 });
    const tooMany = moveCells(deps, dispatcher, { ...move, id: randomUUID(), cells: 29 });
    await expect(tooMany).rejects.toMatchObject({ faults: [{ field: "cells" }] });
    await countCells(deps, dispatcher, { id: randomUUID(), lotId, placeId: van, counted: 10 });
    const stock = await db
      .selectFrom("lotStock")
      .select(["placeId", "cells"])
      .where("lotId", "=", lotId)
      .execute();
    expect(new Map(stock.map((s) => [s.placeId, s.cells]))).toEqual(
      new Map([
        [register.storesId, 28],
        [van, 10],
      ]),
    );
    const change = db.updateTable("stockMove").set({ cells: 1 }).where("id", "=", id).execute();
    await expect(change).rejects.toThrow("stock_move is append-only");
  });
});

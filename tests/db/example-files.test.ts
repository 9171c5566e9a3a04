/**
 * The files in examples/ are the real input of the first use: an empty database takes all of
 * them, in order, with no row refused, and a second time finds nothing to do. The counts are
 * those of the files themselves, counted as lines by `node:fs`.
 */
import { randomUUID } from "node:crypto";
import { readFileSync } from "node:fs";
import { beforeAll, expect, it } from "vitest";
import type { ImportReport } from "@/db/queries/import-runs";
import { applyImport, checkImport } from "@/lib/usecases/change-import";
import { readImport } from "@/lib/usecases/read-import";
import { runImportApply, runImportCheck } from "@/lib/usecases/run-import";
import { uploadImport } from "@/lib/usecases/upload-import";
import type { PersonActor } from "@/lib/usecases/use-case";
import { testDatabase } from "../support/database";
import { actorWith, systemActor, testDeps } from "../support/deps";

const { db } = await testDatabase();
const deps = testDeps(db, new Date("2027-06-01T09:00:00Z"));
const FILES = [
  ["cell_types", "cell-types"],
  ["device_models", "device-models"],
  ["assets", "assets-with-sites"],
  ["installs", "installs"],
  ["readings", "readings"],
] as const;
let dispatcher: PersonActor;

beforeAll(async () => {
  await db
    .insertInto("organisation")
    .values({ name: "Empty", timeZone: "Europe/London", currency: "GBP", locale: "en-GB" })
    .execute();
  dispatcher = actorWith(["dispatcher"]);
  const { personId: id, name, email } = dispatcher;
  await db
    .insertInto("person")
    .values({ id, name, email, roles: ["dispatcher"] })
    .execute();
});

async function checked(kind: (typeof FILES)[number][0], file: string) {
  const bytes = new Uint8Array(readFileSync(`examples/${file}.csv`));
  const importId = randomUUID();
  await uploadImport(deps, dispatcher, { id: importId, kind, fileName: file, bytes });
  const view = await readImport(deps, dispatcher, {
    ...{ importId, delimiter: null, show: null, page: 1 },
  });
  await checkImport(deps, dispatcher, { importId, ...view.run.settings });
  await runImportCheck(deps, systemActor, { importId });
  return { importId, unmatched: view.head.length - Object.keys(view.run.settings.columns).length };
}

async function reportOf(importId: string): Promise<ImportReport> {
  const row = await db
    .selectFrom("importRun")
    .select("report")
    .where("id", "=", importId)
    .executeTakeFirstOrThrow();
  return row.report as unknown as ImportReport;
}

it.each(FILES)("takes every row of %s once", async (kind, file) => {
  const lines = readFileSync(`examples/${file}.csv`, "utf8").trim().split(/\r?\n/).length - 1;
  const { importId, unmatched } = await checked(kind, file);
  expect(unmatched).toBe(0);
  expect((await reportOf(importId)).faults).toEqual([]);
  await applyImport(deps, dispatcher, { importId });
  await runImportApply(deps, systemActor, { importId });
  const { counts, faults } = await reportOf(importId);
  expect(faults).toEqual([]);
  expect(counts).toEqual({ new: lines, changed: 0, same: 0, refused: 0 });
  const again = await reportOf((await checked(kind, file)).importId);
  expect(again.counts).toEqual({ new: 0, changed: 0, same: lines, refused: 0 });
});

import { randomUUID } from "node:crypto";
import type { Kysely } from "kysely";
import pg from "pg";
import { connect, type Database } from "@/db/client";
import { migrateToLatest } from "@/db/migrate";
import { checkImport, applyImport } from "@/lib/usecases/change-import";
import { runImportApply, runImportCheck } from "@/lib/usecases/run-import";
import { uploadImport } from "@/lib/usecases/upload-import";
import type { Actor, Deps } from "@/lib/usecases/use-case";
import { copyIn } from "./copy-in";
import { median, timed } from "./timing";
import { benchActor, benchDeps, benchRegister, readingsFile } from "./import-fixture";

export const IMPORT_ROWS = 20_000;
const ROUNDS = 5;
const SYSTEM: Actor = { kind: "system" };

export interface ImportBench {
  readonly rows: number;
  /** Medians over the rounds, ms. Applying: reading, judging and writing, in one transaction. */
  readonly applyMs: number;
  readonly checkMs: number;
  readonly copyMs: number;
  /** applyMs / copyMs. */
  readonly ratio: number;
}

/**
 * Imports 20,000 readings and copies the same rows bare into the same table, by turns, in a
 * database made for it on the same server and dropped at the end.
 */
export async function benchImport(databaseUrl: string): Promise<ImportBench> {
  const name = `wanewright_bench_${randomUUID().slice(0, 8)}`;
  const url = new URL(databaseUrl);
  url.pathname = `/${name}`;
  await asAdmin(databaseUrl, `create database "${name}"`);
  try {
    const db = connect(url.href, { max: 4 });
    try {
      await migrateToLatest(db);
      return await measure(db, url.href);
    } finally {
      await db.destroy();
    }
  } finally {
    await asAdmin(databaseUrl, `drop database if exists "${name}" with (force)`);
  }
}

async function measure(db: Kysely<Database>, url: string): Promise<ImportBench> {
  await benchRegister(db);
  const deps = benchDeps(db);
  const person = await benchActor(db);
  const bytes = new TextEncoder().encode(readingsFile(IMPORT_ROWS));
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    const times: Record<"check" | "apply" | "copy", number[]> = { check: [], apply: [], copy: [] };
    for (let round = 0; round < ROUNDS; round += 1) {
      const taken = await importOnce(deps, person, bytes);
      times.check.push(taken.checkMs);
      times.apply.push(taken.applyMs);
      times.copy.push(await copyOnce(client));
      await client.query("truncate reading cascade");
    }
    const [applyMs, copyMs] = [median(times.apply), median(times.copy)];
    const ratio = applyMs / copyMs;
    return { rows: IMPORT_ROWS, applyMs, checkMs: median(times.check), copyMs, ratio };
  } finally {
    await client.end();
  }
}

async function importOnce(deps: Deps, person: Actor, bytes: Uint8Array<ArrayBuffer>) {
  const importId = deps.newId();
  await uploadImport(deps, person, { id: importId, kind: "readings", fileName: "b.csv", bytes });
  const run = await deps.db
    .selectFrom("importRun")
    .select("settings")
    .where("id", "=", importId)
    .executeTakeFirstOrThrow();
  await checkImport(deps, person, { importId, ...(run.settings as object) } as never);
  const checkMs = await timed(() => runImportCheck(deps, SYSTEM, { importId }));
  await applyImport(deps, person, { importId });
  const applyMs = await timed(() => runImportApply(deps, SYSTEM, { importId }));
  return { checkMs, applyMs };
}

/** Takes the rows just imported out as text, empties the table and copies them in again. */
async function copyOnce(client: pg.Client): Promise<number> {
  const { rows } = await client.query<{ line: string }>(
    "select concat_ws(E'\\t', id, pack_id, at, millivolts, kind, coalesce(load_ua::text, E'\\\\N'), " +
      "coalesce(temperature_dc::text, E'\\\\N'), source, person_id, coalesce(doubt, E'\\\\N'), received_at) as line from reading",
  );
  if (rows.length !== IMPORT_ROWS) throw new Error(`${rows.length} rows were imported.`);
  const data = rows.map((row) => row.line).join("\n");
  await client.query("truncate reading cascade");
  return timed(() =>
    copyIn(
      client,
      "copy reading (id, pack_id, at, millivolts, kind, load_ua, temperature_dc, source, person_id, doubt, received_at) from stdin",
      `${data}\n`,
    ),
  );
}

async function asAdmin(databaseUrl: string, text: string): Promise<void> {
  const admin = new pg.Client({ connectionString: databaseUrl });
  await admin.connect();
  try {
    await admin.query(text);
  } finally {
    await admin.end();
  }
}

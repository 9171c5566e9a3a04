import { randomBytes } from "node:crypto";
import type { Kysely } from "kysely";
import pg from "pg";
import { afterAll, inject } from "vitest";
import { connect, type Database } from "@/db/client";

export interface TestDatabase {
  readonly db: Kysely<Database>;
  /** For a second connection, a child process or a bare `pg` client. */
  readonly url: string;
}

/**
 * A database of this test file's own, freshly migrated and empty, dropped when the file
 * ends. Call it once at the top of the file: `const { db } = await testDatabase();`
 */
export async function testDatabase(): Promise<TestDatabase> {
  const template = inject("templateDatabase");
  const name = `wanewright_test_${randomBytes(6).toString("hex")}`;
  await asAdmin((admin) => admin.query(`create database "${name}" template "${template}"`));
  const address = new URL(inject("testServer"));
  address.pathname = `/${name}`;
  const db = connect(address.href, { max: 5, applicationName: "wanewright-test" });
  afterAll(async () => {
    await db.destroy();
    await asAdmin((admin) => admin.query(`drop database if exists "${name}" with (force)`));
  });
  return { db, url: address.href };
}

async function asAdmin(work: (admin: pg.Client) => Promise<unknown>): Promise<void> {
  const admin = new pg.Client({ connectionString: inject("testServer") });
  await admin.connect();
  try {
    await work(admin);
  } finally {
    await admin.end();
  }
}

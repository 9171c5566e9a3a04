import { sql } from "kysely";
import { expect, it } from "vitest";
import { migrateToLatest, pendingMigrations } from "@/db/migrate";
import { testDatabase } from "../support/database";

const { db } = await testDatabase();

it("starts every test file on the newest schema, with the job queue beside it", async () => {
  expect(await pendingMigrations(db)).toEqual([]);
  expect(await migrateToLatest(db)).toEqual([]);
  const queues = await sql<{ name: string }>`select name from pgboss.queue`.execute(db);
  expect(queues.rows.map((row) => row.name)).toContain("mail");
});

it("gives every call a database of its own", async () => {
  const other = await testDatabase();
  await sql`create table only_here (x int)`.execute(db);
  await expect(sql`select * from only_here`.execute(other.db)).rejects.toThrow("only_here");
});

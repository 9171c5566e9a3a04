import { type Kysely, sql } from "kysely";
import type { Database } from "../client";

/** The newest migration this database has run. @throws when the database does not answer */
export async function schemaVersion(db: Kysely<Database>): Promise<string | null> {
  const { rows } = await sql<{ name: string }>`
    select name from kysely_migration order by name desc limit 1`.execute(db);
  return rows[0]?.name ?? null;
}

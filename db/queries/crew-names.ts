import type { Kysely } from "kysely";
import type { Database } from "../client";

/** Crews by name, for filters and choices. */
export async function listCrewNames(db: Kysely<Database>) {
  return db.selectFrom("crew").select(["id", "name"]).orderBy("name").execute();
}

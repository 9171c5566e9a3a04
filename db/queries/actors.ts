import type { Kysely } from "kysely";
import type { Database } from "../client";

/** A person as the session check needs them, or null when gone or switched off. */
export async function findActivePerson(db: Kysely<Database>, personId: string) {
  const row = await db
    .selectFrom("person")
    .leftJoin("technician", "technician.personId", "person.id")
    .select([
      "person.id",
      "person.name",
      "person.email",
      "person.roles",
      "person.sessionVersion",
      "technician.id as technicianId",
    ])
    .where("person.id", "=", personId)
    .where("person.active", "=", true)
    .executeTakeFirst();
  return row ?? null;
}

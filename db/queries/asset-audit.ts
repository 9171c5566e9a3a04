import type { Kysely } from "kysely";
import type { Database } from "../client";

/** Who did what to one subject, newest first. */
export async function listAudit(db: Kysely<Database>, subjectKind: string, subjectId: string) {
  return db
    .selectFrom("auditEntry")
    .leftJoin("person", "person.id", "auditEntry.personId")
    .leftJoin("apiKey", "apiKey.id", "auditEntry.apiKeyId")
    .select([
      "auditEntry.id",
      "auditEntry.at",
      "auditEntry.act",
      "auditEntry.detail",
      "person.name as personName",
      "apiKey.name as apiKeyName",
    ])
    .where("subjectKind", "=", subjectKind)
    .where("subjectId", "=", subjectId)
    .orderBy("auditEntry.at", "desc")
    .limit(200)
    .execute();
}

import type { Kysely } from "kysely";
import type { Database } from "../client";

export interface AuditRecord {
  readonly at: Date;
  readonly personId: string | null;
  readonly apiKeyId?: string | null;
  /** The use case's name. */
  readonly act: string;
  readonly subjectKind: string;
  readonly subjectId: string | null;
  readonly detail?: Record<string, unknown>;
}

/** Appends who did what; call it in the transaction of the change itself. */
export async function appendAudit(db: Kysely<Database>, record: AuditRecord): Promise<void> {
  await db
    .insertInto("auditEntry")
    .values({
      at: record.at,
      personId: record.personId,
      apiKeyId: record.apiKeyId ?? null,
      act: record.act,
      subjectKind: record.subjectKind,
      subjectId: record.subjectId,
      detail: JSON.stringify(record.detail ?? {}),
    })
    .execute();
}

import { type Kysely, sql, type SqlBool } from "kysely";
import type { Database } from "../client";

export interface AuditListing {
  readonly act: string | null;
  readonly personId: string | null;
  /** Days in the organisation's time zone, both included; null: open. */
  readonly fromDay: string | null;
  readonly toDay: string | null;
  readonly timeZone: string;
  readonly limit: number;
  readonly offset: number;
}

export interface AuditRow {
  readonly id: number;
  readonly at: Date;
  readonly personName: string | null;
  readonly apiKeyName: string | null;
  readonly act: string;
  readonly subjectKind: string;
  readonly subjectId: string | null;
  /** A person's name, an asset's tag, a site's code, a key's name: as they are called now. */
  readonly subjectLabel: string | null;
  readonly detail: unknown;
}

function matching(db: Kysely<Database>, listing: AuditListing) {
  const { act, personId, fromDay, toDay, timeZone } = listing;
  return db
    .selectFrom("auditEntry")
    .$if(act !== null, (query) => query.where("act", "=", act ?? ""))
    .$if(personId !== null, (query) => query.where("auditEntry.personId", "=", personId ?? ""))
    .$if(fromDay !== null, (query) =>
      query.where(sql<SqlBool>`at >= (${fromDay}::date)::timestamp at time zone ${timeZone}`),
    )
    .$if(toDay !== null, (query) =>
      query.where(sql<SqlBool>`at < (${toDay}::date + 1)::timestamp at time zone ${timeZone}`),
    );
}

/** One page of who did what, newest first. */
export async function listAudit(
  db: Kysely<Database>,
  listing: AuditListing,
): Promise<{ rows: AuditRow[]; total: number }> {
  const [rows, counted] = await Promise.all([
    matching(db, listing)
      .leftJoin("person", "person.id", "auditEntry.personId")
      .leftJoin("apiKey", "apiKey.id", "auditEntry.apiKeyId")
      .select([
        ...(["auditEntry.id", "auditEntry.at", "auditEntry.act"] as const),
        ...(["auditEntry.subjectKind", "auditEntry.subjectId", "auditEntry.detail"] as const),
        ...(["person.name as personName", "apiKey.name as apiKeyName"] as const),
        SUBJECT_LABEL.as("subjectLabel"),
      ])
      .orderBy("auditEntry.at", "desc")
      .orderBy("auditEntry.id", "desc")
      .limit(listing.limit)
      .offset(listing.offset)
      .execute(),
    matching(db, listing)
      .select((eb) => eb.fn.countAll<number>().as("total"))
      .executeTakeFirstOrThrow(),
  ]);
  return { rows, total: counted.total };
}

const SUBJECT_LABEL = sql<string | null>`case audit_entry.subject_kind
  when 'person' then (select name from person p where p.id::text = audit_entry.subject_id)
  when 'asset' then (select tag from asset a where a.id::text = audit_entry.subject_id)
  when 'site' then (select code from site s where s.id::text = audit_entry.subject_id)
  when 'api_key' then (select name from api_key k where k.id::text = audit_entry.subject_id)
  when 'crew' then (select name from crew c where c.id::text = audit_entry.subject_id)
  when 'depot' then (select name from depot d where d.id::text = audit_entry.subject_id)
  when 'van' then (select name from van v where v.id::text = audit_entry.subject_id)
  when 'climate' then (select name from climate m where m.id::text = audit_entry.subject_id)
  when 'technician' then (select p.name from technician t join person p on p.id = t.person_id
    where t.id::text = audit_entry.subject_id)
end`;

/** What the filters of the audit offer: acts that occur, and people. */
export async function auditChoices(db: Kysely<Database>) {
  const [acts, people] = await Promise.all([
    db.selectFrom("auditEntry").select("act").distinct().orderBy("act").execute(),
    db
      .selectFrom("person")
      .select(["id", "name"])
      .orderBy(sql`lower(name)`)
      .execute(),
  ]);
  return { acts: acts.map((row) => row.act), people };
}

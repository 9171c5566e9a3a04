import { type Kysely, sql, type SqlBool, type Transaction } from "kysely";
import type { Database } from "../client";

export interface DigestChoice {
  readonly personId: string;
  readonly weekdays: readonly number[];
  /** Local time, "HH:MM". */
  readonly sendAt: string;
  readonly horizonDays: number;
}

/** Everyone in the office with the digest they chose; without one the choice is null. */
export async function listDigestChoices(db: Kysely<Database>, onlyPersonId: string | null) {
  return db
    .selectFrom("person")
    .leftJoin("digestSetting", "digestSetting.personId", "person.id")
    .select([
      ...(["person.id as personId", "person.name", "person.email", "person.roles"] as const),
      ...(["digestSetting.weekdays", "digestSetting.sendAt"] as const),
      ...(["digestSetting.horizonDays", "digestSetting.lastSentOn"] as const),
    ])
    .where("person.active", "=", true)
    .where(sql<SqlBool>`person.roles && array['administrator','dispatcher','supervisor']`)
    .$if(onlyPersonId !== null, (query) => query.where("person.id", "=", onlyPersonId ?? ""))
    .orderBy(sql`lower(person.name)`)
    .execute();
}

/** Stores a choice; no weekdays: the digest is stopped. */
export async function saveDigestChoice(
  trx: Transaction<Database>,
  { personId, weekdays, sendAt, horizonDays }: DigestChoice,
): Promise<void> {
  if (weekdays.length === 0) {
    await trx.deleteFrom("digestSetting").where("personId", "=", personId).execute();
    return;
  }
  const values = { weekdays: [...weekdays], sendAt, horizonDays };
  await trx
    .insertInto("digestSetting")
    .values({ personId, ...values })
    .onConflict((conflict) => conflict.column("personId").doUpdateSet(values))
    .execute();
}

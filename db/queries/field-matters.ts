import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "../client";

export type MatterKind = "refused" | "conflict" | "shortage" | "cannot";
export type MatterOutcome = "sent_again" | "mended" | "planned_again" | "closed";

export interface NewMatter {
  readonly id: string;
  readonly kind: MatterKind;
  readonly entryId: string;
  readonly personId: string;
  readonly roundId: string | null;
  readonly stopId: string | null;
  readonly assetId: string | null;
  readonly raisedAt: Date;
  readonly detail: Record<string, unknown>;
}

/**
 * Raises something that needs a decision in the office; once an entry. What the entry speaks of may
 * be gone by now, or never have been: then the matter stands without it.
 */
export async function raiseMatter(trx: Transaction<Database>, matter: NewMatter): Promise<void> {
  await trx
    .insertInto("fieldMatter")
    .values((eb) => ({
      ...matter,
      detail: JSON.stringify(matter.detail),
      roundId: eb.selectFrom("round").select("round.id").where("round.id", "=", matter.roundId),
      stopId: eb.selectFrom("stop").select("stop.id").where("stop.id", "=", matter.stopId),
      assetId: eb.selectFrom("asset").select("asset.id").where("asset.id", "=", matter.assetId),
    }))
    .onConflict((conflict) => conflict.column("entryId").doNothing())
    .execute();
}

export interface MatterEnd {
  readonly closedAt: Date;
  readonly closedBy: string | null;
  readonly outcome: MatterOutcome;
  readonly note: string;
}

/** Closes what is open about a person's entry; nothing when nothing is. */
export async function closeMatterOfEntry(
  trx: Transaction<Database>,
  { entryId, personId }: { readonly entryId: string; readonly personId: string },
  end: MatterEnd,
): Promise<void> {
  await trx
    .updateTable("fieldMatter")
    .set(end)
    .where("entryId", "=", entryId)
    .where("personId", "=", personId)
    .where("closedAt", "is", null)
    .execute();
}

/** Closes what is still open about a stop, of these kinds: it has been done after all. */
export async function closeMattersOfStop(
  trx: Transaction<Database>,
  stopId: string,
  end: MatterEnd,
): Promise<void> {
  await trx
    .updateTable("fieldMatter")
    .set(end)
    .where("stopId", "=", stopId)
    .where("kind", "=", "cannot")
    .where("closedAt", "is", null)
    .execute();
}

/** An open matter with its entry, locked against a second decision. */
export async function lockMatter(trx: Transaction<Database>, id: string) {
  return trx
    .selectFrom("fieldMatter")
    .innerJoin("syncEntry", "syncEntry.id", "fieldMatter.entryId")
    .select(["fieldMatter.id", "fieldMatter.kind", "fieldMatter.entryId", "fieldMatter.closedAt"])
    .select(["fieldMatter.stopId", "fieldMatter.personId", "syncEntry.body", "syncEntry.outcome"])
    .select(["syncEntry.happenedAt", "syncEntry.receivedAt", "syncEntry.clockSkewMs"])
    .where("fieldMatter.id", "=", id)
    .forUpdate(["fieldMatter", "syncEntry"])
    .executeTakeFirst();
}

export async function endMatter(
  trx: Transaction<Database>,
  id: string,
  end: MatterEnd,
): Promise<void> {
  await trx.updateTable("fieldMatter").set(end).where("id", "=", id).execute();
}

const listed = (db: Kysely<Database>) =>
  db
    .selectFrom("fieldMatter")
    .innerJoin("person", "person.id", "fieldMatter.personId")
    .innerJoin("syncEntry", "syncEntry.id", "fieldMatter.entryId")
    .leftJoin("asset", "asset.id", "fieldMatter.assetId")
    .leftJoin("stop", "stop.id", "fieldMatter.stopId")
    .leftJoin("site", (join) =>
      join.on((eb) => eb("site.id", "=", eb.fn.coalesce("asset.siteId", "stop.siteId"))),
    )
    .leftJoin("round", (join) =>
      join.on((eb) => eb("round.id", "=", eb.fn.coalesce("fieldMatter.roundId", "stop.roundId"))),
    )
    .leftJoin("person as closer", "closer.id", "fieldMatter.closedBy")
    .select(["fieldMatter.id", "fieldMatter.kind", "fieldMatter.raisedAt", "fieldMatter.detail"])
    .select(["fieldMatter.entryId", "fieldMatter.closedAt", "fieldMatter.outcome"])
    .select(["fieldMatter.note", "person.name as personName", "closer.name as closedBy"])
    .select([
      "asset.tag",
      "asset.name as assetName",
      "site.name as siteName",
      "site.code as siteCode",
    ])
    .select(["stop.returnOn", "round.id as roundId", "round.day", "syncEntry.body"])
    .select(["syncEntry.refusal", "syncEntry.happenedAt", "syncEntry.clockSkewMs"]);

/** What waits for a decision, oldest first. */
export async function listOpenMatters(db: Kysely<Database>) {
  return listed(db)
    .where("fieldMatter.closedAt", "is", null)
    .orderBy("fieldMatter.raisedAt")
    .orderBy("fieldMatter.id")
    .limit(500)
    .execute();
}
export type MatterRow = Awaited<ReturnType<typeof listOpenMatters>>[number];

/** What was decided lately, newest first. */
export async function listClosedMatters(db: Kysely<Database>, limit: number) {
  return listed(db)
    .where("fieldMatter.closedAt", "is not", null)
    .orderBy("fieldMatter.closedAt", "desc")
    .orderBy("fieldMatter.id")
    .limit(limit)
    .execute();
}

export async function countOpenMatters(db: Kysely<Database>): Promise<number> {
  const row = await db
    .selectFrom("fieldMatter")
    .select((eb) => eb.fn.countAll<number>().as("n"))
    .where("closedAt", "is", null)
    .executeTakeFirstOrThrow();
  return row.n;
}

/** Who made an entry, as the actor they were: their roles and their place in a crew. */
export async function findEntryMaker(db: Kysely<Database>, personId: string) {
  return db
    .selectFrom("person")
    .leftJoin("technician", "technician.personId", "person.id")
    .select(["person.id", "person.name", "person.email", "technician.id as technicianId"])
    .select(sql<string[]>`person.roles`.as("roles"))
    .where("person.id", "=", personId)
    .executeTakeFirst();
}

import { type Kysely, type RawBuilder, sql, type SqlBool, type Transaction } from "kysely";
import type { Database } from "../client";

export const PEOPLE_ORDERS = ["name", "email", "seen"] as const;
export type PeopleOrder = (typeof PEOPLE_ORDERS)[number];
export const PEOPLE_STATES = ["active", "invited", "off"] as const;
export type PersonState = (typeof PEOPLE_STATES)[number];

export interface PeopleListing {
  readonly search: string;
  readonly role: string | null;
  readonly state: PersonState | null;
  readonly order: PeopleOrder;
  readonly descending: boolean;
  readonly limit: number;
  readonly offset: number;
}

export interface PersonRow {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly roles: string[];
  readonly state: PersonState;
  readonly invitedAt: Date | null;
  readonly lastSeenAt: Date | null;
  readonly technicianId: string | null;
}

const STATE = sql<PersonState>`
  case when not person.active then 'off' when person.joined_at is null then 'invited' else 'active' end`;

const ORDER_SQL: Record<PeopleOrder, RawBuilder<unknown>> = {
  name: sql`lower(person.name)`,
  email: sql`person.email`,
  seen: sql`person.last_seen_at`,
};

function matching(
  db: Kysely<Database>,
  { search, role, state }: Pick<PeopleListing, "search" | "role" | "state">,
) {
  const like = `%${search.replace(/[\\%_]/g, "\\$&")}%`;
  return db
    .selectFrom("person")
    .$if(search !== "", (query) =>
      query.where(sql<SqlBool>`(person.name ilike ${like} or person.email ilike ${like})`),
    )
    .$if(role !== null, (query) => query.where(sql<SqlBool>`${role} = any(person.roles)`))
    .$if(state !== null, (query) => query.where(sql<SqlBool>`(${STATE}) = ${state}`));
}

/** One page of the people, with what each may do and whether they have come. */
export async function listPeople(
  db: Kysely<Database>,
  listing: PeopleListing,
): Promise<{ rows: PersonRow[]; total: number }> {
  const direction = listing.descending ? sql`desc nulls last` : sql`asc nulls last`;
  const [rows, counted] = await Promise.all([
    matching(db, listing)
      .leftJoin("technician", "technician.personId", "person.id")
      .select([
        ...(["person.id", "person.name", "person.email", "person.roles"] as const),
        ...(["person.invitedAt", "person.lastSeenAt"] as const),
        "technician.id as technicianId",
        STATE.as("state"),
      ])
      .orderBy(sql`${ORDER_SQL[listing.order]} ${direction}`)
      .orderBy("person.id")
      .limit(listing.limit)
      .offset(listing.offset)
      .execute(),
    matching(db, listing)
      .select((eb) => eb.fn.countAll<number>().as("total"))
      .executeTakeFirstOrThrow(),
  ]);
  return { rows, total: counted.total };
}

export async function findPerson(db: Kysely<Database>, id: string): Promise<PersonRow | null> {
  const row = await db
    .selectFrom("person")
    .leftJoin("technician", "technician.personId", "person.id")
    .select([
      ...(["person.id", "person.name", "person.email", "person.roles"] as const),
      ...(["person.invitedAt", "person.lastSeenAt"] as const),
      "technician.id as technicianId",
      STATE.as("state"),
    ])
    .where("person.id", "=", id)
    .executeTakeFirst();
  return row ?? null;
}

export interface NewPerson {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly roles: readonly string[];
  readonly at: Date;
}

export async function insertInvitedPerson(
  trx: Transaction<Database>,
  { at, roles, ...person }: NewPerson,
): Promise<void> {
  await trx
    .insertInto("person")
    .values({ ...person, roles: [...roles], invitedAt: at, createdAt: at })
    .execute();
}

export async function markInvited(
  trx: Transaction<Database>,
  personId: string,
  at: Date,
): Promise<void> {
  await trx.updateTable("person").set({ invitedAt: at }).where("id", "=", personId).execute();
}

export async function updatePerson(
  trx: Transaction<Database>,
  id: string,
  changes: { name: string; email: string; roles: readonly string[] },
): Promise<void> {
  await trx
    .updateTable("person")
    .set({ ...changes, roles: [...changes.roles] })
    .where("id", "=", id)
    .execute();
}

/** Switches a person on or off; off ends every session. */
export async function setPersonActive(
  trx: Transaction<Database>,
  id: string,
  active: boolean,
): Promise<void> {
  await trx
    .updateTable("person")
    .set((eb) => ({ active, sessionVersion: eb("sessionVersion", "+", active ? 0 : 1) }))
    .where("id", "=", id)
    .execute();
}

/**
 * Active administrators, locked until the transaction ends: two who each take away the other's
 * role at once must not both succeed.
 */
export async function lockAdministrators(trx: Transaction<Database>): Promise<string[]> {
  const rows = await trx
    .selectFrom("person")
    .select("id")
    .where("active", "=", true)
    .where(sql<SqlBool>`'administrator' = any(roles)`)
    .orderBy("id")
    .forUpdate()
    .execute();
  return rows.map((row) => row.id);
}

export async function hasAdministrator(trx: Transaction<Database>): Promise<boolean> {
  const row = await trx
    .selectFrom("person")
    .select("id")
    .where(sql<SqlBool>`'administrator' = any(roles)`)
    .limit(1)
    .executeTakeFirst();
  return row !== undefined;
}

import { type Kysely, sql, type SqlBool, type Transaction } from "kysely";
import type { Database } from "../client";

export interface Shift {
  /** ISO weekday, Monday 1. */
  readonly weekday: number;
  /** Local times, "HH:MM" or "HH:MM:SS". */
  readonly starts: string;
  readonly ends: string;
  /** Both or none. */
  readonly breakStarts: string | null;
  readonly breakEnds: string | null;
}
export interface Absence {
  readonly id: string;
  readonly technicianId: string;
  readonly firstDay: string;
  readonly lastDay: string;
  readonly reason: string;
}
export interface Technician {
  readonly id: string;
  readonly personId: string;
  readonly crewId: string;
  readonly vanId: string | null;
  readonly tickets: readonly string[];
}

const technicians = (db: Kysely<Database>) =>
  db
    .selectFrom("technician")
    .innerJoin("person", "person.id", "technician.personId")
    .innerJoin("crew", "crew.id", "technician.crewId")
    .leftJoin("van", "van.id", "technician.vanId")
    .select([
      ...(["technician.id", "technician.personId", "technician.crewId"] as const),
      ...(["technician.vanId", "technician.tickets", "person.name", "person.active"] as const),
      ...(["crew.name as crewName", "van.name as vanName"] as const),
    ]);

/** Every technician with crew, van, weekly hours and the absence of that day, if there is one. */
export async function listTechnicians(db: Kysely<Database>, today: string) {
  return technicians(db)
    .select([
      sql<number>`coalesce((select sum(extract(epoch from ends - starts))::int
        from shift where technician_id = technician.id), 0)`.as("weeklyS"),
      sql<string | null>`(select min(first_day)::text from absence
        where technician_id = technician.id and last_day >= ${today}::date)`.as("absentFrom"),
      sql<string | null>`(select last_day::text from absence
        where technician_id = technician.id and last_day >= ${today}::date
        order by first_day limit 1)`.as("absentUntil"),
    ])
    .orderBy("person.active", "desc")
    .orderBy(sql`lower(person.name)`)
    .execute();
}

export async function findTechnician(db: Kysely<Database>, id: string) {
  const row = await technicians(db).where("technician.id", "=", id).executeTakeFirst();
  if (!row) return null;
  const [shifts, absences] = await Promise.all([
    db
      .selectFrom("shift")
      .select(["weekday", "starts", "ends", "breakStarts", "breakEnds"])
      .where("technicianId", "=", id)
      .orderBy("weekday")
      .execute(),
    db
      .selectFrom("absence")
      .select(["id", "technicianId", "firstDay", "lastDay", "reason"])
      .where("technicianId", "=", id)
      .orderBy("firstDay", "desc")
      .execute(),
  ]);
  return { ...row, shifts, absences };
}

/** People with the role technician who belong to no crew yet. */
export async function listPeopleWithoutCrew(db: Kysely<Database>) {
  return db
    .selectFrom("person")
    .leftJoin("technician", "technician.personId", "person.id")
    .select(["person.id", "person.name"])
    .where("technician.id", "is", null)
    .where("person.active", "=", true)
    .where(sql<SqlBool>`'technician' = any(person.roles)`)
    .orderBy(sql`lower(person.name)`)
    .execute();
}

/** Stores a technician and the week's shifts. */
export async function upsertTechnician(
  trx: Transaction<Database>,
  { id, personId, tickets, ...rest }: Technician,
  shifts: readonly Shift[],
): Promise<void> {
  const values = { ...rest, tickets: [...tickets] };
  await trx
    .insertInto("technician")
    .values({ id, personId, ...values })
    .onConflict((conflict) => conflict.column("id").doUpdateSet(values))
    .execute();
  await trx.deleteFrom("shift").where("technicianId", "=", id).execute();
  if (shifts.length === 0) return;
  await trx
    .insertInto("shift")
    .values(shifts.map((shift) => ({ technicianId: id, ...shift })))
    .execute();
}

export async function deleteTechnician(trx: Transaction<Database>, id: string): Promise<boolean> {
  const result = await trx.deleteFrom("technician").where("id", "=", id).executeTakeFirst();
  return result.numDeletedRows > 0n;
}

export async function insertAbsence(trx: Transaction<Database>, absence: Absence): Promise<void> {
  await trx.insertInto("absence").values(absence).execute();
}

/** @returns the absence that was removed, or null */
export async function deleteAbsence(
  trx: Transaction<Database>,
  id: string,
): Promise<Absence | null> {
  const row = await trx
    .deleteFrom("absence")
    .where("id", "=", id)
    .returning(["id", "technicianId", "firstDay", "lastDay", "reason"])
    .executeTakeFirst();
  return row ?? null;
}

/** Rounds of a technician that are still to be driven on these days. */
export async function countRoundsWithin(
  db: Kysely<Database>,
  span: Pick<Absence, "technicianId" | "firstDay" | "lastDay">,
): Promise<number> {
  const row = await db
    .selectFrom("round")
    .select((eb) => eb.fn.countAll<number>().as("count"))
    .where("technicianId", "=", span.technicianId)
    .where("day", ">=", span.firstDay)
    .where("day", "<=", span.lastDay)
    .where("state", "in", ["proposed", "published"])
    .executeTakeFirstOrThrow();
  return row.count;
}

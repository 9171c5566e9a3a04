import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "../client";

export interface Depot {
  readonly id: string;
  readonly name: string;
  readonly latitude: number;
  readonly longitude: number;
}
export interface Crew {
  readonly id: string;
  readonly name: string;
  readonly depotId: string;
}
export interface Van {
  readonly id: string;
  readonly name: string;
  readonly crewId: string;
  /** Cells it can carry; null: no limit. */
  readonly cellCapacity: number | null;
}

/** Depots, crews and vans, each with what hangs on it. */
export async function listCrewsAndVans(db: Kysely<Database>) {
  const [depots, crews, vans] = await Promise.all([
    db
      .selectFrom("depot")
      .leftJoin("crew", "crew.depotId", "depot.id")
      .select((eb) => [
        ...(["depot.id", "depot.name", "depot.latitude", "depot.longitude"] as const),
        eb.fn.count<number>("crew.id").as("crews"),
      ])
      .groupBy("depot.id")
      .orderBy("depot.name")
      .execute(),
    db
      .selectFrom("crew")
      .innerJoin("depot", "depot.id", "crew.depotId")
      .select([
        ...(["crew.id", "crew.name", "crew.depotId", "depot.name as depotName"] as const),
        sql<number>`(select count(*)::int from technician t where t.crew_id = crew.id)`.as(
          "technicians",
        ),
        sql<number>`(select count(*)::int from site s where s.crew_id = crew.id)`.as("sites"),
      ])
      .orderBy("crew.name")
      .execute(),
    db
      .selectFrom("van")
      .innerJoin("crew", "crew.id", "van.crewId")
      .leftJoin("technician", "technician.vanId", "van.id")
      .leftJoin("person", "person.id", "technician.personId")
      .select([
        ...(["van.id", "van.name", "van.crewId", "van.cellCapacity"] as const),
        ...(["crew.name as crewName", "person.name as driver"] as const),
      ])
      .orderBy("van.name")
      .execute(),
  ]);
  return { depots, crews, vans };
}

/** Stores a depot, and makes its stores the first time. */
export async function upsertDepot(
  trx: Transaction<Database>,
  { id, ...values }: Depot,
  newPlaceId: string,
): Promise<void> {
  await trx
    .insertInto("depot")
    .values({ id, ...values })
    .onConflict((conflict) => conflict.column("id").doUpdateSet(values))
    .execute();
  await sql`
    insert into stock_place (id, kind, name, depot_id)
    select ${newPlaceId}::uuid, 'stores', ${`${values.name} stores`}, ${id}::uuid
    where not exists (select 1 from stock_place where kind = 'stores' and depot_id = ${id}::uuid)`.execute(
    trx,
  );
}

/** Removes a depot and its empty places. @returns its name, or null */
export async function deleteDepot(trx: Transaction<Database>, id: string): Promise<string | null> {
  await trx.deleteFrom("stockPlace").where("depotId", "=", id).execute();
  const row = await trx
    .deleteFrom("depot")
    .where("id", "=", id)
    .returning("name")
    .executeTakeFirst();
  return row?.name ?? null;
}

export async function upsertCrew(
  trx: Transaction<Database>,
  { id, ...values }: Crew,
): Promise<void> {
  await trx
    .insertInto("crew")
    .values({ id, ...values })
    .onConflict((conflict) => conflict.column("id").doUpdateSet(values))
    .execute();
}

export async function deleteCrew(trx: Transaction<Database>, id: string): Promise<string | null> {
  const row = await trx
    .deleteFrom("crew")
    .where("id", "=", id)
    .returning("name")
    .executeTakeFirst();
  return row?.name ?? null;
}

/** Stores a van with the place in which its cells are counted. */
export async function upsertVan(
  trx: Transaction<Database>,
  { id, ...values }: Van,
  newPlaceId: string,
): Promise<void> {
  await trx
    .insertInto("van")
    .values({ id, ...values })
    .onConflict((conflict) => conflict.column("id").doUpdateSet(values))
    .execute();
  await trx
    .insertInto("stockPlace")
    .values({ id: newPlaceId, kind: "van", name: values.name, vanId: id })
    .onConflict((conflict) => conflict.column("vanId").doUpdateSet({ name: values.name }))
    .execute();
}

/** Removes a van whose place never held a cell. @returns its name, or null */
export async function deleteVan(trx: Transaction<Database>, id: string): Promise<string | null> {
  await trx.deleteFrom("stockPlace").where("vanId", "=", id).execute();
  const row = await trx.deleteFrom("van").where("id", "=", id).returning("name").executeTakeFirst();
  return row?.name ?? null;
}

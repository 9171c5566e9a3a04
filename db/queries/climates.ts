import type { Kysely, Transaction } from "kysely";
import type { Database } from "../client";

export interface Climate {
  readonly id: string;
  readonly name: string;
  /** January first, tenths of a degree Celsius. */
  readonly monthlyMeanDc: readonly number[];
}

/** Every climate with how many sites follow it. */
export async function listClimatesWithSites(db: Kysely<Database>) {
  return db
    .selectFrom("climate")
    .leftJoin("site", "site.climateId", "climate.id")
    .select((eb) => [
      ...(["climate.id", "climate.name", "climate.monthlyMeanDc"] as const),
      eb.fn.count<number>("site.id").as("sites"),
    ])
    .groupBy("climate.id")
    .orderBy("climate.name")
    .execute();
}

export async function upsertClimate(trx: Transaction<Database>, climate: Climate): Promise<void> {
  const { id, name } = climate;
  const values = { name, monthlyMeanDc: [...climate.monthlyMeanDc] };
  await trx
    .insertInto("climate")
    .values({ id, ...values })
    .onConflict((conflict) => conflict.column("id").doUpdateSet(values))
    .execute();
}

/** @returns the name of the climate that was removed, or null */
export async function deleteClimate(
  trx: Transaction<Database>,
  id: string,
): Promise<string | null> {
  const row = await trx
    .deleteFrom("climate")
    .where("id", "=", id)
    .returning("name")
    .executeTakeFirst();
  return row?.name ?? null;
}

/** Packs in service at sites that follow a climate. */
export async function packsInClimate(trx: Transaction<Database>, id: string): Promise<string[]> {
  const rows = await trx
    .selectFrom("pack")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .innerJoin("site", "site.id", "asset.siteId")
    .select("pack.id")
    .where("site.climateId", "=", id)
    .where("pack.removedAt", "is", null)
    .execute();
  return rows.map((row) => row.id);
}

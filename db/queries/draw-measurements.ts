import type { Kysely, Transaction } from "kysely";
import type { Database } from "../client";

export interface NewDrawMeasurement {
  readonly id: string;
  readonly assetId: string;
  readonly at: Date;
  readonly averageUa: number;
  readonly peakUa: number | null;
  readonly method: string;
  readonly personId: string | null;
}

/** @returns false when a measurement with this id exists already */
export async function insertDrawMeasurement(
  trx: Transaction<Database>,
  measurement: NewDrawMeasurement,
): Promise<boolean> {
  const row = await trx
    .insertInto("drawMeasurement")
    .values(measurement)
    .onConflict((conflict) => conflict.column("id").doNothing())
    .returning("id")
    .executeTakeFirst();
  return row !== undefined;
}

/** Measured draws of an asset, newest first. */
export async function listDrawMeasurements(db: Kysely<Database>, assetId: string) {
  return db
    .selectFrom("drawMeasurement")
    .leftJoin("person", "person.id", "drawMeasurement.personId")
    .select([
      "drawMeasurement.id",
      "drawMeasurement.at",
      "drawMeasurement.averageUa",
      "drawMeasurement.peakUa",
      "drawMeasurement.method",
      "person.name as personName",
    ])
    .where("assetId", "=", assetId)
    .orderBy("at", "desc")
    .execute();
}

import type { Kysely } from "kysely";
import type { Database } from "../client";

/** What a stored forecast says about one reading (the words of the battery core). */
export interface StoredWeight {
  readonly readingId: string;
  readonly weight: number;
  readonly expectedMv: number;
  readonly expectedLowMv: number;
  readonly expectedHighMv: number;
  readonly reason: string;
}

export interface StoredBasis {
  readonly restingReadings?: number;
  readonly loadedReadings?: number;
  readonly doubtfulReadings?: number;
  readonly measuredDraw?: boolean;
  readonly fleetPacks?: number;
}

/** The forecast that stands for a pack, or null. */
export async function findStandingForecast(db: Kysely<Database>, packId: string) {
  const row = await db
    .selectFrom("forecast")
    .selectAll()
    .where("packId", "=", packId)
    .executeTakeFirst();
  if (!row) return null;
  const { weights, basis, ...rest } = row;
  return {
    ...rest,
    weights: (Array.isArray(weights) ? weights : []) as unknown as StoredWeight[],
    basis: (basis ?? {}) as StoredBasis,
  };
}

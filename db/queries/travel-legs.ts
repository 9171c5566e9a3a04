import { type Kysely, sql } from "kysely";
import type { Database } from "../client";

export interface TravelLeg {
  readonly fromPoint: string;
  readonly toPoint: string;
  readonly seconds: number;
  readonly metres: number;
}

/** Legs between these points that a service answered after a moment. */
export async function loadTravelLegs(
  db: Kysely<Database>,
  sourceUrl: string,
  points: readonly string[],
  since: Date,
): Promise<TravelLeg[]> {
  return db
    .selectFrom("travelLeg")
    .select(["fromPoint", "toPoint", "seconds", "metres"])
    .where("sourceUrl", "=", sourceUrl)
    .where("fromPoint", "=", sql<string>`any(${points}::text[])`)
    .where("toPoint", "=", sql<string>`any(${points}::text[])`)
    .where("fetchedAt", ">=", since)
    .execute();
}

/** Keeps answered legs; a newer answer takes the place of an older one. */
export async function saveTravelLegs(
  db: Kysely<Database>,
  sourceUrl: string,
  legs: readonly TravelLeg[],
  fetchedAt: Date,
): Promise<void> {
  if (legs.length === 0) return;
  const rows = JSON.stringify(legs);
  await sql`insert into travel_leg (source_url, from_point, to_point, seconds, metres, fetched_at)
    select ${sourceUrl}, l."fromPoint", l."toPoint", l.seconds, l.metres, ${fetchedAt}
    from jsonb_to_recordset(${rows}::jsonb)
      as l("fromPoint" text, "toPoint" text, seconds integer, metres integer)
    on conflict (source_url, from_point, to_point) do update
      set seconds = excluded.seconds, metres = excluded.metres, fetched_at = excluded.fetched_at`.execute(
    db,
  );
}

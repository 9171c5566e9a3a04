import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import { loadTravelLegs, saveTravelLegs, type TravelLeg } from "@/db/queries/travel-legs";
import { MS_PER_DAY } from "@/lib/units";

/** Legs that a travel service answered, kept beyond this process. Points are "lon,lat". */
export interface LegStore {
  load(url: string, points: readonly string[]): Promise<readonly TravelLeg[]>;
  save(url: string, legs: readonly TravelLeg[]): Promise<void>;
}

/** Answered legs are good for this long: roads change seldom. */
const KEPT_DAYS = 30;

/** Legs kept in the database, shared by every process. */
export function storedLegs(db: Kysely<Database>, now: () => Date): LegStore {
  return {
    load: (url, points) =>
      loadTravelLegs(db, url, points, new Date(now().getTime() - KEPT_DAYS * MS_PER_DAY)),
    save: (url, legs) => saveTravelLegs(db, url, legs, now()),
  };
}

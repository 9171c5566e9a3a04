import type { PointOnEarth, TravelTable } from "@/lib/planning/fleet";
import { greatCircleTable } from "@/lib/planning/travel";
import type { Organisation } from "@/db/queries/organisation";
import type { Deps } from "./use-case";

/** Where driving times came from, said on screen. */
export interface TravelSource {
  readonly kind: "table_service" | "great_circle";
  /** Why the service that is set was not used; null when it was, or when none is set. */
  readonly trouble: string | null;
}

export interface TravelTimes {
  readonly table: TravelTable;
  readonly source: TravelSource;
}

/**
 * Driving times between all places: from the organisation's table service where one is set and
 * answers, else by the great circle with the organisation's detour factor and speed.
 */
export async function travelTimes(
  deps: Pick<Deps, "travel">,
  organisation: Organisation,
  places: readonly PointOnEarth[],
): Promise<TravelTimes> {
  const road = { detourFactor: organisation.detourFactor, speedKmh: organisation.roadSpeedKmh };
  const byCircle = (trouble: string | null): TravelTimes => ({
    table: greatCircleTable(places, road),
    source: { kind: "great_circle", trouble },
  });
  const url = organisation.travelTableUrl;
  if (!url || !deps.travel) return byCircle(null);
  const answer = await deps.travel.table(url, places);
  if (!answer.ok) return byCircle(answer.reason);
  return { table: answer.table, source: { kind: "table_service", trouble: null } };
}

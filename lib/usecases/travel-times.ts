import type { PointOnEarth, TravelTable } from "@/lib/planning/fleet";
import { roadTable } from "@/lib/planning/road-graph";
import { greatCircleTable } from "@/lib/planning/travel";
import type { Organisation } from "@/db/queries/organisation";
import { ownRoads } from "./own-roads";
import type { Deps } from "./use-case";

/** Where driving times came from, said on screen. */
export interface TravelSource {
  readonly kind: "table_service" | "own_roads" | "great_circle";
  /** Why what is set was not used, or only the next best; null when all is as it was set. */
  readonly trouble: string | null;
}

export interface TravelTimes {
  readonly table: TravelTable;
  readonly source: TravelSource;
}

/**
 * Driving times between all places: from the organisation's table service where one is set and
 * answers, else on its own roads where they reach every place, else by the great circle with the
 * organisation's detour factor and speed.
 */
export async function travelTimes(
  deps: Pick<Deps, "travel" | "db">,
  organisation: Organisation,
  places: readonly PointOnEarth[],
): Promise<TravelTimes> {
  const url = organisation.travelTableUrl;
  if (!url || !deps.travel) return withoutService(deps, organisation, places, null);
  const answer = await deps.travel.table(url, places);
  if (!answer.ok) return withoutService(deps, organisation, places, answer.reason);
  return { table: answer.table, source: { kind: "table_service", trouble: null } };
}

async function withoutService(
  deps: Pick<Deps, "db">,
  organisation: Organisation,
  places: readonly PointOnEarth[],
  trouble: string | null,
): Promise<TravelTimes> {
  const roads = await ownRoads(deps.db, organisation);
  const driven = roads && roadTable(roads, places);
  if (driven) return { table: driven, source: { kind: "own_roads", trouble } };
  const beyond = roads ? "a site lies off the organisation's own roads" : null;
  const road = { detourFactor: organisation.detourFactor, speedKmh: organisation.roadSpeedKmh };
  return {
    table: greatCircleTable(places, road),
    source: { kind: "great_circle", trouble: trouble ?? beyond },
  };
}

import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import type { Organisation } from "@/db/queries/organisation";
import { listRoads } from "@/db/queries/roads";
import { type RoadGraph, roadGraph } from "@/lib/planning/road-graph";

/** The graph last built, with the moment its roads were set: pricing an act must not rebuild it. */
let latest: { readonly setAt: number; readonly graph: RoadGraph } | null = null;

/** The organisation's own road graph; null when it has no roads of its own. */
export async function ownRoads(
  db: Kysely<Database>,
  { roadsSetAt }: Pick<Organisation, "roadsSetAt">,
): Promise<RoadGraph | null> {
  if (!roadsSetAt) return null;
  if (latest?.setAt === roadsSetAt.getTime()) return latest.graph;
  const roads = await listRoads(db);
  if (roads.length === 0) return null;
  const graph = roadGraph(
    roads.map(({ line, ...road }) => ({
      ...road,
      line: line.map(([longitude, latitude]) => ({ latitude, longitude })),
    })),
  );
  latest = { setAt: roadsSetAt.getTime(), graph };
  return graph;
}

import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { type RoadRecord, replaceRoads } from "@/db/queries/roads";
import { invalid } from "@/lib/errors";
import { defineUseCase } from "./use-case";

const position = z.tuple([z.number().min(-180).max(180), z.number().min(-90).max(90)]);
const roadFeature = z.object({
  properties: z.object({ id: z.coerce.string().min(1), kmh: z.number().int().min(1).max(130) }),
  geometry: z.object({
    type: z.literal("LineString"),
    coordinates: z.array(position).min(2, "a road has two ends"),
  }),
});
const feature = z.looseObject({
  geometry: z.looseObject({ type: z.string() }).nullable(),
  properties: z.record(z.string(), z.unknown()).nullable(),
});

/**
 * Sets the organisation's own roads from GeoJSON (RFC 7946): every LineString with a `kmh` is a
 * road, with an `id` of its own; all else is passed over. An empty collection takes them away.
 */
export const setOwnRoads = defineUseCase({
  name: "set-own-roads",
  allow: { system: true },
  input: z.object({ collection: z.object({ features: z.array(feature) }) }),
  async run(deps, _actor, { collection }): Promise<{ roads: number }> {
    const roads = collection.features.flatMap(roadsOf);
    const twice = roads.find((road, i) => roads.findIndex((r) => r.id === road.id) !== i);
    if (twice) throw invalid(`The road id ${twice.id} is there twice; give each road its own.`);
    await deps.db.transaction().execute(async (trx) => {
      await replaceRoads(trx, roads, deps.now());
      await appendAudit(trx, {
        at: deps.now(),
        personId: null,
        act: "set-own-roads",
        subjectKind: "organisation",
        subjectId: null,
        detail: { roads: roads.length },
      });
    });
    return { roads: roads.length };
  },
});

function roadsOf(given: z.output<typeof feature>, at: number): RoadRecord[] {
  if (given.geometry?.type !== "LineString" || given.properties?.kmh === undefined) return [];
  const road = roadFeature.safeParse(given);
  if (!road.success) {
    const { path, message } = road.error.issues[0]!;
    throw invalid(`Feature ${at + 1}, ${path.join(".")}: ${message}.`);
  }
  const { properties, geometry } = road.data;
  return [{ id: properties.id, speedKmh: properties.kmh, line: geometry.coordinates }];
}

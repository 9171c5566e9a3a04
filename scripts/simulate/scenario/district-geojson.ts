import type { District } from "./district";
import { type Point, toWgs84 } from "./geometry";
import { ROAD_SPEED_KMH } from "./roads";
import { MERE } from "./water";

type Position = [number, number];

interface Feature {
  readonly type: "Feature";
  readonly properties: Readonly<Record<string, string | number | boolean>>;
  readonly geometry:
    | { readonly type: "Point"; readonly coordinates: Position }
    | { readonly type: "LineString"; readonly coordinates: Position[] }
    | { readonly type: "Polygon"; readonly coordinates: Position[][] };
}

export interface DistrictCollection {
  readonly type: "FeatureCollection";
  readonly features: readonly Feature[];
}

function position(p: Point): Position {
  const { latitude, longitude } = toWgs84(p);
  return [longitude, latitude];
}

function point(at: Point, properties: Feature["properties"]): Feature {
  return { type: "Feature", properties, geometry: { type: "Point", coordinates: position(at) } };
}

function line(points: readonly Point[], properties: Feature["properties"]): Feature {
  const geometry = { type: "LineString", coordinates: points.map(position) } as const;
  return { type: "Feature", properties, geometry };
}

function polygon(ring: readonly Point[], properties: Feature["properties"]): Feature {
  const geometry = { type: "Polygon" as const, coordinates: [ring.map(position)] };
  return { type: "Feature", properties, geometry };
}

/**
 * The district as GeoJSON (RFC 7946). Every feature has `kind`: field, mere, river, drain,
 * road, junction, village, pump_house or depot. Roads are the edges of a graph: `from` and
 * `to` name junctions, `metres` is the length, `kmh` what a van makes on that class.
 */
export function districtGeoJson(d: District): DistrictCollection {
  const features = [
    ...d.fields.map((f) => polygon(f.ring, { kind: "field", crop: f.crop })),
    polygon(d.mere, { kind: "mere", name: MERE.name }),
    line(d.river, { kind: "river", name: "River Quill" }),
    ...d.drains.map((s) => line(s.line, { kind: "drain", class: s.class, name: s.name })),
    ...d.roads.roads.map((r) =>
      line(r.line, {
        kind: "road",
        id: r.id,
        class: r.class,
        from: r.from,
        to: r.to,
        metres: r.metres,
        kmh: ROAD_SPEED_KMH[r.class],
        bridge: r.bridge,
      }),
    ),
    ...d.roads.junctions.map((j) => point(j.at, { kind: "junction", id: j.id })),
    ...d.villages.map((v) => polygon(v.ring, { kind: "village", name: v.name })),
    ...d.pumpHouses.map((p) => point(p.at, { kind: "pump_house", name: p.name })),
    ...d.depots.map((p) => point(p.at, { kind: "depot", name: p.name })),
  ];
  return { type: "FeatureCollection", features };
}

import { readFileSync, statSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { describe, expect, it } from "vitest";
import { drawDistrict } from "@/scripts/simulate/scenario/district";
import { districtGeoJson } from "@/scripts/simulate/scenario/district-geojson";

const path = fileURLToPath(new URL("../../../public/district.geojson", import.meta.url));
const shipped = JSON.parse(readFileSync(path, "utf8"));
const district = drawDistrict();

/** Great-circle length on a sphere of mean radius 6,371,008.8 m (IUGG 1980). */
function greatCircle([lon1, lat1]: number[], [lon2, lat2]: number[]): number {
  const rad = Math.PI / 180;
  const [a, b] = [lat1! * rad, lat2! * rad];
  const h =
    Math.sin((b - a) / 2) ** 2 +
    Math.cos(a) * Math.cos(b) * Math.sin(((lon2! - lon1!) * rad) / 2) ** 2;
  return 2 * 6_371_008.8 * Math.asin(Math.sqrt(h));
}

describe("the shipped district", () => {
  it("is what the generator draws, and small enough to send to a phone", () => {
    expect(shipped).toEqual(districtGeoJson(district));
    expect(statSync(path).size).toBeLessThan(600_000);
  });

  // RFC 7946: section 3.1.6 wants rings closed; section 4 wants longitude before latitude.
  it("is GeoJSON as RFC 7946 has it, in open sea around 53.9 N, 1.9 E", () => {
    expect(shipped.type).toBe("FeatureCollection");
    for (const { type, geometry } of shipped.features) {
      expect(type).toBe("Feature");
      for (const [longitude, latitude] of geometry.coordinates
        .flat(Infinity)
        .reduce(
          (pairs: number[][], n: number, i: number) => (
            i % 2 ? pairs.at(-1)!.push(n) : pairs.push([n]),
            pairs
          ),
          [],
        )) {
        expect(longitude).toBeGreaterThan(1.6);
        expect(longitude).toBeLessThan(2.2);
        expect(latitude).toBeGreaterThan(53.75);
        expect(latitude).toBeLessThan(54.05);
      }
      if (geometry.type !== "Polygon") continue;
      for (const ring of geometry.coordinates) expect(ring.at(-1)).toEqual(ring[0]);
    }
  });

  it("holds every kind of feature the maps draw", () => {
    const kinds = new Set(
      shipped.features.map((f: { properties: { kind: string } }) => f.properties.kind),
    );
    expect([...kinds].sort()).toEqual(
      [
        "depot",
        "drain",
        "field",
        "junction",
        "mere",
        "pump_house",
        "river",
        "road",
        "village",
      ].sort(),
    );
  });

  it("has roads that form one graph, over three bridges", () => {
    const { junctions, roads } = district.roads;
    const near = new Map<string, string[]>(junctions.map((j) => [j.id, []]));
    for (const r of roads) {
      near.get(r.from)!.push(r.to);
      near.get(r.to)!.push(r.from);
    }
    const reached = new Set<string>();
    const queue = [junctions[0]!.id];
    for (let id = queue.pop(); id !== undefined; id = queue.pop()) {
      if (reached.has(id)) continue;
      reached.add(id);
      queue.push(...near.get(id)!);
    }
    expect(reached.size).toBe(junctions.length);
    expect(roads.filter((r) => r.bridge)).toHaveLength(3);
  });

  // The lengths are plane lengths; against the great circle they must agree within the flattening.
  it("says of each road how long it is, as the crow would measure it along its line", () => {
    for (const { properties, geometry } of shipped.features) {
      if (properties.kind !== "road") continue;
      const line: number[][] = geometry.coordinates;
      const metres = line.slice(1).reduce((sum, p, i) => sum + greatCircle(line[i]!, p), 0);
      expect(Math.abs(properties.metres / metres - 1)).toBeLessThan(0.01);
    }
  });
});

import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type Road, roadGraph, roadTable } from "@/lib/planning/road-graph";
import { greatCircleM } from "@/lib/planning/travel";

const at = (north: number, east: number) => ({
  latitude: 52.5 + north / 100,
  longitude: 0.1 + east / 100,
});
const road = (id: string, speedKmh: number, ...line: Road["line"]): Road => ({
  id,
  speedKmh,
  line,
});
/** Places right on the ends of roads, so that only driving counts. */
const seconds = (metres: number, kmh: number) => (metres * 3.6) / kmh;

describe("driving on own roads", () => {
  // A triangle: the straight lane is shorter, the way round over two fast roads is quicker.
  const [a, b, c] = [at(0, 0), at(0, 3), at(2, 1.5)];
  const graph = roadGraph([road("lane", 20, a, b), road("up", 80, a, c), road("down", 80, c, b)]);

  it("takes the quickest way, and tells its own length", () => {
    const table = roadTable(graph, [a, b])!;
    const round = greatCircleM(a, c) + greatCircleM(c, b);
    expect(table.metres[1]).toBeCloseTo(round, -1);
    expect(table.seconds[1]).toBeCloseTo(seconds(round, 80), 0);
    expect(table.metres[1]).toBeGreaterThan(greatCircleM(a, b));
    expect(table.seconds[1]).toBeLessThan(seconds(greatCircleM(a, b), 20));
  });

  it("drives along one road between two places on it", () => {
    const [left, right] = [at(0, 1), at(0, 1.4)];
    const table = roadTable(graph, [left, right])!;
    expect(table.metres[1]).toBeCloseTo(greatCircleM(left, right), -1);
    expect(table.seconds[1]).toBeCloseTo(seconds(greatCircleM(left, right), 20), 0);
  });

  it("adds the track from the road to a place beside it", () => {
    // A hundredth of a degree of latitude is 1112 m on the mean sphere.
    const table = roadTable(graph, [at(-1, 1), at(0, 1)])!;
    expect(table.metres[1]).toBeCloseTo(1112, -1);
    expect(table.seconds[1]).toBeCloseTo(seconds(1112, 15), -1);
  });

  it("answers nothing where a place lies off the map, or no road joins two", () => {
    expect(roadTable(graph, [a, at(60, 60)])).toBeNull();
    const apart = roadGraph([road("here", 50, a, b), road("there", 50, at(9, 9), at(9, 12))]);
    expect(roadTable(apart, [a, at(9, 9)])).toBeNull();
  });

  it("refuses a road without ends or speed", () => {
    expect(() => roadGraph([road("stub", 50, a)])).toThrow("road stub has no two ends");
    expect(() => roadGraph([road("still", 0, a, b)])).toThrow("road still has no speed");
  });

  it("equals Floyd and Warshall's tables (1962) on random nets", () => {
    const net = fc.array(
      fc.tuple(fc.nat(7), fc.nat(7), fc.integer({ min: 10, max: 90 })).filter(([i, j]) => i !== j),
      { minLength: 3, maxLength: 20 },
    );
    const towns = Array.from({ length: 8 }, (_, i) => at((i * 5) % 8, (i * 3) % 7));
    fc.assert(
      fc.property(net, (edges) => {
        const roads = edges.map(([i, j, kmh], n) => road(`r${n}`, kmh, towns[i]!, towns[j]!));
        const graph = roadGraph(roads);
        const best = towns.map((_, i) => towns.map((_, j) => (i === j ? 0 : Infinity)));
        for (const [i, j, kmh] of edges) {
          const s = seconds(greatCircleM(towns[i]!, towns[j]!), kmh);
          best[i]![j] = best[j]![i] = Math.min(best[i]![j]!, s);
        }
        for (let k = 0; k < 8; k++)
          for (let i = 0; i < 8; i++)
            for (let j = 0; j < 8; j++)
              best[i]![j] = Math.min(best[i]![j]!, best[i]![k]! + best[k]![j]!);
        const key = (n: number) =>
          `${towns[n]!.latitude.toFixed(5)},${towns[n]!.longitude.toFixed(5)}`;
        for (const [from] of edges) {
          for (let to = 0; to < 8; to++) {
            const way = graph.way(key(from), key(to));
            expect(way?.seconds ?? Infinity).toBeCloseTo(best[from]![to]!, 6);
          }
        }
      }),
      { numRuns: 60 },
    );
  });
});

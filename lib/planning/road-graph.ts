/**
 * Driving on a road graph of the organisation's own: places join the nearest road, the quickest
 * way between its ends is Dijkstra's (1959), by a library. Roads are few thousand at most; for a
 * country there is the table service.
 */
import { alg, Graph } from "@dagrejs/graphlib";
import type { Metres, Seconds } from "@/lib/units";
import type { PointOnEarth, TravelTable } from "./fleet";
import { greatCircleM } from "./travel";

/** One road, driven both ways; roads meet where their ends have the same coordinates. */
export interface Road {
  readonly id: string;
  /** From end to end. */
  readonly line: readonly PointOnEarth[];
  readonly speedKmh: number;
}

/** From the road to the gate: a track. Common practice, no source. */
const TRACK_KMH = 15;
/** A place further from every road than this does not lie on this map. */
const OFF_THE_MAP_M = 5_000;

interface Way {
  readonly seconds: Seconds;
  readonly metres: Metres;
}

interface Joint extends Way {
  readonly junction: string;
}

/** Where a place joins the graph. */
interface Access {
  readonly road: Road;
  /** From the place over the track to the road. */
  readonly track: Way;
  /** Along the road from its first end. */
  readonly alongM: Metres;
  readonly joints: readonly Joint[];
}

export interface RoadGraph {
  readonly roads: readonly Road[];
  /** The quickest way from one junction to another; null where there is none. */
  readonly way: (from: string, to: string) => Way | null;
}

const junctionAt = ({ latitude, longitude }: PointOnEarth) =>
  `${latitude.toFixed(5)},${longitude.toFixed(5)}`;

const driven = (metres: Metres, speedKmh: number): Seconds => (metres * 3.6) / speedKmh;

function lengthOf(line: readonly PointOnEarth[]): Metres {
  return line.slice(1).reduce((sum, point, i) => sum + greatCircleM(line[i]!, point), 0);
}

/**
 * Builds the graph. Ways from a junction are worked out when they are first asked for and kept.
 * @throws RangeError when a road has fewer than two points or no speed
 */
export function roadGraph(roads: readonly Road[]): RoadGraph {
  const graph = new Graph({ directed: false, multigraph: true });
  for (const { id, line, speedKmh } of roads) {
    const [first, last] = [line[0], line.at(-1)];
    if (!first || !last || line.length < 2) throw new RangeError(`road ${id} has no two ends`);
    if (!(speedKmh > 0)) throw new RangeError(`road ${id} has no speed`);
    const metres = lengthOf(line);
    const way: Way = { metres, seconds: driven(metres, speedKmh) };
    graph.setEdge(junctionAt(first), junctionAt(last), way, id);
  }
  const found = new Map<string, Map<string, Way>>();
  const waysFrom = (from: string) => {
    const known = found.get(from) ?? quickestFrom(graph, from);
    found.set(from, known);
    return known;
  };
  return { roads, way: (from, to) => waysFrom(from).get(to) ?? null };
}

/** The quickest way to every junction that can be reached, with its length. */
function quickestFrom(graph: Graph, from: string): Map<string, Way> {
  const edgeWay = (edge: { v: string; w: string; name?: string }) => graph.edge(edge) as Way;
  const paths = alg.dijkstra(
    graph,
    from,
    (edge) => edgeWay(edge).seconds,
    (junction) => graph.nodeEdges(junction) ?? [],
  );
  const ways = new Map<string, Way>([[from, { seconds: 0, metres: 0 }]]);
  // Nearest first, so that the way to the junction before is known already.
  const reached = Object.entries(paths).filter(([, path]) => Number.isFinite(path.distance));
  for (const [junction, { distance, predecessor }] of reached.sort(
    ([, a], [, b]) => a.distance - b.distance,
  )) {
    if (junction === from) continue;
    const between = (graph.nodeEdges(junction, predecessor) ?? []).map(edgeWay);
    const last = between.reduce((best, way) => (way.seconds < best.seconds ? way : best));
    const before = ways.get(predecessor)!;
    ways.set(junction, { seconds: distance, metres: before.metres + last.metres });
  }
  return ways;
}

/** The foot of the perpendicular from a place on a stretch, on the plane that touches there. */
function footOn(place: PointOnEarth, a: PointOnEarth, b: PointOnEarth): PointOnEarth {
  const shrink = Math.cos((place.latitude * Math.PI) / 180);
  const [bx, by] = [(b.longitude - a.longitude) * shrink, b.latitude - a.latitude];
  const [px, py] = [(place.longitude - a.longitude) * shrink, place.latitude - a.latitude];
  const square = bx * bx + by * by;
  const part = square === 0 ? 0 : Math.min(1, Math.max(0, (px * bx + py * by) / square));
  return {
    latitude: a.latitude + part * (b.latitude - a.latitude),
    longitude: a.longitude + part * (b.longitude - a.longitude),
  };
}

/** Where a place joins the nearest road; null when it lies off the map. */
function accessOf(place: PointOnEarth, roads: readonly Road[]): Access | null {
  let nearest: { road: Road; trackM: Metres; alongM: Metres } | null = null;
  for (const road of roads) {
    let passedM = 0;
    for (let i = 1; i < road.line.length; i++) {
      const [a, b] = [road.line[i - 1]!, road.line[i]!];
      const foot = footOn(place, a, b);
      const trackM = greatCircleM(place, foot);
      if (trackM < (nearest?.trackM ?? OFF_THE_MAP_M)) {
        nearest = { road, trackM, alongM: passedM + greatCircleM(a, foot) };
      }
      passedM += greatCircleM(a, b);
    }
  }
  if (!nearest) return null;
  const { road, trackM, alongM } = nearest;
  const track: Way = { metres: trackM, seconds: driven(trackM, TRACK_KMH) };
  const joint = (end: PointOnEarth, metres: Metres): Joint => ({
    junction: junctionAt(end),
    metres: trackM + metres,
    seconds: track.seconds + driven(metres, road.speedKmh),
  });
  const joints = [
    joint(road.line[0]!, alongM),
    joint(road.line.at(-1)!, Math.max(0, lengthOf(road.line) - alongM)),
  ];
  return { road, track, alongM, joints };
}

/** The quickest way between two places that lie on the map. */
function wayBetween(graph: RoadGraph, from: Access, to: Access): Way | null {
  const ways: Way[] = [];
  if (from.road === to.road) {
    const metres = Math.abs(from.alongM - to.alongM);
    ways.push({
      metres: metres + from.track.metres + to.track.metres,
      seconds: driven(metres, from.road.speedKmh) + from.track.seconds + to.track.seconds,
    });
  }
  for (const out of from.joints) {
    for (const back of to.joints) {
      const way = graph.way(out.junction, back.junction);
      if (!way) continue;
      ways.push({
        metres: out.metres + way.metres + back.metres,
        seconds: out.seconds + way.seconds + back.seconds,
      });
    }
  }
  if (ways.length === 0) return null;
  return ways.reduce((best, way) => (way.seconds < best.seconds ? way : best));
}

const samePlace = (a: PointOnEarth, b: PointOnEarth) =>
  a.latitude === b.latitude && a.longitude === b.longitude;

/**
 * Square tables of driving seconds and metres between all the places. Null when a place lies more
 * than 5 km from every road, or two cannot reach each other: then the map does not cover them.
 */
export function roadTable(graph: RoadGraph, places: readonly PointOnEarth[]): TravelTable | null {
  const accesses = places.map((place) => accessOf(place, graph.roads));
  const n = places.length;
  const seconds = new Int32Array(n * n);
  const metres = new Int32Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < i; j++) {
      const [a, b] = [accesses[i], accesses[j]];
      const way = a && b && wayBetween(graph, a, b);
      if (!way) return null;
      if (samePlace(places[i]!, places[j]!)) continue;
      metres[i * n + j] = metres[j * n + i] = Math.round(way.metres);
      seconds[i * n + j] = seconds[j * n + i] = Math.round(way.seconds);
    }
  }
  return { seconds, metres };
}

/**
 * Driving by the great circle: sphere distance times a detour factor over a mean speed. Used where
 * no travel service is configured or answers. The radius is the mean radius of the Earth
 * (IUGG, 6 371 008.8 m).
 */
import type { Metres } from "@/lib/units";
import type { PointOnEarth, TravelTable } from "./fleet";

const EARTH_RADIUS_M = 6_371_008.8;

/** Great-circle distance by the haversine formula. */
export function greatCircleM(a: PointOnEarth, b: PointOnEarth): Metres {
  const rad = Math.PI / 180;
  const half = (from: number, to: number) => Math.sin(((to - from) * rad) / 2) ** 2;
  const h =
    half(a.latitude, b.latitude) +
    Math.cos(a.latitude * rad) * Math.cos(b.latitude * rad) * half(a.longitude, b.longitude);
  return 2 * EARTH_RADIUS_M * Math.asin(Math.min(1, Math.sqrt(h)));
}

export interface RoadAssumption {
  /** Road distance over great-circle distance, at least 1. */
  readonly detourFactor: number;
  readonly speedKmh: number;
}

/** Square tables of driving seconds and metres between all the places. */
export function greatCircleTable(
  places: readonly PointOnEarth[],
  road: RoadAssumption,
): TravelTable {
  const n = places.length;
  const seconds = new Int32Array(n * n);
  const metres = new Int32Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < i; j++) {
      const roadM = greatCircleM(places[i]!, places[j]!) * road.detourFactor;
      metres[i * n + j] = metres[j * n + i] = Math.round(roadM);
      seconds[i * n + j] = seconds[j * n + i] = Math.round((roadM * 3.6) / road.speedKmh);
    }
  }
  return { seconds, metres };
}

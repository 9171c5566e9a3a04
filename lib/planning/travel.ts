/**
 * Driving by the great circle: sphere distance times a detour factor over a mean speed. Used where
 * no travel service is configured or answers. The radius is the mean radius of the Earth
 * (IUGG, 6 371 008.8 m).
 */
import type { Metres } from "@/lib/units";
import type { PointOnEarth, TravelTable } from "./fleet";

const EARTH_RADIUS_M = 6_371_008.8;

const RADIAN = Math.PI / 180;

/** Haversine formula, from latitudes and longitudes in radians and the latitudes' cosines. */
function arcM(lat: number, lon: number, cos: number, lat2: number, lon2: number, cos2: number) {
  const across = Math.sin((lat2 - lat) / 2);
  const along = Math.sin((lon2 - lon) / 2);
  const h = across * across + cos * cos2 * along * along;
  return 2 * EARTH_RADIUS_M * Math.asin(Math.min(1, Math.sqrt(h)));
}

/** Great-circle distance. */
export function greatCircleM(a: PointOnEarth, b: PointOnEarth): Metres {
  const [lat, lat2] = [a.latitude * RADIAN, b.latitude * RADIAN];
  const [lon, lon2] = [a.longitude * RADIAN, b.longitude * RADIAN];
  return arcM(lat, lon, Math.cos(lat), lat2, lon2, Math.cos(lat2));
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
  const lat = Float64Array.from(places, (place) => place.latitude * RADIAN);
  const lon = Float64Array.from(places, (place) => place.longitude * RADIAN);
  const cos = lat.map(Math.cos);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < i; j++) {
      const straightM = arcM(lat[i]!, lon[i]!, cos[i]!, lat[j]!, lon[j]!, cos[j]!);
      const roadM = straightM * road.detourFactor;
      metres[i * n + j] = metres[j * n + i] = Math.round(roadM);
      seconds[i * n + j] = seconds[j * n + i] = Math.round((roadM * 3.6) / road.speedKmh);
    }
  }
  return { seconds, metres };
}

/** Plane geometry of the district in metres from its south-west corner. */
export interface Point {
  readonly x: number;
  readonly y: number;
}

export type Line = readonly Point[];

/** The district's size. It lies in open sea on purpose: no real place is meant. */
export const DISTRICT_WIDTH_M = 30_000;
export const DISTRICT_HEIGHT_M = 25_000;

const ORIGIN = { latitude: 53.79, longitude: 1.67 };
const METRES_PER_DEGREE_LATITUDE = 111_320;
const MIDDLE_LATITUDE = 53.9;
const METRES_PER_DEGREE_LONGITUDE =
  METRES_PER_DEGREE_LATITUDE * Math.cos((MIDDLE_LATITUDE * Math.PI) / 180);

/** To WGS 84, five decimals (about a metre). */
export function toWgs84(p: Point): { readonly latitude: number; readonly longitude: number } {
  const round = (degrees: number): number => Math.round(degrees * 1e5) / 1e5;
  return {
    latitude: round(ORIGIN.latitude + p.y / METRES_PER_DEGREE_LATITUDE),
    longitude: round(ORIGIN.longitude + p.x / METRES_PER_DEGREE_LONGITUDE),
  };
}

export function distance(a: Point, b: Point): number {
  return Math.hypot(a.x - b.x, a.y - b.y);
}

export function lineLength(line: Line): number {
  return line.slice(1).reduce((sum, p, i) => sum + distance(line[i] as Point, p), 0);
}

/** The point at `metres` along a line (its end when that is beyond it). */
export function pointAlong(line: Line, metres: number): Point {
  let left = metres;
  for (let i = 1; i < line.length; i++) {
    const a = line[i - 1] as Point;
    const b = line[i] as Point;
    const length = distance(a, b);
    if (left <= length && length > 0) {
      return { x: a.x + ((b.x - a.x) * left) / length, y: a.y + ((b.y - a.y) * left) / length };
    }
    left -= length;
  }
  return line[line.length - 1] as Point;
}

function distanceToSegment(p: Point, a: Point, b: Point): number {
  const dx = b.x - a.x;
  const dy = b.y - a.y;
  const squared = dx * dx + dy * dy;
  const t = squared === 0 ? 0 : ((p.x - a.x) * dx + (p.y - a.y) * dy) / squared;
  const clamped = Math.min(1, Math.max(0, t));
  return Math.hypot(p.x - a.x - clamped * dx, p.y - a.y - clamped * dy);
}

/** Shortest distance from a point to a line, metres. */
export function distanceToLine(p: Point, line: Line): number {
  let best = Infinity;
  for (let i = 1; i < line.length; i++) {
    best = Math.min(best, distanceToSegment(p, line[i - 1] as Point, line[i] as Point));
  }
  return best;
}

export function isInside(p: Point): boolean {
  return (
    p.x >= 150 && p.y >= 150 && p.x <= DISTRICT_WIDTH_M - 150 && p.y <= DISTRICT_HEIGHT_M - 150
  );
}

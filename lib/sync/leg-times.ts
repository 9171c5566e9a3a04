/**
 * How long the drive between any two stops of a round takes, reckoned from the drives its plan holds:
 * a phone without signal can ask no roads. Two stops that follow each other in the plan keep that
 * drive, whichever way round; for any other two the straight line between them is driven at the
 * round's own middle pace. Pure: phone and server come to the same times.
 */
/** As much of a stop as its place in the round depends on. */
export interface PlacedStop {
  readonly id: string;
  readonly position: number;
  readonly arrivesAt: string;
  readonly departsAt: string;
}

/** WGS 84 degrees. */
export interface StopPoint {
  readonly latitude: number;
  readonly longitude: number;
}

/** About 200 m: between stops nearer than this walking and gates count, not driving. */
const NEAR_DEGREES = 0.002;
/** 10 km/h along the straight line, in ms a degree (111.2 km): below it the plan waits. No source. */
const SLOWEST = (111.2 / 10) * 3_600_000;

/** The drive from one stop to another, in ms; null where nothing is known to reckon it from. */
export type LegTime<Stop> = (from: Stop, to: Stop) => number | null;

/** @param placed the stops in the order of their times */
export function legTimes<Stop extends PlacedStop>(
  placed: readonly Stop[],
  pointOf: (stop: Stop) => StopPoint | null,
): LegTime<Stop> {
  const planned = new Map<string, number>();
  const paces: number[] = [];
  placed.slice(1).forEach((stop, n) => {
    const before = placed[n];
    if (!before) return;
    const ms = Math.max(0, Date.parse(stop.arrivesAt) - Date.parse(before.departsAt));
    planned.set(`${before.id} ${stop.id}`, ms).set(`${stop.id} ${before.id}`, ms);
    const apart = degreesApart(pointOf(before), pointOf(stop));
    if (apart !== null && apart >= NEAR_DEGREES) paces.push(Math.min(ms / apart, SLOWEST));
  });
  // The middle one: a break or a wait for a gate to open within one drive does not slow the others.
  const pace = paces.sort((a, b) => a - b)[(paces.length - 1) >> 1];
  return (from, to) => {
    const known = planned.get(`${from.id} ${to.id}`);
    if (known !== undefined) return known;
    const apart = degreesApart(pointOf(from), pointOf(to));
    if (pace === undefined || apart === null) return null;
    return Math.round((apart * pace) / 1000) * 1000;
  };
}

/**
 * The straight line in degrees of latitude, on the plane that touches the ground there (at the length
 * of a round within a thousandth of the great circle); null when a point is missing.
 */
function degreesApart(a: StopPoint | null, b: StopPoint | null): number | null {
  if (!a || !b) return null;
  const middle = ((a.latitude + b.latitude) / 2) * (Math.PI / 180);
  const east = (a.longitude - b.longitude) * Math.cos(middle);
  return Math.hypot(a.latitude - b.latitude, east);
}

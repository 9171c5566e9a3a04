/**
 * The technician's own order of a round. Pure and idempotent: phone and server come to the same
 * order and the same times from the same stops.
 */
import { legTimes, type PlacedStop, type StopPoint } from "./leg-times";

/**
 * The ids of a round in the order wanted. Stops that are gone are left out; one that was added
 * meanwhile stays behind the stop it stood behind, or in front when it stood first.
 */
export function orderedAs(current: readonly string[], wanted: readonly string[]): string[] {
  const known = new Set(current);
  const order = [...new Set(wanted)].filter((id) => known.has(id));
  current.forEach((id, n) => {
    if (order.includes(id)) return;
    const before = current[n - 1];
    order.splice(before === undefined ? 0 : order.indexOf(before) + 1, 0, id);
  });
  return order;
}

/**
 * The stops in another order, with new positions and times: the round begins when it did, each visit
 * keeps its length, and the drives between are reckoned anew (`legTimes`; where that knows
 * nothing, the n-th drive takes as long as the n-th of the plan). Times never run backwards.
 */
export function reordered<Stop extends PlacedStop>(
  stops: readonly Stop[],
  wanted: readonly string[],
  pointOf: (stop: Stop) => StopPoint | null = () => null,
): Stop[] {
  const placed = [...stops].sort((a, b) => a.position - b.position);
  const byId = new Map(placed.map((stop) => [stop.id, stop]));
  const order = orderedAs([...byId.keys()], wanted).flatMap((id) => byId.get(id) ?? []);
  if (order.every((stop, n) => placed[n] === stop)) return placed;
  const leg = legTimes(placed, pointOf);
  let clock = placed[0] ? Date.parse(placed[0].arrivesAt) : 0;
  return order.map((stop, n) => {
    const before = order[n - 1];
    const arrives = clock + (before ? (leg(before, stop) ?? nthLeg(placed, n)) : 0);
    clock = arrives + Math.max(0, Date.parse(stop.departsAt) - Date.parse(stop.arrivesAt));
    const times = {
      arrivesAt: new Date(arrives).toISOString(),
      departsAt: new Date(clock).toISOString(),
    };
    return { ...stop, position: n + 1, ...times };
  });
}

function nthLeg(placed: readonly PlacedStop[], n: number): number {
  const [before, stop] = [placed[n - 1], placed[n]];
  return before && stop
    ? Math.max(0, Date.parse(stop.arrivesAt) - Date.parse(before.departsAt))
    : 0;
}

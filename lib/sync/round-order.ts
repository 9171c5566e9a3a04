/**
 * The technician's own order of a round. Pure and idempotent: phone and server come to the same
 * order and the same times from the same stops.
 */

/** As much of a stop as its place in the round depends on. */
export interface PlacedStop {
  readonly id: string;
  readonly position: number;
  readonly arrivesAt: string;
  readonly departsAt: string;
}

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
 * The stops in another order, with new positions and times: each keeps the length of its visit, and
 * the n-th drive takes as long as the n-th drive of the plan did. So the times are about right
 * and never run backwards; nobody has asked the roads again.
 */
export function reordered<Stop extends PlacedStop>(
  stops: readonly Stop[],
  wanted: readonly string[],
): Stop[] {
  const placed = [...stops].sort((a, b) => a.position - b.position);
  const order = orderedAs(
    placed.map((stop) => stop.id),
    wanted,
  );
  if (order.every((id, n) => placed[n]?.id === id)) return placed;
  const gaps = placed.map((stop, n) => Math.max(0, arrival(stop) - departure(placed[n - 1], stop)));
  let clock = placed[0] ? arrival(placed[0]) : 0;
  return order.flatMap((id, n) => {
    const stop = placed.find((candidate) => candidate.id === id);
    if (!stop) return [];
    const arrives = clock + (n === 0 ? 0 : (gaps[n] ?? 0));
    clock = arrives + Math.max(0, Date.parse(stop.departsAt) - arrival(stop));
    const times = {
      arrivesAt: new Date(arrives).toISOString(),
      departsAt: new Date(clock).toISOString(),
    };
    return [{ ...stop, position: n + 1, ...times }];
  });
}

const arrival = (stop: PlacedStop): number => Date.parse(stop.arrivesAt);

function departure(before: PlacedStop | undefined, stop: PlacedStop): number {
  return before ? Date.parse(before.departsAt) : arrival(stop);
}

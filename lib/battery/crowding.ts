/**
 * How many readings say the same thing. What a curve gets wrong at a depth it gets wrong for every
 * voltage read there, so a logger's thousand voltages of one day are not a thousand witnesses:
 * readings of one kind closer together than `ASSUMED.sharedErrorDepth` share their weight.
 */
import { ASSUMED } from "./assumptions";
import type { PackReading } from "./pack";
import type { PackModel } from "./pack-model";
import type { Item } from "./timeline";

/** Depth gone by which time counts as passed; below it the grid need not move. */
const STILL = 5e-4;

/** Share of the charge gone in a day by the sheet. */
const perDay = (model: PackModel): number => model.drawPerDay + model.leakPerDay;

/** Whether so little is gone in these days that the grid may stay where it is. */
export function isStill(model: PackModel, days: number): boolean {
  return days * perDay(model) < STILL;
}

/**
 * For each reading by how many it is shared, itself counted in: 1 where it stands alone. Others
 * count the less the further off they are, in a straight line to nothing.
 */
export function crowds(model: PackModel, items: readonly Item[]): ReadonlyMap<PackReading, number> {
  const reach = ASSUMED.sharedErrorDepth / Math.max(perDay(model), 1e-9);
  const found = new Map<PackReading, number>();
  for (const kind of ["resting", "loaded"] as const) {
    const own = items.flatMap((i) => ("reading" in i && i.reading.kind === kind ? [i] : []));
    const sums = [0];
    for (const { at } of own) sums.push(sums.at(-1)! + (at - own[0]!.at));
    let low = 0;
    let high = 0;
    own.forEach(({ at, reading }, k) => {
      while (at - own[low]!.at > reach) low++;
      while (high < own.length && own[high]!.at - at < reach) high++;
      const since = at - own[0]!.at;
      const before = (k - low) * since - (sums[k]! - sums[low]!);
      const after = sums[high]! - sums[k]! - (high - k) * since;
      found.set(reading, Math.max(1, high - low - (before + after) / reach));
    });
  }
  return found;
}

/** One site visit with its tasks, priced for every day of a plan: what the routing engine plans. */
import type { IsoDay, Minor, Seconds } from "@/lib/units";
import { ARRIVAL_S } from "./assumptions";
import { tripsSaved } from "./due";
import type { PlannedTask, PlanningSite } from "./fleet";
import { tripOf, type OutlookContext, type PackOutlook } from "./outlook";

export interface Visit {
  readonly site: PlanningSite;
  readonly tasks: readonly PlannedTask[];
  readonly outlooks: readonly PackOutlook[];
  readonly serviceS: Seconds;
  /** Waiting cost of the swapped packs on each day, before any shift to zero. */
  readonly dayMinor: readonly Minor[];
  /** What leaving the site out of the plan costs: the best later visit and its trip. */
  readonly laterMinor: Minor;
  /** Chance of being out before the visit, summed over the swapped packs, on each day. */
  readonly expectedOut: readonly number[];
  readonly cells: ReadonlyMap<string, number>;
}

function swappedPacks(
  tasks: readonly PlannedTask[],
  outlooks: readonly PackOutlook[],
): PackOutlook[] {
  const swapped = new Set(tasks.flatMap((t) => (t.kind === "swap" ? [t.assetId] : [])));
  return outlooks.filter((outlook) => swapped.has(outlook.pack.assetId));
}

/** Work on the spot: the walk from the van and every task. */
export function serviceOf(
  tasks: readonly PlannedTask[],
  outlooks: readonly PackOutlook[],
): Seconds {
  const packs = new Map(outlooks.map((outlook) => [outlook.pack.assetId, outlook.pack]));
  return tasks.reduce((sum, task) => {
    const pack = packs.get(task.assetId);
    if (!pack) return sum + 600;
    return sum + (task.kind === "swap" ? pack.swapS : pack.readS);
  }, ARRIVAL_S);
}

function cellsOf(tasks: readonly PlannedTask[]): Map<string, number> {
  const cells = new Map<string, number>();
  for (const { cellTypeId, cells: count } of tasks) {
    if (cellTypeId) cells.set(cellTypeId, (cells.get(cellTypeId) ?? 0) + count);
  }
  return cells;
}

/** Prices a visit that does `tasks`. `outlooks` are those of every pack at the site. */
export function visitOf(
  site: PlanningSite,
  tasks: readonly PlannedTask[],
  outlooks: readonly PackOutlook[],
  context: OutlookContext,
): Visit {
  const swaps = swappedPacks(tasks, outlooks);
  const serviceS = serviceOf(tasks, outlooks);
  const perDay = (of: (outlook: PackOutlook, d: number) => number) =>
    context.days.map((_: IsoDay, d) => swaps.reduce((sum, o) => sum + of(o, d), 0));
  const trips = swaps.length > 0 ? tripsSaved(swaps) * tripOf(site, context).shareMinor : 0;
  // A lonely site would be put off anew every week: what was suffered counts until it pays the trip.
  const suffered = swaps.reduce((sum, o) => sum + o.sufferedMinor, 0);
  // The walk to the gate is part of a trip's share; reads alone wait for no trip of their own.
  const workMinor = ((serviceS - ARRIVAL_S) / 3600) * context.prices.crewMinorPerHour;
  return {
    site,
    tasks,
    outlooks,
    serviceS,
    dayMinor: perDay((outlook, d) => outlook.visits[d]!.totalMinor),
    laterMinor: swaps.reduce(
      (sum, o) => sum + o.later.price.totalMinor,
      trips + workMinor + suffered,
    ),
    expectedOut: perDay((outlook, d) => outlook.visits[d]!.chanceOut),
    cells: cellsOf(tasks),
  };
}

/** What the fixed intervals that a plan replaces would cost, for comparison. */
import type { Minor } from "@/lib/units";
import type { SiteOutlooks } from "./due";
import { expectation } from "./life";
import { tripOf, waitingPack, type OutlookContext } from "./outlook";
import { costOfStopping } from "./waiting-cost";

export interface HabitCost {
  readonly minorPerWeek: Minor;
  /** Packs whose model has an interval; the others are left out. */
  readonly packs: number;
}

/**
 * A week's cost if every pack were swapped on its model's fixed interval, in the long run: its
 * cells, work and share of a drive, and the silence of packs that do not last that long.
 */
export function habitCost(sites: readonly SiteOutlooks[], context: OutlookContext): HabitCost {
  let minorPerWeek = 0;
  let packs = 0;
  for (const { site, outlooks, tripShareMinor } of sites) {
    for (const { pack } of outlooks) {
      const days = pack.habitIntervalDays;
      if (days === null) continue;
      const waiting = waitingPack(pack, tripOf(site, context), context.prices);
      const due = pack.installedAt + days;
      const silence = expectation(pack.life, (stopsAt) =>
        costOfStopping(waiting, pack.installedAt, stopsAt, due),
      );
      const workMinor = (pack.swapS / 3600) * context.prices.crewMinorPerHour;
      minorPerWeek += ((pack.cellsMinor + workMinor + tripShareMinor + silence) * 7) / days;
      packs += 1;
    }
  }
  return { minorPerWeek, packs };
}

import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import { localDay } from "@/lib/planning/local-time";
import { outlookContext, outlookOf, tripOf } from "@/lib/planning/outlook";
import type { DayWorth } from "@/lib/sync/day-pack";
import { loadWorld } from "./planning-world";

/**
 * What swapping each pack at these sites is worth to somebody who is there today, by asset; packs
 * that a round has already been promised are left out. The same reckoning as the planner's, except
 * that the way there is paid for: what a trip of its own would cost counts as saved.
 */
export async function neighboursWorth(
  db: Kysely<Database>,
  now: Date,
  timeZone: string,
  siteIds: readonly string[],
): Promise<Map<string, DayWorth>> {
  if (siteIds.length === 0) return new Map();
  const today = localDay(now, timeZone);
  const cover = { firstDay: today, lastDay: today, crewIds: [] };
  const nothing = { known: [], excludedAssets: new Set<string>() };
  const { input } = await loadWorld(db, now, cover, { siteIds, ...nothing });
  const depots = input.technicians.map((technician) => technician.depot);
  const context = outlookContext(input.frame, input.prices, depots, input.road);
  const sites = new Map(input.sites.map((site) => [site.siteId, site]));
  return new Map(
    input.packs.flatMap((pack): [string, DayWorth][] => {
      const site = sites.get(pack.siteId);
      if (!site) return [];
      const { standing, gainMinor, later } = outlookOf(pack, site, context);
      const savesMinor = Math.round(gainMinor + tripOf(site, context).shareMinor);
      const worthIt = standing === "near" && savesMinor > 0;
      const told = standing === "due" || worthIt ? standing : "later";
      return [[pack.assetId, { standing: told, savesMinor, laterDay: later.day }]];
    }),
  );
}

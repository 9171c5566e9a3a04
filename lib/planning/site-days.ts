/** On which days, and at which hours, a site can be visited. */
import type { IsoDay } from "@/lib/units";
import type { DayWindow } from "../routing/problem";
import type { ClosedSeason, PlanningSite } from "./fleet";
import { elapsedOfWall } from "./local-time";

/** The closed season in which a day lies, or undefined. */
export function closureOn(
  closures: readonly ClosedSeason[],
  day: IsoDay,
): ClosedSeason | undefined {
  const monthDay = day.slice(5);
  return closures.find(({ firstMonthDay, lastMonthDay }) =>
    firstMonthDay <= lastMonthDay
      ? firstMonthDay <= monthDay && monthDay <= lastMonthDay
      : monthDay >= firstMonthDay || monthDay <= lastMonthDay,
  );
}

/** Whether nobody may go to a site on a day: a closed season, or a technician said not before. */
export function isClosed(site: PlanningSite, day: IsoDay): boolean {
  const tooEarly = site.returnOn ? day < site.returnOn.day : false;
  return tooEarly || closureOn(site.closures, day) !== undefined;
}

/**
 * When work of `serviceS` may start so that it also ends within the site's hours; null where the
 * site is closed that day or its hours are too short. Seconds that pass from local midnight.
 */
export function startWindow(
  site: PlanningSite,
  day: IsoDay,
  serviceS: number,
  timeZone: string,
): DayWindow | null {
  if (isClosed(site, day)) return null;
  if (!site.hours) return { openS: 0, closeS: 93_600 };
  const openS = elapsedOfWall(day, site.hours.opensS, timeZone);
  const closeS = elapsedOfWall(day, site.hours.closesS, timeZone) - serviceS;
  return closeS < openS ? null : { openS, closeS };
}

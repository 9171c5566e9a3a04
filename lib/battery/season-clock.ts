/**
 * The year's course in the forecast. Time left is counted on an even clock (mean rate,
 * warmest end depth); this carries it to dates: self-discharge runs faster in summer, and in
 * a cold month the device stops earlier on the depth axis. The first passage is the first
 * day on which progress plus what the cold takes away reaches the time left.
 */
import type { EpochDays } from "../units";
import { ASSUMED } from "./assumptions";
import { DAYS_PER_YEAR, MONTH_STARTS, dayOfYear, monthOf } from "./climate";
import type { Filtered } from "./filter";

export interface SeasonalClock {
  /** Even days used up by a date, what the cold takes away left out. */
  progress(date: EpochDays): number;
  /** Date on which a pack with this many even days left stops. */
  dateOf(daysLeft: number): EpochDays;
  /** Even days left that are used up on a date. */
  reachedAt(date: EpochDays): number;
}

/** Mean share consumed per day until the end, in all and by the draw alone. */
export interface MeanRate {
  readonly ratePerDay: number;
  readonly drawPerDay: number;
}

export function seasonalClock(filtered: Filtered, mean: MeanRate): SeasonalClock {
  const { model, end, at } = filtered;
  const { ratePerDay, drawPerDay } = mean;
  const leak = (ratePerDay - drawPerDay) / model.site.ageing.meanFactor;
  const progress = (date: EpochDays): number =>
    (drawPerDay * (date - at) + leak * model.site.ageing.between(at, date)) / ratePerDay;
  const cold = (month: number): number => (end.warm - end.byMonth[month]!) / ratePerDay;
  const months: Month[] = [];
  const limit = at + ASSUMED.horizonDays * 1.05;
  const grow = (): Month => addMonth(months, at, progress, cold);
  return {
    progress,
    dateOf(daysLeft) {
      if (daysLeft <= 0) return at + daysLeft;
      let k = 0;
      let month = months[0] ?? grow();
      while (month.reached < daysLeft && month.to < limit) month = months[++k] ?? grow();
      const span = month.reached - month.starts;
      if (daysLeft <= month.starts || !(span > 0)) return month.from;
      return month.from + Math.min(1, (daysLeft - month.starts) / span) * (month.to - month.from);
    },
    reachedAt(date) {
      return date <= at ? date - at + cold(monthOf(date)) : progress(date) + cold(monthOf(date));
    },
  };
}

interface Month {
  readonly from: EpochDays;
  readonly to: EpochDays;
  /** Even days used up at its start and its end. */
  readonly starts: number;
  readonly reached: number;
}

function addMonth(
  months: Month[],
  at: EpochDays,
  progress: (date: EpochDays) => number,
  cold: (month: number) => number,
): Month {
  const from = months.length > 0 ? months[months.length - 1]!.to : at;
  const month = monthOf(from + 1e-6);
  const toNext = MONTH_STARTS[month + 1]! - dayOfYear(from + 1e-6);
  const to = from + Math.min(Math.max(toNext + 1e-6, 1e-3), DAYS_PER_YEAR);
  const lost = cold(month);
  const next = { from, to, starts: progress(from) + lost, reached: progress(to) + lost };
  months.push(next);
  return next;
}

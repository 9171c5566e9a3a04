/**
 * A pack's history in order of time: which readings and events count, what is known of the
 * device's life, and what is said of readings that cannot be of this pack.
 */
import type { EpochDays } from "../units";
import type { ForecastInput, FoundDrawShift, PackEvent, PackReading, ReadingWeight } from "./pack";

/** A reading stamped a little after `now` (clocks differ) still counts. */
const CLOCK_SLACK_DAYS = 1;

export type Item =
  | { readonly at: EpochDays; readonly reading: PackReading }
  | { readonly at: EpochDays; readonly event: PackEvent }
  | { readonly at: EpochDays; readonly shift: FoundDrawShift }
  | { readonly at: EpochDays; readonly alive: true };

export interface Bounds {
  /** Alive on the first day, stopped on the second; null: not known. */
  readonly aliveAt: EpochDays | null;
  readonly stoppedAt: EpochDays | null;
}

/**
 * Only the latest sign of life counts: each would weigh the same unknown end depth again,
 * and having run later implies having run before.
 */
export function aliveBounds(input: ForecastInput, from: EpochDays, until: EpochDays): Bounds {
  let aliveAt: EpochDays | null = null;
  let stoppedAt: EpochDays | null = null;
  for (const event of input.events) {
    if (event.at < from || event.at > until + CLOCK_SLACK_DAYS) continue;
    if (event.kind === "stopped" && (stoppedAt === null || event.at < stoppedAt)) {
      stoppedAt = Math.min(event.at, until);
    }
  }
  for (const event of input.events) {
    const alive = event.kind === "reporting" ? event.at : event.lastAliveAt;
    if (event.kind === "draw-changed" || alive === undefined || alive < from) continue;
    const known = Math.min(alive, until);
    if (alive > until + CLOCK_SLACK_DAYS || (stoppedAt !== null && known > stoppedAt)) continue;
    if (aliveAt === null || known > aliveAt) aliveAt = known;
  }
  return { aliveAt, stoppedAt };
}

export interface Span {
  readonly from: EpochDays;
  readonly until: EpochDays;
  readonly aliveAt: EpochDays | null;
  /** Readings above this, or below 0, are impossible. */
  readonly highestMv: number;
}

/** Readings and events that count, in order; the latest sign of life among them. */
export function timeline(input: ForecastInput, span: Span): Item[] {
  const { from, until, aliveAt, highestMv } = span;
  const known = (at: EpochDays): boolean => at >= from && at <= until + CLOCK_SLACK_DAYS;
  const items: Item[] = [];
  for (const reading of input.readings) {
    const possible = reading.millivolts >= 0 && reading.millivolts <= highestMv;
    if (possible && known(reading.at)) items.push({ at: Math.min(reading.at, until), reading });
  }
  for (const event of input.events) {
    if (known(event.at) && event.kind !== "reporting") {
      items.push({ at: Math.min(event.at, until), event });
    }
  }
  for (const shift of input.drawShifts ?? []) {
    // a pack put in since starts with it
    if (shift.at <= until) items.push({ at: Math.max(shift.at, from), shift });
  }
  if (aliveAt !== null) items.push({ at: aliveAt, alive: true });
  return items.sort((a, b) => a.at - b.at);
}

function blank(reading: PackReading): Omit<ReadingWeight, "reason"> {
  const mv = reading.millivolts;
  return {
    readingId: reading.id,
    weight: 0,
    expectedMv: mv,
    expectedLowMv: mv,
    expectedHighMv: mv,
  };
}

/** What is said of a reading that was passed over. */
export function passedOver(reading: PackReading, input: ForecastInput): ReadingWeight {
  const early = reading.at < input.pack.installedAt;
  return { ...blank(reading), reason: early ? "before-install" : "impossible" };
}

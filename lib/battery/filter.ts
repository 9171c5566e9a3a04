/**
 * The filter: history in order of time, each stretch consumed, each reading and event
 * weighed. A deterministic grid Bayes filter (see grid.ts); readings that cannot be of this
 * pack are named and passed over, never dropped in silence.
 */
import { normalCdf } from "../stats/normal";
import type { EpochDays } from "../units";
import { ASSUMED } from "./assumptions";
import { DAYS_PER_YEAR, monthOf } from "./climate";
import { consume } from "./consume";
import { openRate, redrawOffset, wander } from "./draw-walk";
import { type Grid, newGrid, normalise, weighDepth } from "./grid";
import type { ForecastInput, PackEvent, PackReading, ReadingWeight } from "./pack";
import { type PackModel, leakBetween, packModel } from "./pack-model";
import { impossibleAboveMv, observe } from "./reading";

const LONGEST_STEP_DAYS = 120;
const MOST_STEPS = 24;
/** A reading stamped a little after `now` (clocks differ) still counts. */
const CLOCK_SLACK_DAYS = 1;

export interface Filtered {
  readonly model: PackModel;
  readonly grid: Grid;
  /** The moment the grid stands at: `now` (no earlier than the installation), or the stop. */
  readonly at: EpochDays;
  readonly weights: readonly ReadingWeight[];
  /** Known bounds of the date out: alive at the first, stopped at the second. */
  readonly aliveAt: EpochDays | null;
  readonly stoppedAt: EpochDays | null;
}

type Item =
  | { readonly at: EpochDays; readonly reading: PackReading }
  | { readonly at: EpochDays; readonly event: PackEvent }
  | { readonly at: EpochDays; readonly alive: true };

/** Run the filter over everything known up to `now`. */
export function filterPack(input: ForecastInput): Filtered {
  const model = packModel(input.pack, input.prior);
  const from = input.pack.installedAt;
  const until = Math.max(input.now, from);
  const bounds = aliveBounds(input, from, until);
  const highest = impossibleAboveMv(model);
  const known: Span = { from, until, aliveAt: bounds.aliveAt, highestMv: highest };
  const items = timeline(input, known);
  const changed = items.some((i) => "event" in i && i.event.kind === "draw-changed");
  const sd = changed ? Math.max(model.prior.sd, ASSUMED.changedDrawSd) : model.prior.sd;
  const grid = newGrid(model, (until - from) / DAYS_PER_YEAR, sd);
  if (changed && input.pack.measuredDraw) openRate(grid, model.prior.mean, sd);
  const weights = new Map<string, ReadingWeight>();
  let at = from;
  let lastLoaded = -Infinity;
  for (const item of items) {
    elapse(model, grid, at, Math.min(item.at, bounds.stoppedAt ?? item.at));
    at = item.at;
    if ("reading" in item) {
      const rested = at - lastLoaded > ASSUMED.passivationRestDays;
      const film = rested && model.pack.cell.chemistry === "li-socl2";
      weights.set(item.reading.id, observe(model, grid, item.reading, film));
      if (item.reading.kind === "loaded") lastLoaded = at;
    } else if ("event" in item) applyEvent(model, grid, item.event);
    else weighDepth(grid, (depth) => aliveChance(model, depth, at));
  }
  // a stopped device draws no more: the grid stays at the day it was found
  const end = bounds.stoppedAt ?? until;
  elapse(model, grid, at, end);
  normalise(grid);
  const ordered = input.readings.map((r) => weights.get(r.id) ?? passedOver(r, input));
  return { model, grid, at: end, weights: ordered, ...bounds };
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

function passedOver(reading: PackReading, input: ForecastInput): ReadingWeight {
  const early = reading.at < input.pack.installedAt;
  return { ...blank(reading), reason: early ? "before-install" : "impossible" };
}

/** Chance that the device runs at a depth in the month of a day. */
export function aliveChance(model: PackModel, depth: number, at: EpochDays): number {
  return normalCdf((model.endByMonth[monthOf(at)]! - depth) / model.endSd);
}

function applyEvent(model: PackModel, grid: Grid, event: PackEvent): void {
  if (event.kind === "stopped") {
    weighDepth(grid, (depth) => 1 - aliveChance(model, depth, event.at));
  } else if (event.kind === "draw-changed") {
    const sd = model.pack.measuredDraw ? model.prior.sd : ASSUMED.changedDrawSd;
    openRate(grid, model.prior.mean, sd);
  }
}

/**
 * Only the latest sign of life counts: each would weigh the same unknown end depth again,
 * and having run later implies having run before.
 */
function aliveBounds(input: ForecastInput, from: EpochDays, until: EpochDays) {
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

interface Span {
  readonly from: EpochDays;
  readonly until: EpochDays;
  readonly aliveAt: EpochDays | null;
  /** Readings above this, or below 0, are impossible. */
  readonly highestMv: number;
}

function timeline(input: ForecastInput, span: Span): Item[] {
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
  if (aliveAt !== null) items.push({ at: aliveAt, alive: true });
  return items.sort((a, b) => a.at - b.at);
}

/** Let time pass: draw and leak consumed, the draw wandering, in steps of at most 120 days. */
export function elapse(model: PackModel, grid: Grid, from: EpochDays, to: EpochDays): void {
  const days = to - from;
  if (!(days > 1e-6)) return;
  const steps = Math.min(MOST_STEPS, Math.ceil(days / LONGEST_STEP_DAYS));
  const variance = (ASSUMED.drawWalkPerYear ** 2 * days) / DAYS_PER_YEAR / steps;
  for (let s = 0; s < steps; s++) {
    const start = from + (days * s) / steps;
    const end = from + (days * (s + 1)) / steps;
    wander(grid, variance);
    const share = model.drawPerDay * (end - start);
    const leak = leakBetween(model, start, end);
    redrawOffset(grid, 1 - Math.exp(-(share + leak) / ASSUMED.curveErrorDepth));
    consume(grid, share, leak);
  }
}

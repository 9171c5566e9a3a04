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
import { crowds, isStill } from "./crowding";
import { drift, openRate } from "./draw-walk";
import { shiftRates, shiftReach } from "./draw-shift";
import { type EndOfLife, type ResistanceBelief, endOfLife } from "./end-of-life";
import { type Grid, depthMarginal, newGrid, normalise, retire, weighDepth } from "./grid";
import type { ForecastInput, PackEvent, PackReading, ReadingWeight } from "./pack";
import { type PackModel, distrusted, leakBetween, packModel } from "./pack-model";
import { impossibleAboveMv, observe } from "./reading";
import { filmChance } from "./passivation";
import { guessRest, learnResistance, loosen } from "./resistance";
import { type Bounds, type Item, aliveBounds, passedOver, timeline } from "./timeline";

const LONGEST_STEP_DAYS = 120;
const MOST_STEPS = 24;
/** Place in the depth window, 0..1, that must lie past depth 1: 2.5 spreads below the mean. */
const SURELY_OUT = 2 / 9;

export interface Filtered extends Bounds {
  readonly model: PackModel;
  readonly grid: Grid;
  /**
   * The moment the grid stands at: `now` (no earlier than the installation), the stop, or
   * before them the day by which the pack was surely out.
   */
  readonly at: EpochDays;
  readonly weights: readonly ReadingWeight[];
  /** Where this pack stops, its resistance learned. */
  readonly end: EndOfLife;
}

/**
 * Run the filter over everything known up to `now`. Where a good part of the readings is in doubt
 * it is the curve that does not fit these cells: then once more, with less trust in it.
 */
export function filterPack(input: ForecastInput): Filtered {
  const model = packModel(input.pack, input.prior, input.temperatures);
  const filtered = filterUnder(model, input);
  return misfit(filtered.weights) ? filterUnder(distrusted(model), input) : filtered;
}

/** So many readings, and this share of them, in doubt: slips do not come so often. */
const MISFIT = { least: 3, share: 0.34 };

function misfit(weights: readonly ReadingWeight[]): boolean {
  const doubtful = weights.filter((w) => w.reason === "doubtful").length;
  const fitting = weights.filter((w) => w.reason === "fits").length;
  return doubtful >= MISFIT.least && doubtful > MISFIT.share * (doubtful + fitting);
}

function filterUnder(model: PackModel, input: ForecastInput): Filtered {
  const from = input.pack.installedAt;
  const until = Math.max(input.now, from);
  const bounds = aliveBounds(input, from, until);
  const highestMv = impossibleAboveMv(model);
  const items = timeline(input, { from, until, aliveAt: bounds.aliveAt, highestMv });
  const grid = gridFor(model, input, items, (until - from) / DAYS_PER_YEAR);
  const run = new Run(model, grid, from, crowds(model, items));
  // a stopped device draws no more: the grid stays at the day it was found
  const last = bounds.stoppedAt ?? until;
  for (const item of items) {
    const at = Math.min(item.at, last);
    if ("reading" in item) {
      run.towards(at);
      run.read(item.reading);
      continue;
    }
    run.to(at);
    if ("event" in item) run.hear(item.event);
    else if ("shift" in item) shiftRates(grid, item.shift);
    else run.live(item.at);
  }
  const stands = run.follow(last);
  normalise(grid);
  retire(grid);
  const weights = input.readings.map((r) => run.weights.get(r.id) ?? passedOver(r, input));
  return { model, grid, at: stands, weights, end: run.end(), ...bounds };
}

function gridFor(
  model: PackModel,
  input: ForecastInput,
  items: readonly Item[],
  years: number,
): Grid {
  const changed = items.some((i) => "event" in i && i.event.kind === "draw-changed");
  const sd = changed ? Math.max(model.prior.sd, ASSUMED.changedDrawSd) : model.prior.sd;
  const grid = newGrid(model, years, sd + shiftReach(input.drawShifts ?? []));
  if (changed && input.pack.measuredDraw) openRate(grid, model.prior.mean, sd);
  return grid;
}

/** One pass over one pack's history. */
class Run {
  readonly weights = new Map<string, ReadingWeight>();
  private resistance: ResistanceBelief;
  private lastLoaded = -Infinity;
  private learned = false;

  constructor(
    private readonly model: PackModel,
    private readonly grid: Grid,
    private at: EpochDays,
    private readonly sharedBy: ReadonlyMap<PackReading, number>,
  ) {
    this.resistance = model.resistance;
  }

  /** To a reading's time, unless hardly anything is gone by then. */
  towards(day: EpochDays): void {
    if (!isStill(this.model, day - this.at)) this.to(day);
  }

  to(day: EpochDays): void {
    elapse(this.model, this.grid, this.at, day);
    if (this.learned)
      this.resistance = loosen(this.resistance, this.model.resistance.sd, day - this.at);
    this.at = Math.max(this.at, day);
  }

  /**
   * The last stretch, up to a day or until the pack is surely out: what is spent is not
   * followed further. Returns the day reached.
   */
  follow(day: EpochDays): EpochDays {
    const from = this.at;
    const steps = stepsFor(day - from);
    for (let s = 1; s <= steps && !this.surelyOut(); s++)
      this.to(from + ((day - from) * s) / steps);
    return Math.min(day, this.at);
  }

  private surelyOut(): boolean {
    const { depthFrom, depthStep, nx } = this.grid;
    return depthFrom + SURELY_OUT * depthStep * (nx - 1) > 1;
  }

  read(reading: PackReading): void {
    const loaded = reading.kind === "loaded";
    depthMarginal(this.grid, this.grid.nodeC);
    const guess = loaded ? guessRest(this.model, this.grid, reading) : null;
    const film = loaded ? filmChance(this.model, this.at - this.lastLoaded) : 0;
    const shared = this.sharedBy.get(reading) ?? 1;
    const said = observe(this.model, this.grid, reading, this.resistance, { film, shared });
    this.weights.set(reading.id, said);
    if (!guess) return;
    this.lastLoaded = this.at;
    if (said.reason === "passivation") return;
    this.resistance = learnResistance(
      this.resistance,
      guess,
      reading.millivolts,
      said.weight / shared,
    );
    this.learned = true;
  }

  /** It ran on a day: judged by the end as this pack's own resistance sets it. */
  live(at: EpochDays): void {
    const end = this.end();
    // not longer ago: a pack that stopped in the cold may have come back since
    const met = this.endMet(end, at - 1, at);
    weighDepth(this.grid, (depth) => aliveChance(end.sd, met, depth));
  }

  hear(event: PackEvent): void {
    const { model, grid } = this;
    if (event.kind === "stopped") {
      const end = this.end();
      const met = this.endMet(end, event.lastAliveAt ?? event.at - 1, event.at);
      weighDepth(grid, (depth) => 1 - aliveChance(end.sd, met, depth));
    } else if (event.kind === "draw-changed") {
      openRate(
        grid,
        model.prior.mean,
        model.pack.measuredDraw ? model.prior.sd : ASSUMED.changedDrawSd,
      );
    }
  }

  /** The end depth in a stretch: in the coldest that was logged, else as the month sets it. */
  private endMet(end: EndOfLife, from: EpochDays, to: EpochDays): number {
    const coldest = this.model.site.lowest(from, to);
    return coldest === null ? end.byMonth[monthOf(to)]! : end.at(coldest);
  }

  end(): EndOfLife {
    const { end, endTerms, endResistance } = this.model;
    if (!this.learned) return end;
    const { mean, sd } = this.resistance;
    // what this pack shows beside its curve, on what such packs take to stop
    const first = this.model.resistance.mean;
    return endOfLife(endTerms, {
      mean: (mean / first) * endResistance.mean,
      sd: Math.min((sd / first) * endResistance.mean, endResistance.sd * Math.max(1, mean / first)),
    });
  }
}

/** Chance that the device runs at a depth where it stops at about `end`. */
function aliveChance(sd: number, end: number, depth: number): number {
  return normalCdf((end - depth) / sd);
}

/** Steps into which a stretch of days is cut. */
function stepsFor(days: number): number {
  return Math.min(MOST_STEPS, Math.max(0, Math.ceil(days / LONGEST_STEP_DAYS)));
}

/** Let time pass: draw and leak consumed, the draw wandering, in steps of at most 120 days. */
function elapse(model: PackModel, grid: Grid, from: EpochDays, to: EpochDays): void {
  const days = to - from;
  if (!(days > 1e-6)) return;
  const steps = stepsFor(days);
  const variance = (ASSUMED.drawWalkPerYear ** 2 * days) / DAYS_PER_YEAR / steps;
  for (let s = 0; s < steps; s++) {
    const start = from + (days * s) / steps;
    const end = from + (days * (s + 1)) / steps;
    const share = model.drawPerDay * (end - start);
    const leak = leakBetween(model, start, end);
    drift(grid, variance, 1 - Math.exp(-(share + leak) / model.offsetDepth));
    consume(grid, share, leak);
  }
}

/**
 * The problem compiled for the search: flat integer arrays, every rule that depends on site and
 * slot alone folded into one lookup (`visit`). A new rule of that kind belongs in `visitPrice`.
 */
import { latestStartS, workedS } from "./clock";
import { neighbourLists } from "./neighbours";
import { changePrice, isMust, legPrice, skipPrice } from "./price";
import type { Problem, Slot } from "./problem";
import { slotRefusals } from "./schedule";

/** A visit that no rule allows. */
export const FORBIDDEN = 0x3fffffff;
/** Stands for the absence of a must site: more than any plan can save. */
export const MUST_PENALTY = 1e11;

export interface Model {
  readonly problem: Problem;
  /** Sites are nodes 0..sites-1; depots follow. */
  readonly sites: number;
  readonly slots: number;
  readonly nodes: number;
  /** Travel seconds and leg price by [from * nodes + to], and the same by [to * nodes + from]. */
  readonly timeOut: Int32Array;
  readonly timeInto: Int32Array;
  readonly priceOut: Int32Array;
  readonly priceInto: Int32Array;
  /** By node. */
  readonly service: Int32Array;
  /** By site. */
  readonly skip: Float64Array;
  /** Price of a visit by [site * slots + slot], or FORBIDDEN. */
  readonly visit: Int32Array;
  /** Start windows on the working clock by [window class * sites + site]. */
  readonly open: Int32Array;
  readonly close: Int32Array;
  /** By slot: its window class times `sites`. */
  readonly windowRow: Int32Array;
  readonly startNode: Int32Array;
  readonly endNode: Int32Array;
  readonly startS: Int32Array;
  readonly shiftEndS: Int32Array;
  readonly lastEndS: Int32Array;
  readonly opening: Float64Array;
  readonly overtimePerS: Float64Array;
  readonly dutyPerS: number;
  /** Whether the time of the return has a price anywhere. */
  readonly endPriced: boolean;
  /** Slots of one kind are interchangeable while empty. */
  readonly kind: Int32Array;
  readonly kinds: number;
  readonly frozen: Int32Array;
  /** Load dimensions: the cell types and the total, so far as they can bind. */
  readonly loads: number;
  readonly demand: Int32Array;
  readonly capacity: Int32Array;
  /** Types whose stock can bind: the first so many load dimensions. */
  readonly stocks: number;
  readonly days: number;
  readonly dayOf: Int32Array;
  /** Cells of such a type that may be taken up to a day, by [type * days + day]. */
  readonly stock: Int32Array;
  /** Nearest sites of each site, nearest first, itself at the head: [site * near + i]. */
  readonly near: number;
  readonly neighbours: Int32Array;
}

function visitPrice(problem: Problem, s: number, r: number): number {
  const site = problem.sites[s]!;
  const slot = problem.slots[r]!;
  if (slotRefusals(problem, s, r).length > 0) return FORBIDDEN;
  if (site.demand.some((cells, type) => cells > slot.capacity[type]!)) return FORBIDDEN;
  return site.visitCost[slot.day]! + changePrice(problem, site, slot);
}

function visitPrices(problem: Problem): Int32Array {
  const slots = problem.slots.length;
  const visit = new Int32Array(problem.sites.length * slots);
  for (let i = 0; i < visit.length; i++)
    visit[i] = visitPrice(problem, Math.floor(i / slots), i % slots);
  problem.slots.forEach((slot, r) => {
    // A frozen stop is where it is, whatever the rules say now.
    for (const s of slot.frozen) {
      visit.fill(FORBIDDEN, s * slots, (s + 1) * slots);
      const site = problem.sites[s]!;
      visit[s * slots + r] = site.visitCost[slot.day]! + changePrice(problem, site, slot);
    }
  });
  return visit;
}

function matrices(problem: Problem, placeOf: readonly number[]) {
  const nodes = placeOf.length;
  const timeOut = new Int32Array(nodes * nodes);
  const priceOut = new Int32Array(nodes * nodes);
  let symmetric = true;
  for (let a = 0; a < nodes; a++) {
    for (let b = 0; b < nodes; b++) {
      const cell = placeOf[a]! * problem.places + placeOf[b]!;
      const mirror = placeOf[b]! * problem.places + placeOf[a]!;
      timeOut[a * nodes + b] = problem.travelS[cell]!;
      priceOut[a * nodes + b] = Math.min(FORBIDDEN, legPrice(problem, placeOf[a]!, placeOf[b]!));
      symmetric &&= problem.travelS[cell] === problem.travelS[mirror];
      symmetric &&= problem.travelM[cell] === problem.travelM[mirror];
    }
  }
  // Equal matrices share memory: half the cache lines in the inner loop.
  const samePrice = priceOut.every((price, i) => price === timeOut[i]);
  const price = samePrice ? timeOut : priceOut;
  const timeInto = symmetric ? timeOut : transpose(timeOut, nodes);
  const priceInto = symmetric ? price : samePrice ? timeInto : transpose(price, nodes);
  return { timeOut, priceOut: price, timeInto, priceInto };
}

function transpose(matrix: Int32Array, side: number): Int32Array {
  const out = new Int32Array(matrix.length);
  for (let a = 0; a < side; a++) {
    for (let b = 0; b < side; b++) out[b * side + a] = matrix[a * side + b]!;
  }
  return out;
}

/** Numbers equal keys 0, 1, ... in order of first appearance. */
function classes(keys: readonly string[]): { of: Int32Array; count: number; first: number[] } {
  const seen = new Map<string, number>();
  const first: number[] = [];
  const of = Int32Array.from(keys, (key, i) => {
    const known = seen.get(key);
    if (known !== undefined) return known;
    seen.set(key, seen.size);
    first.push(i);
    return seen.size - 1;
  });
  return { of, count: seen.size, first };
}

function windows(problem: Problem) {
  const sites = problem.sites.length;
  const byClass = classes(problem.slots.map((slot) => JSON.stringify([slot.day, slot.breaks])));
  const open = new Int32Array(byClass.count * sites);
  const close = new Int32Array(byClass.count * sites).fill(-1);
  byClass.first.forEach((r, w) => {
    const { day, breaks } = problem.slots[r]!;
    problem.sites.forEach((site, s) => {
      const window = site.windows[day];
      if (!window) return;
      open[w * sites + s] = workedS(breaks, window.openS);
      close[w * sites + s] = latestStartS(breaks, window.closeS);
    });
  });
  return { open, close, windowRow: byClass.of.map((w) => w * sites) };
}

function loads(problem: Problem) {
  const { sites, slots, days } = problem;
  const wanted = Array.from({ length: problem.cellTypes }, (_, type) =>
    sites.reduce((sum, site) => sum + site.demand[type]!, 0),
  );
  const every = wanted.map((_, type) => type);
  const short = every.filter((type) => problem.stock?.[type]!.some((most) => most < wanted[type]!));
  const full = every.filter((type) => slots.some((slot) => slot.capacity[type]! < wanted[type]!));
  const types = [...short, ...full.filter((type) => !short.includes(type))];
  const all = sites.map((site) => site.demand.reduce((sum, cells) => sum + cells, 0));
  const whole = all.reduce((sum, cells) => sum + cells, 0);
  const total = slots.some((slot) => slot.capacityTotal < whole);
  const width = types.length + (total ? 1 : 0);
  const row = (of: readonly number[], sum: number) => [
    ...types.map((type) => of[type]!),
    ...(total ? [sum] : []),
  ];
  const demand = Int32Array.from(sites.flatMap((site, s) => row(site.demand, all[s]!)));
  const capacity = Int32Array.from(slots.flatMap((slot) => row(slot.capacity, slot.capacityTotal)));
  const stock = Int32Array.from(short.flatMap((type) => problem.stock![type]!));
  const dayOf = Int32Array.from(slots, (slot) => slot.day);
  return { loads: width, demand, capacity, stocks: short.length, days, dayOf, stock };
}

function slotKey(slot: Slot, column: Int32Array): string {
  const { startPlace, endPlace, startS, endS, overtimeS, overtimePerS, breaks } = slot;
  const shift = [slot.day, startPlace, endPlace, startS, endS, overtimeS, overtimePerS, breaks];
  return (
    JSON.stringify([shift, slot.capacity, slot.capacityTotal, slot.openingCost, slot.frozen]) +
    column.join()
  );
}

function slotKinds(problem: Problem, visit: Int32Array) {
  const slots = problem.slots.length;
  const keys = problem.slots.map((slot, r) => {
    const column = Int32Array.from(problem.sites, (_, s) => visit[s * slots + r]!);
    return slotKey(slot, column);
  });
  const { of, count } = classes(keys);
  return { kind: of, kinds: count };
}

function slotTimes(problem: Problem, depotNode: (place: number) => number) {
  const bySlot = (of: (slot: Slot) => number) => Int32Array.from(problem.slots, of);
  return {
    startNode: bySlot((slot) => depotNode(slot.startPlace)),
    endNode: bySlot((slot) => depotNode(slot.endPlace)),
    startS: bySlot((slot) => workedS(slot.breaks, slot.startS)),
    shiftEndS: bySlot((slot) => workedS(slot.breaks, slot.endS)),
    lastEndS: bySlot((slot) => workedS(slot.breaks, slot.endS + slot.overtimeS)),
    frozen: bySlot((slot) => slot.frozen.length),
    opening: Float64Array.from(problem.slots, (slot) => slot.openingCost),
    overtimePerS: Float64Array.from(problem.slots, (slot) => slot.overtimePerS),
  };
}

/** Compiles a whole problem (see `assertProblem`); memory is 8 bytes per pair of sites or more. */
export function compileModel(problem: Problem, near = 150): Model {
  const sites = problem.sites.length;
  const depots = [...new Set(problem.slots.flatMap((slot) => [slot.startPlace, slot.endPlace]))];
  const placeOf = [...problem.sites.map((site) => site.place), ...depots];
  const visit = visitPrices(problem);
  const matrix = matrices(problem, placeOf);
  const times = slotTimes(problem, (place) => sites + depots.indexOf(place));
  const { dutyPerS } = problem.prices;
  return {
    problem,
    sites,
    slots: problem.slots.length,
    nodes: placeOf.length,
    ...matrix,
    service: Int32Array.from(placeOf, (_, i) => problem.sites[i]?.serviceS ?? 0),
    skip: Float64Array.from(
      problem.sites,
      (site) => skipPrice(site) + (isMust(site) ? MUST_PENALTY : 0),
    ),
    visit,
    ...windows(problem),
    ...times,
    dutyPerS,
    endPriced: dutyPerS > 0 || times.overtimePerS.some((price) => price > 0),
    ...slotKinds(problem, visit),
    ...loads(problem),
    ...neighbourLists(sites, placeOf.length, matrix.priceOut, near),
  };
}

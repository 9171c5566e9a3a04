/**
 * Which packs a visit to a site would swap: those that are due, and near-due ones where doing
 * them on the way is cheaper than a trip of their own later.
 */
import type { Minor } from "@/lib/units";
import { daysBetween } from "./local-time";
import type { PlannedTask, PlanningSite } from "./fleet";
import { expectation } from "./life";
import type { OutlookContext, PackOutlook } from "./outlook";

/** Later visits within so many days of each other would be one trip. Common practice, no source. */
const ONE_TRIP_DAYS = 28;
/** A voltage is worth taking where the pack is due within so many days ... */
const READ_WITHIN_DAYS = 400;
/** ... and its spread (p95 − p05) is at least this share of the time left ... */
const READ_SPREAD = 0.6;
/**
 * ... and this share of what not knowing costs at the best moment pays for the minutes. Measured in
 * simulated years (README.md): with a half, which a window narrowed from 10 % of life to 4.5 %
 * would save, the minutes cost several times what the readings saved; most are of packs whose
 * visit comes soon anyway.
 */
const READ_TELLS = 0.15;

export interface DueSite {
  readonly site: PlanningSite;
  readonly outlooks: readonly PackOutlook[];
  /** Outlooks of the packs that the visit would swap. */
  readonly swaps: readonly PackOutlook[];
  readonly tasks: readonly PlannedTask[];
  /** Due or near packs without a swap, because there are not enough cells. */
  readonly withoutCells: readonly PackOutlook[];
  /** Trips that the visit saves later. */
  readonly laterTrips: number;
}

/** Groups outlooks whose best later visits lie close together. */
function laterGroups(outlooks: readonly PackOutlook[]): PackOutlook[][] {
  const sorted = [...outlooks].sort((a, b) => (a.later.day < b.later.day ? -1 : 1));
  const groups: PackOutlook[][] = [];
  for (const outlook of sorted) {
    const group = groups.at(-1);
    const last = group?.at(-1);
    if (group && last && daysBetween(last.later.day, outlook.later.day) <= ONE_TRIP_DAYS) {
      group.push(outlook);
    } else groups.push([outlook]);
  }
  return groups;
}

/** Packs worth swapping in one visit: all due ones, and near ones by groups that save a trip. */
export function worthSwapping(
  outlooks: readonly PackOutlook[],
  tripShareMinor: Minor,
): PackOutlook[] {
  const due = outlooks.filter((outlook) => outlook.standing === "due");
  const near = laterGroups(outlooks.filter((outlook) => outlook.standing === "near"));
  const joining = near.filter(
    (group) => group.reduce((sum, o) => sum + o.gainMinor, tripShareMinor) > 0,
  );
  return [...due, ...joining.flat()];
}

/** Trips that visiting now saves later. */
export function tripsSaved(swaps: readonly PackOutlook[]): number {
  return laterGroups(swaps).length;
}

function worthReading({ pack, later }: PackOutlook, context: OutlookContext): boolean {
  const { now, prices } = context;
  const minutesMinor = (pack.readS / 3600) * prices.crewMinorPerHour;
  if (READ_TELLS * later.price.totalMinor < minutesMinor) return false;
  const left = expectation(pack.life, (t) => Math.max(0, t - now));
  const low = pack.life[Math.floor(pack.life.length * 0.05)]!;
  const high = pack.life[Math.floor(pack.life.length * 0.95)]!;
  return left <= READ_WITHIN_DAYS && high - low >= READ_SPREAD * left;
}

export function swapTask({ pack }: PackOutlook): PlannedTask {
  const { assetId, packId, cellTypeId, cells } = pack;
  return { kind: "swap", assetId, packId, cellTypeId, cells };
}

function readTask({ pack }: PackOutlook): PlannedTask {
  const { assetId, packId } = pack;
  return { kind: "read", assetId, packId, cellTypeId: null, cells: 0 };
}

/** Cells that may still be given out, by cell type; types that are missing have none. */
export type CellsOnHand = ReadonlyMap<string, number>;

/**
 * Scarce cells are shared by the search, which sees the drives; it is offered the packs that lose
 * most by waiting, up to so many times the cells there are. The rest would only make it slower.
 */
const OFFERED_TIMES_STOCK = 1.5;

/** Offers cells to the most urgent packs first. @returns packs that are not offered any */
function rationCells(wanted: readonly PackOutlook[], onHand: CellsOnHand): Set<PackOutlook> {
  const offered = new Map<string, number>();
  const without = new Set<PackOutlook>();
  for (const outlook of [...wanted].sort((a, b) => b.gainMinor - a.gainMinor)) {
    const { cellTypeId, cells } = outlook.pack;
    const have = onHand.get(cellTypeId) ?? 0;
    const before = offered.get(cellTypeId) ?? 0;
    if (have < cells || before + cells > OFFERED_TIMES_STOCK * have) without.add(outlook);
    else offered.set(cellTypeId, before + cells);
  }
  return without;
}

/** One visit cannot swap more than there is: its most urgent packs first. */
function withinStock(swaps: readonly PackOutlook[], onHand: CellsOnHand): PackOutlook[] {
  const left = new Map(onHand);
  return [...swaps]
    .sort((a, b) => b.gainMinor - a.gainMinor)
    .filter(({ pack: { cellTypeId, cells } }) => {
      const have = left.get(cellTypeId) ?? 0;
      if (have < cells) return false;
      left.set(cellTypeId, have - cells);
      return true;
    });
}

export interface SiteOutlooks {
  readonly site: PlanningSite;
  readonly outlooks: readonly PackOutlook[];
  readonly tripShareMinor: Minor;
}

/**
 * The sites that may go into a plan, with the work that a visit would do there, so far as there
 * are cells for it at all.
 */
export function dueSites(
  sites: readonly SiteOutlooks[],
  onHand: CellsOnHand,
  context: OutlookContext,
): DueSite[] {
  const wanted = sites.map((s) => worthSwapping(s.outlooks, s.tripShareMinor));
  const without = rationCells(wanted.flat(), onHand);
  return sites.flatMap(({ site, outlooks }, i): DueSite[] => {
    if (wanted[i]!.length === 0) return [];
    const offered = wanted[i]!.filter((outlook) => !without.has(outlook));
    const possible = new Set(withinStock(offered, onHand));
    const swaps = offered.filter((outlook) => possible.has(outlook));
    const stays = outlooks.filter((outlook) => !swaps.includes(outlook));
    const reads = swaps.length > 0 ? stays.filter((o) => worthReading(o, context)) : [];
    const due: DueSite = {
      site,
      outlooks,
      swaps,
      tasks: [...swaps.map(swapTask), ...reads.map(readTask)],
      withoutCells: wanted[i]!.filter((outlook) => !possible.has(outlook)),
      laterTrips: tripsSaved(swaps),
    };
    return [due];
  });
}

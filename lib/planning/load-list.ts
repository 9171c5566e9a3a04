/**
 * What must be in the van for a round: cells by type and lot, keys, tickets. Cells go out oldest
 * date code first, and the cells of one pack always come from one lot, because packs of mixed
 * lots are drawn down unevenly.
 */
import type { IsoDay } from "@/lib/units";
import type { Ticket } from "./fleet";

export interface LotOnHand {
  readonly lotId: string;
  readonly code: string;
  readonly cellTypeId: string;
  /** Date code; null when it is not known, which counts as the day of delivery. */
  readonly madeOn: IsoDay | null;
  readonly receivedOn: IsoDay;
  readonly cells: number;
}

export interface PackToLoad {
  readonly assetId: string;
  readonly tag: string;
  readonly cellTypeId: string;
  readonly cells: number;
}

export interface LoadLine {
  readonly cellTypeId: string;
  readonly lotId: string;
  readonly lotCode: string;
  readonly madeOn: IsoDay | null;
  readonly cells: number;
  /** Tags of the assets whose packs come from this lot. */
  readonly forTags: readonly string[];
}

export interface Shortage {
  readonly cellTypeId: string;
  readonly cells: number;
  readonly forTags: readonly string[];
}

export interface CellLoad {
  readonly lines: readonly LoadLine[];
  /** Packs for which no lot on hand has enough cells. */
  readonly shortages: readonly Shortage[];
}

function byDateCode(a: LotOnHand, b: LotOnHand): number {
  const [x, y] = [a.madeOn ?? a.receivedOn, b.madeOn ?? b.receivedOn];
  return x === y ? (a.code < b.code ? -1 : 1) : x < y ? -1 : 1;
}

function addTo<T extends { cells: number; forTags: string[] }>(line: T, pack: PackToLoad): void {
  line.cells += pack.cells;
  line.forTags.push(pack.tag);
}

/** Picks a lot for every pack: for each, the oldest lot that still has all its cells. */
export function loadCells(packs: readonly PackToLoad[], lots: readonly LotOnHand[]): CellLoad {
  const left = new Map(lots.map((lot) => [lot.lotId, lot.cells]));
  const sorted = [...lots].sort(byDateCode);
  const lines = new Map<string, LoadLine & { cells: number; forTags: string[] }>();
  const shortages = new Map<string, Shortage & { cells: number; forTags: string[] }>();
  // Largest packs first: a small one still fits into what they leave.
  for (const pack of [...packs].sort((a, b) => b.cells - a.cells)) {
    const lot = sorted.find(
      (l) => l.cellTypeId === pack.cellTypeId && left.get(l.lotId)! >= pack.cells,
    );
    if (!lot) {
      const none = { cellTypeId: pack.cellTypeId, cells: 0, forTags: [] };
      const line = shortages.get(pack.cellTypeId) ?? none;
      shortages.set(pack.cellTypeId, line);
      addTo(line, pack);
      continue;
    }
    left.set(lot.lotId, left.get(lot.lotId)! - pack.cells);
    const { lotId, code: lotCode, cellTypeId, madeOn } = lot;
    const line = lines.get(lotId) ?? { cellTypeId, lotId, lotCode, madeOn, cells: 0, forTags: [] };
    lines.set(lotId, line);
    addTo(line, pack);
  }
  const order = new Map(sorted.map((lot, i) => [lot.lotId, i]));
  return {
    lines: [...lines.values()].sort((a, b) => order.get(a.lotId)! - order.get(b.lotId)!),
    shortages: [...shortages.values()],
  };
}

export interface LoadedSite {
  readonly keyCode: string | null;
  readonly tickets: readonly Ticket[];
  readonly hazards: readonly string[];
}

/** Gear beside cells, from what the sites need. Common practice, no source. */
const GEAR: Partial<Record<string, string>> = {
  height: "ladder and harness",
  boat: "boat, life jackets",
  confined_space: "gas detector, tripod",
  roadside: "cones, high-visibility clothing",
  explosive_atmosphere: "work permit; nothing is opened without it",
};

/** Keys, tickets and gear for the round, each once, in the order of the stops. */
export function loadGear(sites: readonly LoadedSite[]) {
  const tickets = [...new Set(sites.flatMap((site) => site.tickets))];
  return {
    keys: [...new Set(sites.flatMap((site) => (site.keyCode ? [site.keyCode] : [])))],
    tickets,
    gear: tickets.flatMap((ticket) => GEAR[ticket] ?? []),
  };
}

/** What must be in the van for the stops that are still open, against what is there. */
import type { DayPack, DayRound } from "./day-pack";

export interface LoadLine {
  readonly cellTypeId: string;
  readonly designation: string;
  readonly needed: number;
  readonly inVan: number;
  /** Packs that no single lot in the van can fill: a pack's cells come from one lot. */
  readonly packsShort: number;
  readonly forTags: readonly string[];
}

export interface RoundLoad {
  readonly cells: readonly LoadLine[];
  readonly keys: readonly string[];
  readonly tickets: readonly string[];
}

/** The load of a round's open swaps; oldest lots first, whole packs from one lot. */
export function loadOfRound(day: DayPack, round: DayRound): RoundLoad {
  const open = round.stops.filter((stop) => stop.state === "planned");
  const sites = open.flatMap((stop) => day.sites.filter((site) => site.id === stop.siteId));
  return {
    cells: cellLines(day, open),
    keys: unique(sites.flatMap((site) => (site.keyCode ? [site.keyCode] : []))),
    tickets: unique(sites.flatMap((site) => site.tickets)),
  };
}

function cellLines(day: DayPack, stops: DayRound["stops"]): LoadLine[] {
  const tasks = stops
    .flatMap((stop) => stop.tasks)
    .filter((task) => task.kind === "swap" && task.state === "planned");
  const types = unique(tasks.flatMap((task) => (task.cellTypeId ? [task.cellTypeId] : [])));
  const lines = types.map((cellTypeId): LoadLine => {
    const own = tasks.filter((task) => task.cellTypeId === cellTypeId);
    const lots = (day.van?.lots ?? []).filter((lot) => lot.cellTypeId === cellTypeId);
    const left = lots.map((lot) => lot.cells);
    let packsShort = 0;
    for (const task of [...own].sort((a, b) => b.cells - a.cells)) {
      const lot = left.findIndex((cells) => cells >= task.cells);
      if (lot < 0) packsShort += 1;
      else left[lot] = (left[lot] ?? 0) - task.cells;
    }
    return {
      cellTypeId,
      designation: day.cellTypes.find((cell) => cell.id === cellTypeId)?.designation ?? "cells",
      needed: own.reduce((sum, task) => sum + task.cells, 0),
      inVan: lots.reduce((sum, lot) => sum + lot.cells, 0),
      packsShort,
      forTags: own.flatMap(
        (task) => day.assets.find((asset) => asset.id === task.assetId)?.tag ?? [],
      ),
    };
  });
  return lines.sort((a, b) => (a.designation < b.designation ? -1 : 1));
}

function unique(values: readonly string[]): string[] {
  return [...new Set(values)].sort();
}

/** Cells counted in the van by cell type; a type that is missing was not counted anew. */
export type LoadFound = Readonly<Record<string, number>>;

export interface CheckedLine extends LoadLine {
  /** Counted, or what the books say. */
  readonly found: number;
}

export interface LoadCheck {
  readonly lines: readonly CheckedLine[];
  /** Open stops that what is there is enough for, in the order of the round. */
  readonly stopsReached: readonly DayRound["stops"][number][];
  readonly stopsShort: readonly DayRound["stops"][number][];
}

/**
 * The load against a count: which stops can still be done, taken in order. Where a count is given it
 * holds whole packs by number alone; where none is, the books' lots decide.
 */
export function checkLoad(day: DayPack, round: DayRound, counted: LoadFound): LoadCheck {
  const { cells } = loadOfRound(day, round);
  const found = new Map(cells.map((line) => [line.cellTypeId, counted[line.cellTypeId] ?? null]));
  const piles = new Map(
    cells.map(({ cellTypeId }) => [cellTypeId, pilesOf(day, counted, cellTypeId)]),
  );
  const stopsReached: DayRound["stops"][number][] = [];
  const stopsShort: DayRound["stops"][number][] = [];
  const short = new Map<string, number>();
  for (const stop of round.stops.filter((candidate) => candidate.state === "planned")) {
    const missing = stop.tasks.filter((task) => !takePack(piles, task));
    for (const { cellTypeId } of missing) {
      short.set(cellTypeId ?? "", (short.get(cellTypeId ?? "") ?? 0) + 1);
    }
    (missing.length > 0 ? stopsShort : stopsReached).push(stop);
  }
  const lines = cells.map((line) => ({
    ...line,
    found: found.get(line.cellTypeId) ?? line.inVan,
    packsShort: short.get(line.cellTypeId) ?? 0,
  }));
  return { lines, stopsReached, stopsShort };
}

function pilesOf(day: DayPack, counted: LoadFound, cellTypeId: string): number[] {
  const count = counted[cellTypeId];
  if (count !== undefined) return [count];
  return (day.van?.lots ?? [])
    .filter((lot) => lot.cellTypeId === cellTypeId)
    .map((lot) => lot.cells);
}

/** Takes a swap's cells from one pile; true when there was one, or when none is needed. */
function takePack(
  piles: ReadonlyMap<string, number[]>,
  task: DayRound["stops"][number]["tasks"][number],
): boolean {
  if (task.kind !== "swap" || task.state !== "planned") return true;
  const own = piles.get(task.cellTypeId ?? "") ?? [];
  const pile = own.findIndex((cells) => cells >= task.cells);
  if (pile < 0) return false;
  own[pile] = (own[pile] ?? 0) - task.cells;
  return true;
}

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

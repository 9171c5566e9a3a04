import { loadOfRound } from "@/lib/offline/day";
import type { DayPack, DayRound } from "@/lib/sync/day-pack";

/** The load in one line: "Load: 10 LR20 · 4 LR6 · key 14". */
export function loadLine(day: DayPack, round: DayRound): string {
  const { cells, keys } = loadOfRound(day, round);
  const parts = [
    ...cells.map((line) => `${line.needed} ${line.designation}`),
    ...keys.map((key) => `key ${key}`),
  ];
  return parts.length > 0 ? `Load: ${parts.join(" · ")}` : "Nothing left to load.";
}

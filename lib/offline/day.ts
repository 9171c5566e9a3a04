import type { DayAsset, DayPack, DayStop } from "@/lib/sync/day-pack";

export { stopsInOrder } from "@/lib/sync/merge-day";
export { checkLoad, type LoadFound, loadOfRound } from "@/lib/sync/load-of-round";

export function findAsset(day: DayPack, assetId: string | null): DayAsset | null {
  return day.assets.find((asset) => asset.id === assetId) ?? null;
}

export function findStop(day: DayPack, stopId: string | null): DayStop | null {
  for (const round of day.rounds) {
    const stop = round.stops.find((candidate) => candidate.id === stopId);
    if (stop) return stop;
  }
  return null;
}

/** Assets whose tag, name or site's name holds every word typed, by tag. */
export function searchAssets(day: DayPack, typed: string): DayAsset[] {
  const words = typed.toLowerCase().split(/\s+/).filter(Boolean);
  const site = new Map(day.sites.map((found) => [found.id, found.name]));
  return day.assets.filter((asset) => {
    const text = `${asset.tag} ${asset.name} ${site.get(asset.siteId) ?? ""}`.toLowerCase();
    return words.every((word) => text.includes(word));
  });
}

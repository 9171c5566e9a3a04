import { FieldLink } from "@/components/ui/field-link";
import { WaneDisc } from "@/components/charts/wane-disc";
import type { DayAsset, DayPack, DaySite, DayStop } from "@/lib/sync/day-pack";
import { discOf } from "./day-view";
import { neighbourWords } from "./neighbour-words";

/** What else stands here: dying packs first, with a word on whether a swap now is worth it. */
export function Neighbours(props: { day: DayPack; site: DaySite; stop: DayStop }) {
  const { day, site, stop } = props;
  const planned = new Set(stop.tasks.map((task) => task.assetId));
  const others = day.assets
    .filter((asset) => asset.siteId === site.id && !planned.has(asset.id))
    .sort(byWorth);
  if (others.length === 0) return null;
  return (
    <section aria-labelledby="neighbours" className="flex flex-col gap-2">
      <h2 id="neighbours" className="text-xl">
        Also here
      </h2>
      <ul className="-mx-4 border-y border-rule bg-sheet">
        {others.map((asset) => {
          const disc = discOf(day, asset);
          return (
            <li key={asset.id} className="border-t border-rule first:border-t-0">
              <FieldLink
                href={`/find?asset=${asset.id}&stop=${stop.id}`}
                className="flex min-h-14 items-center gap-3 px-4 py-2"
              >
                <WaneDisc model={disc} size={24} decorative />
                <span className="min-w-0 flex-1">
                  <span className="block">
                    <span className="font-mono text-sm">{asset.tag}</span> {asset.name}
                  </span>
                  <span
                    className={`block ${asset.worth?.standing === "due" ? "font-semibold" : "text-soft"}`}
                  >
                    {neighbourWords(day, asset, disc)}
                  </span>
                </span>
              </FieldLink>
            </li>
          );
        })}
      </ul>
    </section>
  );
}

/** Those most worth doing first, then by when they are likely to stop. */
function byWorth(a: DayAsset, b: DayAsset): number {
  const rank = { due: 0, near: 1, later: 2 };
  const of = (asset: DayAsset) => rank[asset.worth?.standing ?? "later"];
  return of(a) - of(b) || likely(a) - likely(b);
}

function likely(asset: DayAsset): number {
  return asset.pack?.forecast ? Date.parse(asset.pack.forecast.p50) : Number.MAX_VALUE;
}

import Link from "next/link";
import { WaneDisc } from "@/components/charts/wane-disc";
import type { DayAsset, DayPack, DaySite, DayStop } from "@/lib/sync/day-pack";
import { discOf } from "./day-view";

/** What else stands here: dying packs first, with a word on whether a swap now is worth it. */
export function Neighbours(props: { day: DayPack; site: DaySite; stop: DayStop }) {
  const { day, site, stop } = props;
  const planned = new Set(stop.tasks.map((task) => task.assetId));
  const others = day.assets
    .filter((asset) => asset.siteId === site.id && !planned.has(asset.id))
    .sort((a, b) => likely(a) - likely(b));
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
              <Link
                href={`/find?asset=${asset.id}&stop=${stop.id}`}
                prefetch={false}
                className="flex min-h-14 items-center gap-3 px-4 py-2"
              >
                <WaneDisc model={disc} size={24} decorative />
                <span className="min-w-0 flex-1">
                  <span className="block">
                    <span className="font-mono text-sm">{asset.tag}</span> {asset.name}
                  </span>
                  <span className="block text-soft">{worth(disc.tone, disc.label)}</span>
                </span>
              </Link>
            </li>
          );
        })}
      </ul>
    </section>
  );
}

function likely(asset: DayAsset): number {
  return asset.pack?.forecast ? Date.parse(asset.pack.forecast.p50) : Number.MAX_VALUE;
}

function worth(tone: string, label: string): string {
  if (tone === "out") return `${label}: swap it while you are here`;
  if (tone === "soon") return `${label} left: worth swapping while you are here`;
  return tone === "order" ? `${label} left: can wait` : label;
}

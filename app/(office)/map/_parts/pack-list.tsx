"use client";

import Link from "next/link";
import { useEffect, useRef, useState } from "react";
import { WaneLabel } from "@/components/charts/wane-disc";
import { Section } from "@/components/ui/page-head";
import { EmptyState } from "@/components/ui/states";
import type { MapView } from "@/lib/usecases/read-map";

const FIRST = 60;

export interface PackListProps {
  packs: MapView["packs"];
  chosen: string | null;
  onChoose: (assetId: string) => void;
}

/** The same packs as on the map, in words: soonest first. */
export function PackList({ packs, chosen, onChoose }: PackListProps) {
  const [count, setCount] = useState(FIRST);
  const list = useRef<HTMLUListElement>(null);
  const shown = packs.filter((pack, i) => i < count || pack.assetId === chosen);
  useEffect(() => {
    list.current?.querySelector("[aria-current]")?.scrollIntoView({ block: "nearest" });
  }, [chosen]);
  return (
    <Section title="Packs, soonest first" aside={`${packs.length}`}>
      {packs.length === 0 && <EmptyState title="No pack is due in this span." />}
      <ul ref={list} className="max-h-[28rem] overflow-y-auto">
        {shown.map((pack) => (
          <li
            key={pack.assetId}
            aria-current={pack.assetId === chosen || undefined}
            className={`grid grid-cols-[5rem_minmax(0,1fr)_auto] gap-x-2 border-t border-hair px-3 py-1.5 first:border-t-0 ${pack.assetId === chosen ? "bg-picked" : ""}`}
          >
            <WaneLabel model={pack.disc} size={16} />
            <span className="min-w-0 truncate">{pack.name}</span>
            <button
              type="button"
              className="textlink text-sm"
              onClick={() => onChoose(pack.assetId)}
            >
              Show<span className="sr-only"> {pack.tag} on the map</span>
            </button>
            <Link className="textlink font-mono text-xs" href={`/fleet/${pack.tag}`}>
              {pack.tag}
            </Link>
            <span className="col-span-2 truncate text-sm text-soft">{pack.window}</span>
          </li>
        ))}
      </ul>
      {count < packs.length && (
        <p className="border-t border-hair px-3 py-1.5">
          <button type="button" className="textlink" onClick={() => setCount(count + 200)}>
            Show more
          </button>
        </p>
      )}
    </Section>
  );
}

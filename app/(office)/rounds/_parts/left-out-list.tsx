"use client";

import { useEffect, useRef, useState } from "react";
import Link from "next/link";
import { WaneLabel } from "@/components/charts/wane-disc";
import { Button } from "@/components/ui/button";
import { Section } from "@/components/ui/page-head";
import type { RoundsBoard } from "@/lib/usecases/read-rounds-board";
import type { Placing } from "./use-placing";

const FIRST = 12;

export interface LeftOutListProps {
  title: string;
  rows: RoundsBoard["leftOut"];
  /** Given where stops may be added. */
  placing?: Placing;
  /** The asset that was picked on the map. */
  lit: string | null;
}

/** What the plan leaves out and why, the dearest to wait for first. */
export function LeftOutList({ title, rows, placing, lit }: LeftOutListProps) {
  const [all, setAll] = useState(false);
  const whole = all || rows.findIndex((row) => row.assetId === lit) >= FIRST;
  const shown = whole ? rows : rows.slice(0, FIRST);
  const line = useRef<HTMLLIElement>(null);
  useEffect(() => line.current?.scrollIntoView({ block: "nearest" }), [lit]);
  return (
    <div className="mt-4">
      <Section title={title} aside={rows.length > 0 && `${rows.length} packs`}>
        {rows.length === 0 && (
          <p className="px-3 py-2.5 text-soft">Nothing that is due or near-due is left out.</p>
        )}
        <ul>
          {shown.map((row) => (
            <li
              key={row.assetId}
              ref={row.assetId === lit ? line : undefined}
              aria-current={row.assetId === lit || undefined}
              draggable={placing !== undefined}
              onDragStart={() =>
                placing?.pick({ name: row.tag, siteId: null, assetId: row.assetId })
              }
              onDragEnd={() => placing?.pick(null)}
              className={`grid grid-cols-[5.5rem_5.5rem_minmax(0,1fr)] items-center gap-x-3 gap-y-0.5 border-t border-hair px-3 py-1.5 first:border-t-0 md:grid-cols-[5rem_5.5rem_minmax(0,1fr)_minmax(0,1.6fr)_5rem_auto] ${row.assetId === lit ? "bg-picked" : ""}`}
            >
              <WaneLabel model={row.disc} size={18} />
              <Link className="textlink font-mono text-sm" href={`/fleet/${row.tag}`}>
                {row.tag}
              </Link>
              <span className="truncate">{row.name}</span>
              <span className="col-span-3 text-soft md:col-span-1">{row.why}</span>
              <span className="text-right whitespace-nowrap">{row.waiting}</span>
              {placing && (
                <Button
                  kind="quiet"
                  aria-label={`Add ${row.tag}`}
                  onClick={() =>
                    placing.pick({ name: row.tag, siteId: null, assetId: row.assetId })
                  }
                >
                  Add
                </Button>
              )}
            </li>
          ))}
        </ul>
        {rows.length > FIRST && (
          <p className="border-t border-hair px-3 py-1.5">
            <button type="button" className="textlink" onClick={() => setAll(!whole)}>
              {whole ? "Show fewer" : `Show all ${rows.length}`}
            </button>
          </p>
        )}
      </Section>
    </div>
  );
}

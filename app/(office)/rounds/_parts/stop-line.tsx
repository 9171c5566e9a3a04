"use client";

import { useEffect, useRef } from "react";
import { WaneDisc } from "@/components/charts/wane-disc";
import type { BoardRound } from "@/lib/usecases/read-rounds-board";
import type { BoardActs } from "./use-board";

export interface StopLineProps {
  stop: BoardRound["stops"][number];
  index: number;
  round: BoardRound;
  /** Picked out, here and on the map. */
  lit: boolean;
  onLight: () => void;
  editable: boolean;
  busy: boolean;
  acts: BoardActs;
  onMove: () => void;
  onDragEnd: () => void;
  onOrder: (siteIds: string[]) => void;
}

const act =
  "inline-flex min-h-7 items-center rounded border border-transparent px-1.5 text-sm text-dusk-ink hover:border-rule hover:bg-hair disabled:text-soft";

/** One stop of the chosen round. */
export function StopLine(props: StopLineProps) {
  const { stop, lit, editable, onMove, onDragEnd } = props;
  const line = useRef<HTMLLIElement>(null);
  useEffect(() => {
    if (lit) line.current?.scrollIntoView({ block: "nearest" });
  }, [lit]);
  return (
    <li
      ref={line}
      draggable={editable && !stop.locked}
      onDragStart={onMove}
      onDragEnd={onDragEnd}
      className={`grid grid-cols-[1.625rem_3.25rem_minmax(0,1fr)] items-start gap-x-2 border-t border-hair px-3 py-1.5 first:border-t-0 ${lit ? "bg-picked" : ""}`}
    >
      <span className="flex size-5.5 items-center justify-center rounded-full bg-dusk font-cond text-xs font-semibold text-on-dusk">
        {stop.position}
      </span>
      <span className="font-mono">{stop.time}</span>
      <span className="min-w-0">
        <button
          type="button"
          aria-pressed={lit}
          onClick={props.onLight}
          className={`text-left font-medium hover:underline ${lit ? "underline decoration-dusk decoration-2 underline-offset-2" : ""}`}
        >
          {stop.siteName}
        </button>
        {stop.state === "done" && <span className="text-spruce-ink"> · done</span>}
        {stop.state === "cannot_do" && <span className="text-brick-ink"> · could not be done</span>}
        {stop.locked && <span className="text-soft"> · locked</span>}
      </span>
      <ul className="col-span-2 col-start-2">
        {stop.tasks.map((task) => (
          <li key={task.assetId} className="flex items-center gap-2 text-sm">
            <WaneDisc model={task.disc} size={16} decorative />
            <span className="w-11 shrink-0 text-soft">{task.disc.label}</span>
            <span className="font-mono text-xs">{task.tag}</span>
            <span className="min-w-0 flex-1 truncate">{task.name}</span>
            <span className="font-cond whitespace-nowrap text-soft">{task.work}</span>
          </li>
        ))}
      </ul>
      {editable && <StopActs {...props} />}
    </li>
  );
}

function StopActs({ stop, index, round, busy, acts, onMove, onOrder }: StopLineProps) {
  const ids = round.stops.map((s) => s.siteId);
  const swap = (to: number) => {
    const next = [...ids];
    [next[index], next[to]] = [next[to]!, next[index]!];
    onOrder(next);
  };
  const name = stop.siteName;
  return (
    <div className="col-span-2 col-start-2 -ml-1.5 flex flex-wrap gap-x-1">
      <button type="button" className={act} disabled={busy || stop.locked} onClick={onMove}>
        Move<span className="sr-only"> {name}</span>
      </button>
      <button
        type="button"
        className={act}
        disabled={busy || index === 0}
        onClick={() => swap(index - 1)}
      >
        Earlier<span className="sr-only">: {name}</span>
      </button>
      <button
        type="button"
        className={act}
        disabled={busy || index === ids.length - 1}
        onClick={() => swap(index + 1)}
      >
        Later<span className="sr-only">: {name}</span>
      </button>
      <button
        type="button"
        className={act}
        disabled={busy}
        aria-pressed={stop.locked}
        onClick={() => acts.lock(stop.siteId, !stop.locked)}
      >
        {stop.locked ? "Unlock" : "Lock"}
        <span className="sr-only"> {name}</span>
      </button>
      <button
        type="button"
        className={act}
        disabled={busy || stop.locked}
        onClick={() => acts.act({ kind: "remove", siteId: stop.siteId }, `${name} taken out.`)}
      >
        Take out<span className="sr-only"> {name}</span>
      </button>
    </div>
  );
}

"use client";

import { useMemo } from "react";
import { DistrictMap } from "@/components/map/district-map";
import { LinkButton } from "@/components/ui/button";
import { EmptyState } from "@/components/ui/states";
import type { BoardRound, RoundsBoard } from "@/lib/usecases/read-rounds-board";
import { StopLine } from "./stop-line";
import type { BoardActs } from "./use-board";
import type { Placing } from "./use-placing";

export interface RoundPanelProps {
  board: RoundsBoard;
  round: BoardRound | null;
  acts: BoardActs;
  editable: boolean;
  placing: Placing;
  /** Site of the stop that is picked out, here and on the map. */
  site: string | null;
  onStop: (siteId: string, roundId: string) => void;
  onRound: (roundId: string) => void;
  /** A pack that is left out was picked on the map. */
  onLeftOut: (assetId: string) => void;
}

/** The chosen round: its map, its stops in order, and what can be done to each. */
export function RoundPanel(props: RoundPanelProps) {
  const { board, round, acts, editable, placing, site, onStop } = props;
  const rounds = useMemo(
    () =>
      board.rounds.map((r) => ({
        id: r.roundId,
        label: r.title,
        depot: r.depot,
        stops: r.stops.map((s) => ({ ...s, id: s.siteId, label: s.siteName })),
      })),
    [board.rounds],
  );
  const discs = useMemo(
    () =>
      board.leftOut.map((row) => ({
        id: row.assetId,
        label: `${row.tag}, left out: ${row.why}`,
        disc: row.disc,
        latitude: row.latitude,
        longitude: row.longitude,
      })),
    [board.leftOut],
  );
  const order = (siteIds: string[]) =>
    round &&
    acts.act(
      { kind: "reorder", technicianId: round.technicianId, day: round.day, siteIds },
      "Order changed.",
    );
  return (
    <aside aria-label="Chosen round" className="min-w-0 self-start border border-rule bg-sheet">
      <DistrictMap
        label="Map of the rounds; the stops of the chosen round are listed below"
        rounds={rounds}
        discs={discs}
        chosenRound={round?.roundId ?? null}
        chosenStop={site}
        onSelect={props.onLeftOut}
        onRound={props.onRound}
        onStop={onStop}
      />
      {!round && <EmptyState title="No round chosen.">Choose a round on the board.</EmptyState>}
      {round && (
        <>
          <div className="flex flex-wrap items-baseline justify-between gap-x-3 border-y border-ink px-3 py-2">
            <h2 className="text-md font-semibold">{round.title}</h2>
            <span className="text-soft">{round.summary}</span>
          </div>
          {board.reordered.includes(round.roundId) && (
            <p className="border-b border-rule px-3 py-2">
              In the technician’s own order, from the phone: times are about right.
            </p>
          )}
          <ol>
            {round.stops.map((stop, i) => (
              <StopLine
                key={stop.stopId}
                stop={stop}
                index={i}
                round={round}
                lit={site === stop.siteId}
                onLight={() => onStop(stop.siteId, round.roundId)}
                editable={editable && round.state === "proposed"}
                busy={acts.busy}
                acts={acts}
                onMove={() =>
                  placing.pick({ name: stop.siteName, siteId: stop.siteId, assetId: null })
                }
                onDragEnd={() => placing.pick(null)}
                onOrder={order}
              />
            ))}
          </ol>
          <div className="flex items-center justify-between gap-3 border-t border-rule px-3 py-2">
            <span className="text-sm text-soft">Load: {round.load || "nothing"}</span>
            <LinkButton href={`/rounds/${round.roundId}/print`}>Sheet to print</LinkButton>
          </div>
        </>
      )}
    </aside>
  );
}

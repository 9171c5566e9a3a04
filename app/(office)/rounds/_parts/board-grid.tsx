"use client";

import { useEffect, useRef } from "react";
import type { RoundsBoard } from "@/lib/usecases/read-rounds-board";
import { BoardCell } from "./board-cell";
import type { Placing } from "./use-placing";

export interface BoardGridProps {
  board: RoundsBoard;
  chosenId: string | null;
  onChoose: (roundId: string) => void;
  placing: Placing;
  onPlace: (technicianId: string, day: string) => void;
}

/** Technicians by days. */
export function BoardGrid({ board, chosenId, onChoose, placing, onPlace }: BoardGridProps) {
  const { picked } = placing;
  const top = useRef<HTMLParagraphElement>(null);
  // On a phone the stop was picked far below the board on which its places stand.
  useEffect(() => {
    if (picked) top.current?.scrollIntoView({ block: "nearest" });
  }, [picked]);
  return (
    <>
      {picked && (
        <p ref={top} role="status" className="mb-2 scroll-mt-2 flex flex-wrap items-center gap-3">
          <strong className="font-semibold">{picked.name}:</strong> choose a day and a technician.
          Each shows what it would cost.
          <button type="button" className="textlink" onClick={() => placing.pick(null)}>
            Put it back (Esc)
          </button>
        </p>
      )}
      <div className="relative overflow-x-auto border border-rule bg-sheet" tabIndex={-1}>
        <table className="w-full min-w-180 table-fixed border-collapse">
          <caption className="sr-only">Rounds by technician and day, {board.weekLabel}</caption>
          <thead>
            <tr className="border-b border-ink">
              <th scope="col" className="caps w-38 px-2.5 py-2 text-left align-bottom">
                Technician
              </th>
              {board.days.map((day) => (
                <th
                  key={day.day}
                  scope="col"
                  className="border-l border-hair px-2.5 py-2 text-left font-cond text-base font-semibold"
                >
                  {day.label}
                  {day.isToday && <span className="font-normal text-soft"> · today</span>}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {board.rows.map((row) => (
              <tr key={row.technicianId} className="border-t border-hair first:border-t-0">
                <th scope="row" className="px-2.5 py-2 text-left align-top font-normal">
                  <span className="block font-semibold">{row.name}</span>
                  <span className="block text-sm text-soft">{row.crew}</span>
                  <span className="block text-sm text-soft">{row.facts}</span>
                </th>
                {board.days.map(({ day, label }) => (
                  <BoardCell
                    key={day}
                    round={board.rounds.find(
                      (r) => r.technicianId === row.technicianId && r.day === day,
                    )}
                    off={row.off[day] ?? null}
                    who={`${row.name}, ${label}`}
                    chosen={chosenId}
                    onChoose={onChoose}
                    picking={picked !== null}
                    option={placing.optionAt(row.technicianId, day)}
                    onPlace={() => onPlace(row.technicianId, day)}
                  />
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </>
  );
}

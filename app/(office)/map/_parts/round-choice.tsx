"use client";

import { Section } from "@/components/ui/page-head";
import type { MapView } from "@/lib/usecases/read-map";

export interface RoundChoiceProps {
  rounds: MapView["rounds"];
  chosen: string | null;
  onChoose: (roundId: string | null) => void;
}

/** The week's rounds; one may be drawn with its numbers. */
export function RoundChoice({ rounds, chosen, onChoose }: RoundChoiceProps) {
  return (
    <Section title="Rounds of this week">
      {rounds.length === 0 && <p className="px-3 py-2 text-soft">No rounds this week.</p>}
      <ul className="max-h-52 overflow-y-auto">
        {rounds.map((round) => (
          <li key={round.roundId} className="border-t border-hair first:border-t-0">
            <button
              type="button"
              aria-pressed={chosen === round.roundId}
              onClick={() => onChoose(chosen === round.roundId ? null : round.roundId)}
              className={`flex w-full items-baseline justify-between gap-3 px-3 py-1.5 text-left hover:bg-hair ${chosen === round.roundId ? "bg-picked font-semibold" : ""}`}
            >
              <span>{round.title}</span>
              <span className="text-sm font-normal text-soft">
                {round.stopsLabel}
                {round.state === "proposed" && ", proposed"}
              </span>
            </button>
          </li>
        ))}
      </ul>
    </Section>
  );
}

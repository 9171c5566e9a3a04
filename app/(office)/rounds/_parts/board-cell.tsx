"use client";

import { DayBar } from "@/components/charts/day-bar";
import type { BoardRound } from "@/lib/usecases/read-rounds-board";
import type { PlaceOption } from "@/lib/usecases/price-plan-options";

export interface BoardCellProps {
  round: BoardRound | undefined;
  /** Why nobody works here, or null. */
  off: string | null;
  /** "Ada, Mon 7 Dec". */
  who: string;
  chosen: string | null;
  onChoose: (roundId: string) => void;
  /** Something is picked up and looks for a place. */
  picking: boolean;
  option: PlaceOption | undefined;
  onPlace: () => void;
}

const STATES: Record<string, string> = {
  published: "published",
  started: "under way",
  done: "done",
};

/** One technician's day: its round, or why there is none; while moving, the price of coming here. */
export function BoardCell(props: BoardCellProps) {
  const { round, off, chosen, picking, option } = props;
  const isChosen = round !== undefined && round.roundId === chosen;
  const hatched = off !== null && !round ? "hatch" : "";
  const outline = isChosen ? "outline-2 -outline-offset-2 outline-dusk outline-solid" : "";
  return (
    <td
      className={`h-24 border-l border-hair p-0 align-top ${hatched} ${outline}`}
      onDragOver={(event) => option?.allowed && event.preventDefault()}
      onDrop={(event) => {
        event.preventDefault();
        props.onPlace();
      }}
    >
      {picking ? (
        <Offer {...props} />
      ) : round ? (
        <Round {...props} round={round} />
      ) : (
        <Empty off={off} />
      )}
    </td>
  );
}

function Empty({ off }: { off: string | null }) {
  return (
    <span className="block px-2.5 py-2 text-soft">
      {off ?? <span className="sr-only">free</span>}
    </span>
  );
}

function Round({ round, who, chosen, onChoose }: BoardCellProps & { round: BoardRound }) {
  const state = STATES[round.state];
  return (
    <button
      type="button"
      aria-pressed={round.roundId === chosen}
      aria-label={`${who}: ${round.stopsLabel}, ${round.hours}${round.over ? ", overtime" : ""}, ${round.load}${state ? `, ${state}` : ", proposed"}`}
      onClick={() => onChoose(round.roundId)}
      className="block size-full px-2.5 py-2 text-left hover:bg-picked"
    >
      <DayBar model={round.bar} decorative />
      <span className="mt-1 flex items-baseline justify-between gap-2 text-sm">
        <strong className="font-semibold">{round.stopsLabel}</strong>
        <span className={round.over ? "font-semibold text-brick-ink" : "text-soft"}>
          {round.hours}
          {round.over && " · over"}
        </span>
      </span>
      <span className="block font-cond text-sm text-soft">{round.loadShort}</span>
      {state && <span className="caps block text-spruce-ink">{state}</span>}
    </button>
  );
}

/** What putting the picked stop here would do. */
function Offer({ who, option, onPlace, off }: BoardCellProps) {
  if (!option) return <Empty off={off ?? "…"} />;
  if (option.here) {
    return <span className="block px-2.5 py-2 font-semibold text-dusk-ink">stands here</span>;
  }
  if (!option.allowed) {
    return <span className="block px-2.5 py-2 text-sm text-soft">{option.words}</span>;
  }
  return (
    <button
      type="button"
      onClick={onPlace}
      aria-label={`Put it here: ${who}. Whole plan ${option.short}; ${option.words}`}
      className="block size-full px-2.5 py-2 text-left hover:bg-picked"
    >
      <span
        className={`block font-serif text-lg font-medium ${option.cheaper ? "text-spruce-ink" : "text-ink"}`}
      >
        {option.short}
      </span>
      <span className="block font-cond text-sm text-soft">{option.words}</span>
    </button>
  );
}

import { FieldLink } from "@/components/ui/field-link";
import { WaneDisc } from "@/components/charts/wane-disc";
import { formatTime } from "@/lib/present/format-time";
import type { DayPack, DayRound, DayStop } from "@/lib/sync/day-pack";
import { assetDisc, closedThen, nextStop, stopTitle, stopWork } from "./day-view";
import { CANNOT_WORDS } from "./field-words";

/** The stops in order, each with its state; the next one is marked. */
export function StopList({ day, round }: { day: DayPack; round: DayRound }) {
  const next = nextStop(round);
  return (
    <ol aria-label="Stops" className="-mx-4 border-y border-rule bg-sheet">
      {round.stops.map((stop) => (
        <li key={stop.id} className="border-t border-rule first:border-t-0">
          <FieldLink
            href={`/stop?id=${stop.id}`}
            aria-current={stop === next ? "step" : undefined}
            className={`flex min-h-17 items-center gap-3.5 py-2.5 pr-4 ${
              stop === next ? "border-l-[5px] border-spruce pl-2.75" : "pl-4"
            }`}
          >
            <Mark stop={stop} />
            <span className="min-w-0 flex-1">
              <span className="block font-semibold">{stopTitle(day, stop)}</span>
              <span className="block text-soft">{aboutStop(day, stop)}</span>
              <Shut day={day} round={round} stop={stop} />
            </span>
            <Due day={day} stop={stop} />
          </FieldLink>
        </li>
      ))}
    </ol>
  );
}

const marks = {
  planned: "bg-dusk text-on-dusk",
  done: "bg-rule text-ink",
  cannot_do: "border-2 border-brick-line text-brick-ink",
};

function Mark({ stop }: { stop: DayStop }) {
  const sign = { planned: stop.position, done: "✓", cannot_do: "✕" }[stop.state];
  return (
    <span
      aria-hidden="true"
      className={`flex size-8 shrink-0 items-center justify-center rounded-full font-semibold ${marks[stop.state]}`}
    >
      {sign}
    </span>
  );
}

function aboutStop(day: DayPack, stop: DayStop): string {
  const { organisation } = day;
  if (stop.state === "done") {
    return stop.doneAt ? `done ${formatTime(new Date(stop.doneAt), organisation)}` : "done";
  }
  if (stop.state === "cannot_do") {
    const word = CANNOT_WORDS[stop.cannotReason as keyof typeof CANNOT_WORDS];
    return `not done: ${(word ?? "no reason given").toLowerCase()}`;
  }
  return `${formatTime(new Date(stop.arrivesAt), organisation)} · ${stopWork(day, stop)}`;
}

/** A stop that the technician's own order brings to a closed gate. */
function Shut({ day, round, stop }: { day: DayPack; round: DayRound; stop: DayStop }) {
  const shut = round.reorderedAt && stop.state === "planned" ? closedThen(day, stop) : null;
  return shut && <span className="block font-semibold text-brick-ink">site {shut}</span>;
}

function Due({ day, stop }: { day: DayPack; stop: DayStop }) {
  const disc = stop.state === "planned" ? assetDisc(day, stop.tasks[0]?.assetId) : null;
  if (!disc) return null;
  return (
    <span className="flex shrink-0 flex-col items-center gap-0.5">
      <WaneDisc model={disc} size={24} decorative />
      <span className="font-cond text-sm">{disc.label}</span>
    </span>
  );
}

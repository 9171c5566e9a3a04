"use client";

import { useState } from "react";
import { BigButton } from "@/components/ui/big-button";
import { Notice } from "@/components/ui/notice";
import { fieldStore } from "@/lib/offline/browser-store";
import { checkLoad, loadOfRound, type LoadFound } from "@/lib/offline/day";
import type { DayPack, DayRound } from "@/lib/sync/day-pack";
import { Counter } from "./counter";
import { stopTitle } from "./day-view";
import { TICKET_WORDS } from "./field-words";

/** What the open stops need against what is counted in the van; a shortage goes to the office. */
export function LoadList({ day, round }: { day: DayPack; round: DayRound }) {
  const [counted, setCounted] = useState<LoadFound>({});
  const [trouble, setTrouble] = useState<string | null>(null);
  const [kept, setKept] = useState(false);
  const { keys, tickets } = loadOfRound(day, round);
  const check = checkLoad(day, round, counted);
  const keep = async () => {
    const lines = check.lines.map(({ cellTypeId, needed, found, packsShort }) => {
      return { cellTypeId, needed, found, packsShort };
    });
    const fault = await fieldStore().keep({
      ...{ kind: "load-check", roundId: round.id, lines, note: "" },
      stopsShort: check.stopsShort.map((stop) => stop.id),
    });
    setTrouble(fault);
    setKept(fault === null);
  };
  return (
    <section aria-label="Load" className="flex flex-col gap-3">
      {trouble && <Notice kind="trouble">{trouble}</Notice>}
      <ul aria-label="Cells" className="border-y border-rule">
        {check.lines.map((line) => (
          <li
            key={line.cellTypeId}
            className="flex flex-wrap items-center gap-x-3 gap-y-1 border-t border-hair py-2 first:border-t-0"
          >
            <span className="min-w-40 flex-1">
              <span className="font-semibold">
                {line.needed} × {line.designation}
              </span>
              <span className="block text-sm text-soft">
                {line.forTags.length > 4
                  ? `${line.forTags.slice(0, 3).join(", ")} and ${line.forTags.length - 3} more`
                  : line.forTags.join(", ")}
              </span>
              {line.packsShort > 0 && (
                <span className="block font-semibold text-brick-ink">
                  {line.packsShort} {line.packsShort === 1 ? "pack" : "packs"} short
                </span>
              )}
            </span>
            <Counter
              label={`${line.designation} in the van`}
              value={line.found}
              onChange={(found) => {
                setKept(false);
                setCounted({ ...counted, [line.cellTypeId]: found });
              }}
            />
          </li>
        ))}
      </ul>
      {keys.length > 0 && <p>Keys: {keys.join(", ")}</p>}
      {tickets.length > 0 && (
        <p>Tickets: {tickets.map((ticket) => TICKET_WORDS[ticket] ?? ticket).join(", ")}</p>
      )}
      {!day.van && <p className="text-soft">No van is set for you: count what you have.</p>}
      <StillDone day={day} {...check} />
      {kept ? (
        <Notice kind="done">
          The load is checked.
          {check.stopsShort.length > 0 && " The office is told what is short."}
        </Notice>
      ) : (
        <BigButton kind="go" onClick={() => void keep()}>
          {check.stopsShort.length > 0 ? "Tell the office what is short" : "The load is right"}
        </BigButton>
      )}
    </section>
  );
}

function StillDone(props: {
  day: DayPack;
  stopsReached: DayRound["stops"];
  stopsShort: DayRound["stops"];
}) {
  const { day, stopsReached, stopsShort } = props;
  if (stopsShort.length === 0) return null;
  const open = stopsReached.length + stopsShort.length;
  return (
    <Notice kind="warn">
      With this you can do {stopsReached.length} of {open} stops, in order. It does not reach for:{" "}
      {stopsShort.map((stop) => stopTitle(day, stop)).join(", ")}. Fetch more before you leave, or
      go round the others; a voltage can still be taken everywhere.
    </Notice>
  );
}

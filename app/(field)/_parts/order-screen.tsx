"use client";

import { useState } from "react";
import { BigButton } from "@/components/ui/big-button";
import { FieldBar } from "@/components/ui/field-bar";
import { FieldPage } from "@/components/ui/field-page";
import { Notice } from "@/components/ui/notice";
import { fieldStore } from "@/lib/offline/browser-store";
import { stopsInOrder } from "@/lib/offline/day";
import { formatTime } from "@/lib/present/format-time";
import type { DayPack, DayRound } from "@/lib/sync/day-pack";
import { closedThen, stopTitle } from "./day-view";

const arrow =
  "flex size-12 items-center justify-center rounded border-[1.5px] border-ink bg-sheet text-xl active:bg-hair disabled:border-rule disabled:text-soft";

/** The order of the open stops, changed by big buttons; what is done stays where it was. */
export function OrderScreen(props: { day: DayPack; round: DayRound; onClose: () => void }) {
  const { day, round, onClose } = props;
  const [order, setOrder] = useState(() => round.stops.map((stop) => stop.id));
  const [trouble, setTrouble] = useState<string | null>(null);
  const [moved, setMoved] = useState("");
  const stops = stopsInOrder(day, round, order);
  const open = stops.filter((stop) => stop.state === "planned");
  const move = (id: string, by: -1 | 1) => {
    const place = open.findIndex((stop) => stop.id === id);
    const other = open[place + by];
    if (!other) return;
    const swap = new Map([
      [id, other.id],
      [other.id, id],
    ]);
    setOrder(order.map((one) => swap.get(one) ?? one));
    const stop = open[place];
    if (stop) setMoved(`${stopTitle(day, stop)} is now ${place + by + 1} of ${open.length}.`);
  };
  const keep = async () => {
    const fault = await fieldStore().keep({
      kind: "reorder",
      roundId: round.id,
      stopIds: order,
    });
    if (fault) setTrouble(fault);
    else onClose();
  };
  return (
    <>
      <FieldBar title="Order of the stops" heading />
      <FieldPage
        foot={
          <>
            <BigButton kind="go" onClick={() => void keep()}>
              Keep this order
            </BigButton>
            <BigButton onClick={onClose}>Leave it as it was</BigButton>
          </>
        }
      >
        {trouble && <Notice kind="trouble">{trouble}</Notice>}
        <p className="text-soft">
          The office sees your order. Its times are reckoned from the plan’s drives: about right.
        </p>
        <p role="status" className="sr-only">
          {moved}
        </p>
        <ol aria-label="Open stops" className="-mx-4 border-y border-rule bg-sheet">
          {open.map((stop, n) => {
            const name = stopTitle(day, stop);
            const shut = closedThen(day, stop);
            return (
              <li
                key={stop.id}
                className="flex min-h-17 items-center gap-2.5 border-t border-rule px-4 py-2 first:border-t-0"
              >
                <span className="w-7 text-right font-semibold">{n + 1}</span>
                <span className="min-w-0 flex-1">
                  <span className="block font-semibold">{name}</span>
                  <span className="block text-soft">
                    {formatTime(new Date(stop.arrivesAt), day.organisation)}
                    {shut && <span className="font-semibold text-brick-ink"> · site {shut}</span>}
                  </span>
                </span>
                <button
                  type="button"
                  className={arrow}
                  aria-label={`Earlier: ${name}`}
                  disabled={n === 0}
                  onClick={() => move(stop.id, -1)}
                >
                  ▲
                </button>
                <button
                  type="button"
                  className={arrow}
                  aria-label={`Later: ${name}`}
                  disabled={n === open.length - 1}
                  onClick={() => move(stop.id, 1)}
                >
                  ▼
                </button>
              </li>
            );
          })}
        </ol>
      </FieldPage>
    </>
  );
}

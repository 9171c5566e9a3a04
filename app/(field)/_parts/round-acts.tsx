"use client";

import { useState } from "react";
import { BigButton } from "@/components/ui/big-button";
import { Notice } from "@/components/ui/notice";
import { fieldStore } from "@/lib/offline/browser-store";
import type { DayRound } from "@/lib/sync/day-pack";
import { nextStop } from "./day-view";

/** Start the round, go to the next stop, finish. */
export function RoundActs({ round, today }: { round: DayRound; today: string }) {
  const [trouble, setTrouble] = useState<string | null>(null);
  const act = async (word: "started" | "done") =>
    setTrouble(await fieldStore().keep({ kind: "round", roundId: round.id, act: word }));
  const next = nextStop(round);
  if (round.state === "done" || round.day > today) return null;
  return (
    <>
      {trouble && <Notice kind="trouble">{trouble}</Notice>}
      {round.state === "published" ? (
        <BigButton kind="go" onClick={() => void act("started")}>
          Start the round
        </BigButton>
      ) : next ? (
        <BigButton kind="go" href={`/stop?id=${next.id}`}>
          Next stop: {next.position} of {round.stops.length}
        </BigButton>
      ) : (
        <BigButton kind="go" onClick={() => void act("done")}>
          Finish the round
        </BigButton>
      )}
    </>
  );
}

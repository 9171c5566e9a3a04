"use client";

import { useCallback, useMemo, useState } from "react";
import { Notice } from "@/components/ui/notice";
import type { RoundsBoard } from "@/lib/usecases/read-rounds-board";
import { BoardFigures } from "./board-figures";
import { BoardGrid } from "./board-grid";
import { BoardHead } from "./board-head";
import { BuildProgress } from "./build-progress";
import { LeftOutList } from "./left-out-list";
import { RoundPanel } from "./round-panel";
import { useBoard } from "./use-board";
import { usePlacing } from "./use-placing";

export interface RoundsScreenProps {
  initial: RoundsBoard;
  chosenRound: string | null;
  crewId: string | null;
}

/** Rounds: build, adjust, publish. */
export function RoundsScreen({ initial, chosenRound, crewId }: RoundsScreenProps) {
  const acts = useBoard(initial, crewId);
  const { board } = acts;
  const { plan, rounds } = board;
  const placing = usePlacing(plan?.id ?? null, plan?.version ?? null);
  const [chosenId, choose] = useState(chosenRound);
  // the board's rounds, the list of stops and the map show one choice
  const [site, chooseSite] = useState<string | null>(null);
  const [leftOut, chooseLeftOut] = useState<string | null>(null);
  const chooseStop = useCallback((siteId: string, roundId: string) => {
    choose(roundId);
    chooseSite(siteId);
  }, []);
  const chosen = useMemo(
    () => rounds.find((r) => r.roundId === chosenId) ?? rounds[0] ?? null,
    [rounds, chosenId],
  );
  const editable = board.mayEdit && plan?.state === "draft";
  const place = (technicianId: string, day: string) => {
    const { picked } = placing;
    const option = placing.optionAt(technicianId, day);
    if (!picked || !option?.allowed) return;
    placing.pick(null);
    const done = `${picked.name}: ${option.dayLabel}, ${option.technician}. ${option.words}.`;
    if (picked.siteId) {
      acts.act({ kind: "move", siteId: picked.siteId, technicianId, day }, done);
    } else if (picked.assetId) {
      acts.act({ kind: "add", assetId: picked.assetId, technicianId, day }, done);
    }
  };
  return (
    <>
      <BoardHead acts={acts} crewId={crewId} />
      <BoardFigures acts={acts} />
      {(acts.trouble ?? placing.trouble) && (
        <Notice kind="trouble">{acts.trouble ?? placing.trouble}</Notice>
      )}
      {plan?.problem && <Notice kind="trouble">{plan.problem}</Notice>}
      {plan?.travelTrouble && (
        <Notice kind="warn">Driving times are only estimates: {plan.travelTrouble}.</Notice>
      )}
      {plan?.state === "building" && <BuildProgress plan={plan} acts={acts} />}
      <div className="grid gap-4 xl:grid-cols-[minmax(0,1fr)_27rem]">
        <div className="min-w-0">
          <BoardGrid
            board={board}
            chosenId={chosen?.roundId ?? null}
            onChoose={choose}
            placing={placing}
            onPlace={place}
          />
          {plan && plan.state !== "building" && (
            <LeftOutList
              title={`Left out of ${board.weekLabel} · and why`}
              rows={board.leftOut}
              lit={leftOut}
              {...(editable && { placing })}
            />
          )}
        </div>
        <RoundPanel
          board={board}
          round={chosen}
          acts={acts}
          editable={editable}
          placing={placing}
          site={site}
          onStop={chooseStop}
          onRound={choose}
          onLeftOut={chooseLeftOut}
        />
      </div>
    </>
  );
}

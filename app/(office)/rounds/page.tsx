import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { requireActor } from "@/lib/server/session";
import { readRoundsBoard } from "@/lib/usecases/read-rounds-board";
import { RoundsScreen } from "./_parts/rounds-screen";

export const metadata: Metadata = { title: "Rounds" };

interface RoundsParams {
  week?: string;
  plan?: string;
  round?: string;
  crew?: string;
}

export default async function RoundsPage(props: { searchParams: Promise<RoundsParams> }) {
  const { week = null, plan = null, round = null, crew = null } = await props.searchParams;
  const query = { week, planId: plan, roundId: round, crewId: crew };
  const board = await readRoundsBoard(deps(), await requireActor(), query);
  return (
    <RoundsScreen
      key={`${board.monday} ${board.plan?.id ?? ""} ${crew ?? ""}`}
      initial={board}
      chosenRound={round}
      crewId={crew}
    />
  );
}

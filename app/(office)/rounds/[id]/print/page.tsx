import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { isAppError } from "@/lib/errors";
import { deps } from "@/lib/server/deps";
import { requireActor } from "@/lib/server/session";
import { readRoundSheet } from "@/lib/usecases/read-round-sheet";
import { PrintButton } from "./_parts/print-button";
import { RoundSheet } from "./_parts/round-sheet";

export const metadata: Metadata = { title: "Round sheet" };

export default async function RoundSheetPage(props: { params: Promise<{ id: string }> }) {
  const { id } = await props.params;
  const actor = await requireActor();
  const sheet = await readRoundSheet(deps(), actor, { roundId: id }).catch((error: unknown) => {
    if (isAppError(error) && (error.code === "not_found" || error.code === "invalid")) notFound();
    throw error;
  });
  return (
    <>
      <PrintButton back={`/rounds?round=${id}`} />
      <RoundSheet sheet={sheet} />
    </>
  );
}

"use client";

import { FieldBar } from "@/components/ui/field-bar";
import { FieldPage } from "@/components/ui/field-page";
import { EmptyState } from "@/components/ui/states";
import { findAsset } from "@/lib/offline/day";
import type { ScreenProps } from "./screen";
import { SwapForm } from "./swap-form";

/** Swap the pack of an asset, or put its first one in. */
export function SwapScreen({ field, day, query }: ScreenProps) {
  const asset = findAsset(day, query.get("asset"));
  const stopId = query.get("stop");
  const mended = field.entries.find((entry) => entry.id === query.get("mend")) ?? null;
  const back = mended
    ? { href: "/outbox", label: "Back to what is kept" }
    : stopId
      ? { href: `/stop?id=${stopId}`, label: "Back to the stop" }
      : { href: "/today", label: "Back to the round" };
  const task = day.rounds
    .flatMap((round) => round.stops)
    .find((stop) => stop.id === stopId)
    ?.tasks.find((candidate) => candidate.assetId === asset?.id);
  if (asset) return <SwapForm {...{ day, asset, stopId, back, task, mended }} />;
  return (
    <>
      <FieldBar title="Swap the pack" heading back={back} />
      <FieldPage>
        <EmptyState title="This asset is not on this phone.">
          Find it by its tag, or load again where there is signal.
        </EmptyState>
      </FieldPage>
    </>
  );
}

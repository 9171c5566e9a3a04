"use client";

import { FieldBar } from "@/components/ui/field-bar";
import { FieldPage } from "@/components/ui/field-page";
import { EmptyState } from "@/components/ui/states";
import { findAsset } from "@/lib/offline/day";
import { LogForm } from "./log-form";
import type { ScreenProps } from "./screen";

/** Log a voltage: the keypad, and what the reading says. */
export function LogScreen({ day, query }: ScreenProps) {
  const asset = findAsset(day, query.get("asset"));
  const stopId = query.get("stop");
  const back = stopId
    ? { href: `/stop?id=${stopId}`, label: "Back to the stop" }
    : { href: "/today", label: "Back to the round" };
  if (asset?.pack) return <LogForm {...{ day, asset, stopId, back }} />;
  return (
    <>
      <FieldBar title="Log a voltage" heading back={back} />
      <FieldPage>
        <EmptyState
          title={asset ? "No pack is in this asset." : "This asset is not on this phone."}
        >
          Find it by its tag, or load again where there is signal.
        </EmptyState>
      </FieldPage>
    </>
  );
}

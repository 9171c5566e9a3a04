"use client";

import { useState } from "react";
import { BigButton } from "@/components/ui/big-button";
import { FieldBar } from "@/components/ui/field-bar";
import { FieldPage } from "@/components/ui/field-page";
import { Notice } from "@/components/ui/notice";
import { EmptyState } from "@/components/ui/states";
import { fieldStore } from "@/lib/offline/browser-store";
import { findAsset, findStop } from "@/lib/offline/day";
import { formatTime } from "@/lib/present/format-time";
import { AssetCard } from "./asset-card";
import { CANNOT_WORDS } from "./field-words";
import { Neighbours } from "./neighbours";
import type { ScreenProps } from "./screen";
import { SiteFacts } from "./site-facts";
import { SiteMap } from "./site-map";
import { StopNote } from "./stop-note";
import { stopTitle } from "./day-view";

const back = { href: "/today", label: "Back to the round" };

/** One stop: what to do, how to get in, what can hurt. */
export function StopScreen({ day, query }: ScreenProps) {
  const [trouble, setTrouble] = useState<string | null>(null);
  const stop = findStop(day, query.get("id"));
  const round = day.rounds.find((candidate) => candidate.stops.some((s) => s.id === stop?.id));
  const site = day.sites.find((candidate) => candidate.id === stop?.siteId);
  if (!stop || !round || !site) {
    return (
      <>
        <FieldBar title="Stop" heading back={back} />
        <FieldPage>
          <EmptyState title="This stop is not on this phone.">
            The round was changed, or the stop is another day’s. Go back to the round.
          </EmptyState>
        </FieldPage>
      </>
    );
  }
  const done = async () =>
    setTrouble(await fieldStore().keep({ kind: "stop-done", stopId: stop.id }));
  const planned = stop.tasks.flatMap((task) => findAsset(day, task.assetId) ?? []);
  return (
    <>
      <FieldBar
        title={`Stop ${stop.position} of ${round.stops.length}`}
        back={back}
        aside={formatTime(new Date(stop.arrivesAt), day.organisation)}
      />
      <FieldPage>
        {planned.length !== 1 && <h1 className="text-3xl">{stopTitle(day, stop)}</h1>}
        {stop.state === "done" && <Notice kind="done">This stop is done.</Notice>}
        {stop.state === "cannot_do" && (
          <Notice kind="warn">
            Not done: {CANNOT_WORDS[stop.cannotReason as keyof typeof CANNOT_WORDS] ?? "no reason"}.
          </Notice>
        )}
        {trouble && <Notice kind="trouble">{trouble}</Notice>}
        <SiteFacts site={site} named={planned.length !== 1} />
        {stop.tasks.map((task) => {
          const asset = findAsset(day, task.assetId);
          return asset ? (
            <AssetCard
              key={task.id}
              {...{ day, asset, task, stopId: stop.id }}
              heading={planned.length === 1 ? "h1" : "h2"}
            />
          ) : null;
        })}
        <div className="flex flex-col gap-2.5 border-t border-rule pt-4">
          <StopNote stopId={stop.id} />
          {stop.state !== "done" && (
            <BigButton href={`/cannot?stop=${stop.id}`}>Can’t do it today</BigButton>
          )}
          {stop.state === "planned" && (
            <BigButton onClick={() => void done()}>Leave: done here</BigButton>
          )}
        </div>
        <Neighbours day={day} site={site} stop={stop} />
        <SiteMap day={day} site={site} />
      </FieldPage>
    </>
  );
}

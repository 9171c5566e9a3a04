"use client";

import { useState } from "react";
import { BigButton } from "@/components/ui/big-button";
import { FieldBar } from "@/components/ui/field-bar";
import { FieldPage } from "@/components/ui/field-page";
import { Notice } from "@/components/ui/notice";
import { EmptyState } from "@/components/ui/states";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { formatDay } from "@/lib/present/format-day";
import { formatDistance } from "@/lib/present/format-quantity";
import type { DayPack, DayRound } from "@/lib/sync/day-pack";
import { fieldStatus } from "./field-status";
import { FieldMenu } from "./field-menu";
import { LoadList, loadLine } from "./load-list";
import { OtherDays } from "./other-days";
import { OutboxNotices } from "./outbox-notices";
import { RoundActs } from "./round-acts";
import type { ScreenProps } from "./screen";
import { StopList } from "./stop-list";
import { useNow } from "./use-now";

/** The day's round: what to load, where to go, what is done. */
export function TodayScreen({ field, day, query }: ScreenProps) {
  const now = useNow();
  const { locale, timeZone } = day.organisation;
  const today = dayOfInstant(now, timeZone);
  const shown = query.get("day") ?? today;
  const round = day.rounds.find((candidate) => candidate.day === shown) ?? null;
  const title = formatDay(shown, locale, { weekday: true, today });
  return (
    <>
      <FieldBar title={title} heading={!round} status={fieldStatus(field)} />
      <FieldPage foot={round && <RoundActs round={round} today={today} />}>
        <OutboxNotices field={field} />
        {round ? (
          <Round day={day} round={round} isToday={shown === today} />
        ) : (
          <EmptyState title={shown === today ? "No round today." : "No round on this day."}>
            Whatever you swap or measure can still be entered: find the asset by its tag.
          </EmptyState>
        )}
        <OtherDays day={day} shown={shown} today={today} />
        <BigButton href="/find">Find an asset</BigButton>
        <FieldMenu field={field} day={day} />
      </FieldPage>
    </>
  );
}

function Round({ day, round, isToday }: { day: DayPack; round: DayRound; isToday: boolean }) {
  const [loadOpen, setLoadOpen] = useState(false);
  const { locale } = day.organisation;
  const stops = round.stops.length;
  const over = round.stops.filter((stop) => stop.state !== "planned").length;
  return (
    <>
      <div className="flex flex-col gap-1">
        <p className="caps">{isToday ? "Today’s round" : "Round"}</p>
        <h1 className="text-3xl">
          {stops} {stops === 1 ? "stop" : "stops"}, {formatDistance(round.distanceM, locale)}
        </h1>
        <p className="text-soft">{loadLine(day, round)}</p>
      </div>
      {round.state === "done" && (
        <Notice kind="done">
          This round is finished: {over} of {stops} stops.
        </Notice>
      )}
      <BigButton aria-expanded={loadOpen} onClick={() => setLoadOpen(!loadOpen)}>
        Check the load
      </BigButton>
      {loadOpen && <LoadList day={day} round={round} />}
      <StopList day={day} round={round} />
    </>
  );
}

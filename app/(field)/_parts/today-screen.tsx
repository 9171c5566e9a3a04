"use client";

import { lazy, Suspense, useState } from "react";
import { BigButton } from "@/components/ui/big-button";
import { FieldBar } from "@/components/ui/field-bar";
import { FieldPage } from "@/components/ui/field-page";
import { Notice } from "@/components/ui/notice";
import { EmptyState } from "@/components/ui/states";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { formatDay } from "@/lib/present/format-day";
import { formatDistance } from "@/lib/present/format-quantity";
import { formatTime } from "@/lib/present/format-time";
import type { DayPack, DayRound } from "@/lib/sync/day-pack";
import { fieldStatus } from "./field-status";
import { loadLine } from "./load-line";
import { OtherDays } from "./other-days";
import { OutboxNotices } from "./outbox-notices";
import { RoundActs } from "./round-acts";
import type { ScreenProps } from "./screen";
import { StopList } from "./stop-list";
import { trueTime, useNow } from "./use-now";

const loadLoad = () => import("./load-list");
const loadOrder = () => import("./order-screen");
const loadMenu = () => import("./field-menu");
const FieldMenu = lazy(async () => ({ default: (await loadMenu()).FieldMenu }));
const LoadList = lazy(async () => ({ default: (await loadLoad()).LoadList }));
const OrderScreen = lazy(async () => ({ default: (await loadOrder()).OrderScreen }));

/** The parts of this screen that are loaded when they are asked for. */
export const loadTodayParts = () => Promise.all([loadLoad(), loadOrder(), loadMenu()]);

/** The day's round: what to load, where to go, what is done. */
export function TodayScreen({ field, day, query }: ScreenProps) {
  const now = trueTime(useNow(), field.skewMs);
  const [ordering, setOrdering] = useState(false);
  const { locale, timeZone } = day.organisation;
  const today = dayOfInstant(now, timeZone);
  const shown = query.get("day") ?? today;
  const round = day.rounds.find((candidate) => candidate.day === shown) ?? null;
  if (round && ordering) {
    return (
      <Suspense>
        <OrderScreen {...{ day, round }} onClose={() => setOrdering(false)} />
      </Suspense>
    );
  }
  const title = formatDay(shown, locale, { weekday: true, today });
  return (
    <>
      <FieldBar title={title} heading={!round} status={fieldStatus(field)} />
      <FieldPage foot={round && <RoundActs round={round} today={today} />}>
        <OutboxNotices field={field} />
        {round ? (
          <Round {...{ day, round, isToday: shown === today }} onOrder={() => setOrdering(true)} />
        ) : (
          <EmptyState title={shown === today ? "No round today." : "No round on this day."}>
            Whatever you swap or measure can still be entered: find the asset by its tag.
          </EmptyState>
        )}
        <OtherDays day={day} shown={shown} today={today} />
        <BigButton href="/find">Find an asset</BigButton>
        <Suspense>
          <FieldMenu field={field} day={day} />
        </Suspense>
      </FieldPage>
    </>
  );
}

function Round(props: { day: DayPack; round: DayRound; isToday: boolean; onOrder: () => void }) {
  const { day, round, isToday, onOrder } = props;
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
        {round.reorderedAt && (
          <p className="text-soft">In your own order: its times are reckoned, about right.</p>
        )}
      </div>
      {round.orderReplacedAt && (
        <Notice kind="warn">
          The office put your stops in another order at{" "}
          {formatTime(new Date(round.orderReplacedAt), day.organisation)}: your own no longer holds.
        </Notice>
      )}
      {round.state === "done" && (
        <Notice kind="done">
          This round is finished: {over} of {stops} stops.
        </Notice>
      )}
      <BigButton aria-expanded={loadOpen} onClick={() => setLoadOpen(!loadOpen)}>
        Check the load
      </BigButton>
      {loadOpen && (
        <Suspense>
          <LoadList day={day} round={round} />
        </Suspense>
      )}
      <StopList day={day} round={round} />
      {stops - over > 1 && round.state !== "done" && (
        <BigButton onClick={onOrder}>Change the order</BigButton>
      )}
    </>
  );
}

"use client";

import dynamic from "next/dynamic";
import { useState } from "react";
import { dateOfDay, dayShown } from "@/components/calendar/wall-clock";
import { LinkButton } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { Skeleton } from "@/components/ui/states";
import type { CalendarEvent } from "@/lib/present/calendar-event";
import type { CalendarView } from "@/lib/usecases/read-calendar";
import { MoveDialog } from "./move-dialog";
import { useCalendar } from "./use-calendar";

const VisitCalendar = dynamic(
  () => import("@/components/calendar/visit-calendar").then((module) => module.VisitCalendar),
  { ssr: false, loading: () => <Skeleton label="Loading the calendar" rows={14} /> },
);

export interface CalendarScreenProps {
  initial: CalendarView;
  /** The day it opens on. */
  day: string;
  view: string;
  span: { readonly from: string; readonly to: string };
}

type ViewName = "month" | "week" | "day";

/** The Calendar: month, week, technicians side by side. */
export function CalendarScreen({ initial, day, view, span }: CalendarScreenProps) {
  const [shownView, setView] = useState<ViewName>(isView(view) ? view : "week");
  const [date, setDate] = useState(() => dateOfDay(day));
  const [chosen, choose] = useState<CalendarEvent | null>(null);
  const calendar = useCalendar(initial, span, spanAround(dayShown(date), span));
  const { drafts, technicians, timeZone, workingDays, mayEdit, events } = calendar.view;
  const remember = (nextView: ViewName, nextDate: Date) => {
    setView(nextView);
    setDate(nextDate);
    const address = `/calendar?view=${nextView}&date=${dayShown(nextDate)}`;
    window.history.replaceState(null, "", address);
  };
  return (
    <>
      {calendar.trouble && <Notice kind="trouble">{calendar.trouble}</Notice>}
      {drafts.map((draft) => (
        <Notice
          key={draft.id}
          action={
            <LinkButton href={`/rounds?plan=${draft.id}&week=${draft.firstDay}`}>
              Look over and publish
            </LinkButton>
          }
        >
          {draft.name} is a draft: its visits (dashed) are proposed, and nobody has been told.
        </Notice>
      ))}
      <VisitCalendar
        events={events}
        technicians={technicians}
        timeZone={timeZone}
        weekStartsOn={Math.min(...workingDays)}
        view={shownView}
        date={date}
        editable={mayEdit && !calendar.move.isPending}
        onView={(next) => isView(next) && remember(next, date)}
        onNavigate={(next) => remember(shownView, next)}
        onSelect={choose}
        onMove={(event, to, technicianId) => {
          const stays = to === event.day && technicianId === event.technicianId;
          if (!stays) calendar.move.mutate({ event, day: to, technicianId });
        }}
      />
      <p className="mt-2 text-sm text-soft">
        Times are those of {timeZone}. Drag a visit to another day or person, or choose it and say
        where it should go. {mayEdit ? "" : "Your role can look, not move."}
      </p>
      {chosen && (
        <MoveDialog
          event={chosen}
          mayEdit={mayEdit && chosen.movable}
          onClose={() => choose(null)}
          onMove={(to, technicianId) => {
            calendar.move.mutate({ event: chosen, day: to, technicianId });
            choose(null);
          }}
        />
      )}
    </>
  );
}

function isView(name: string): name is ViewName {
  return name === "month" || name === "week" || name === "day";
}

/** The span that was loaded while it holds the day with a week to spare, else the day's own. */
function spanAround(day: string, loaded: { readonly from: string; readonly to: string }) {
  const date = dateOfDay(day);
  const shift = (days: number) =>
    dayShown(new Date(date.getFullYear(), date.getMonth(), date.getDate() + days, 12));
  const inside = loaded.from <= shift(-14) && shift(14) <= loaded.to;
  if (inside) return loaded;
  const first = new Date(date.getFullYear(), date.getMonth(), -8, 12);
  const last = new Date(date.getFullYear(), date.getMonth() + 1, 16, 12);
  return { from: dayShown(first), to: dayShown(last) };
}

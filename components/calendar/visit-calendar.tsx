"use client";

import "react-big-calendar/lib/css/react-big-calendar.css";
import "react-big-calendar/lib/addons/dragAndDrop/styles.css";
import "./visit-calendar.css";
import { format, getDay, parse, startOfWeek } from "date-fns";
import { enGB } from "date-fns/locale/en-GB";
import { useMemo } from "react";
import { Calendar, dateFnsLocalizer, type View } from "react-big-calendar";
import withDragAndDrop from "react-big-calendar/lib/addons/dragAndDrop";
import type { CalendarEvent } from "@/lib/present/calendar-event";
import { hoursShown, type Shown, shownVisit, type Technician } from "./shown-visit";
import { dayShown } from "./wall-clock";
import { weekByTechnician } from "./week-by-technician";

export interface VisitCalendarProps {
  events: readonly CalendarEvent[];
  technicians: readonly Technician[];
  timeZone: string;
  /** 1 Monday to 7 Sunday. */
  weekStartsOn: number;
  view: View;
  date: Date;
  editable: boolean;
  onView: (view: View) => void;
  onNavigate: (date: Date) => void;
  onSelect: (event: CalendarEvent) => void;
  /** `technicianId` is the event's own in the month, which has no places for technicians. */
  onMove: (event: CalendarEvent, day: string, technicianId: string) => void;
}

const DragCalendar = withDragAndDrop<Shown, Technician>(Calendar);
const VIEWS = { month: true, week: weekByTechnician, day: true } as const;
/** At this height of an hour the shortest visit still holds its line of words. */
const HOUR_REM = 5.25;
const MESSAGES = {
  today: "Today",
  previous: "Back",
  next: "Next",
  month: "Month",
  week: "Week",
  day: "Technicians side by side",
  showMore: (count: number) => `${count} more`,
  noEventsInRange: "No visits on these days.",
};

/** Visits by month, by week and technician, or one day with the technicians side by side. */
export function VisitCalendar(props: VisitCalendarProps) {
  const { events, technicians, timeZone, weekStartsOn, view, editable } = props;
  const localizer = useMemo(() => {
    const first = (weekStartsOn % 7) as 0 | 1 | 2 | 3 | 4 | 5 | 6;
    return dateFnsLocalizer({
      format,
      parse,
      getDay,
      startOfWeek: (date: Date) => startOfWeek(date, { weekStartsOn: first }),
      locales: { "en-GB": enGB },
    });
  }, [weekStartsOn]);
  const shown = useMemo(
    () => events.map((event) => shownVisit(event, timeZone)),
    [events, timeZone],
  );
  const today = dayShown(props.date);
  const hours = hoursShown(shown.filter((visit) => dayShown(visit.start) === today));
  return (
    <DragCalendar
      className={`visit-calendar visit-calendar-${view}`}
      {...(view === "day" && { style: { height: `${(hours.to - hours.from) * HOUR_REM + 6}rem` } })}
      localizer={localizer}
      culture="en-GB"
      messages={MESSAGES}
      events={shown}
      view={view}
      views={VIEWS}
      date={props.date}
      onView={props.onView}
      onNavigate={props.onNavigate}
      min={new Date(2000, 0, 1, hours.from)}
      max={new Date(2000, 0, 1, hours.to - 1, 59)}
      step={30}
      timeslots={2}
      dayLayoutAlgorithm="no-overlap"
      popup
      resizable={false}
      {...(view !== "month" && {
        resources: [...technicians],
        resourceIdAccessor: "id",
        resourceTitleAccessor: "name",
      })}
      tooltipAccessor={({ event }) => event.label}
      draggableAccessor={({ event }) => editable && event.movable}
      eventPropGetter={({ event }) => ({ className: `visit visit-${event.state}` })}
      components={COMPONENTS}
      onSelectEvent={({ event }) => props.onSelect(event)}
      onKeyPressEvent={({ event }, key) => {
        const pressed = key as unknown as KeyboardEvent;
        if (pressed.code !== "Enter" && pressed.code !== "Space") return;
        // Else the same key would press the button of the dialog that it opens.
        pressed.preventDefault();
        props.onSelect(event);
      }}
      onEventDrop={({ event: { event }, start, resourceId }) =>
        props.onMove(
          event,
          dayShown(new Date(start)),
          view !== "month" && resourceId ? String(resourceId) : event.technicianId,
        )
      }
      formats={{
        dayFormat: "EEE d MMM",
        dayHeaderFormat: "EEEE d MMMM yyyy",
        dayRangeHeaderFormat: ({ start, end }) =>
          `${format(start, "d MMM")} – ${format(end, "d MMM yyyy")}`,
        timeGutterFormat: "HH:mm",
        eventTimeRangeFormat: ({ start }) => format(start, "HH:mm"),
      }}
    />
  );
}

/** The library's own head claims to be a column header of a table that does not exist. */
function DayWords({ label }: { label: string }) {
  return <span>{label}</span>;
}

function VisitWords({ event: { event, start } }: { event: Shown }) {
  return (
    <span aria-label={event.label}>
      <span className="visit-time font-mono text-2xs">{format(start, "HH:mm")}</span> {event.title}
      <span className="visit-who"> · {event.technician}</span>
    </span>
  );
}

/** In rows of days the library's element takes no focus: a button inside it does. */
function VisitButton({ event }: { event: Shown }) {
  return (
    <button type="button" className="visit-button">
      <VisitWords event={event} />
    </button>
  );
}

const COMPONENTS = {
  event: VisitWords,
  header: DayWords,
  month: { event: VisitButton },
  week: { event: VisitButton },
};

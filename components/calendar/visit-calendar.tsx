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
import { dayShown, onWallClock } from "./wall-clock";

interface Shown {
  readonly event: CalendarEvent;
  readonly start: Date;
  readonly end: Date;
  readonly title: string;
  readonly resourceId: string;
}

interface Resource {
  readonly id: string;
  readonly name: string;
}

export interface VisitCalendarProps {
  events: readonly CalendarEvent[];
  technicians: readonly Resource[];
  timeZone: string;
  /** 1 Monday to 7 Sunday. */
  weekStartsOn: number;
  view: View;
  date: Date;
  editable: boolean;
  onView: (view: View) => void;
  onNavigate: (date: Date) => void;
  onSelect: (event: CalendarEvent) => void;
  /** `technicianId` is the event's own where the view has no columns of technicians. */
  onMove: (event: CalendarEvent, day: string, technicianId: string) => void;
}

const DragCalendar = withDragAndDrop<Shown, Resource>(Calendar);
const VIEWS: View[] = ["month", "week", "day"];
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
const DAY_STARTS = new Date(2000, 0, 1, 6);
const DAY_ENDS = new Date(2000, 0, 1, 19);

/** Visits by month, by week, or one day with the technicians side by side. */
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
    () =>
      events.map((event): Shown => ({
        event,
        start: onWallClock(event.startsAt, timeZone),
        end: onWallClock(event.endsAt, timeZone),
        title: event.title,
        resourceId: event.technicianId,
      })),
    [events, timeZone],
  );
  return (
    <DragCalendar
      className="visit-calendar"
      localizer={localizer}
      culture="en-GB"
      messages={MESSAGES}
      events={shown}
      view={view}
      views={VIEWS}
      date={props.date}
      onView={props.onView}
      onNavigate={props.onNavigate}
      min={DAY_STARTS}
      max={DAY_ENDS}
      step={30}
      timeslots={2}
      dayLayoutAlgorithm="no-overlap"
      popup
      resizable={false}
      {...(view === "day" && {
        resources: [...technicians],
        resourceIdAccessor: "id",
        resourceTitleAccessor: "name",
      })}
      tooltipAccessor={({ event }) => event.label}
      draggableAccessor={({ event }) => editable && event.movable}
      eventPropGetter={({ event }) => ({ className: `visit visit-${event.state}` })}
      components={{ event: VisitWords, header: DayWords }}
      onSelectEvent={({ event }) => props.onSelect(event)}
      onEventDrop={({ event: { event }, start, resourceId }) =>
        props.onMove(
          event,
          dayShown(new Date(start)),
          view === "day" && resourceId ? String(resourceId) : event.technicianId,
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

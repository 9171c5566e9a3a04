"use client";

import { useEffect, useRef } from "react";
import type { DateLocalizer, ViewStatic } from "react-big-calendar";
import DateContentRow from "react-big-calendar/lib/DateContentRow";
import type { Shown, Technician } from "./shown-visit";

/** What the calendar library hands to a view. */
interface WeekProps {
  date: Date;
  events: readonly Shown[];
  resources: readonly Technician[];
  localizer: DateLocalizer;
  getNow: () => Date;
  onSelectEvent: (...given: never[]) => void;
  onDrillDown: (date: Date, view: string) => void;
  accessors: object;
  getters: object;
  components: object;
}

/**
 * A week with a row for each technician and a column for each day: five abreast in one day's
 * column nobody could read. Days on which nobody works or is expected are left out at its end.
 */
function WeekByTechnician(props: WeekProps) {
  const { date, localizer, events, resources } = props;
  const days = daysShown(weekOf(date, localizer), events);
  return (
    <div className="rbc-month-view week-by-technician" role="group" aria-label="Visits of the week">
      <div className="week-line week-head">
        <span className="week-name">Technician</span>
        <span className="week-days">
          {days.map((day) => (
            <DayHead key={day.toISOString()} day={day} {...props} />
          ))}
        </span>
      </div>
      {resources.map((technician) => (
        <TechnicianLine key={technician.id} technician={technician} days={days} {...props} />
      ))}
    </div>
  );
}

/** The library's types know nothing of the localizer that it hands to these. */
interface Given {
  readonly localizer: DateLocalizer;
}

const statics = {
  range: (date: Date, { localizer }: Given) => weekOf(date, localizer),
  navigate: (date: Date, action: string, { localizer }: Given) =>
    localizer.add(date, { PREV: -1, NEXT: 1 }[action] ?? 0, "week"),
  title: (date: Date, { localizer }: Given) => {
    const week = weekOf(date, localizer);
    const range = { start: week[0], end: week[6] };
    return localizer.format(range as never, "dayRangeHeaderFormat");
  },
};

export const weekByTechnician = Object.assign(WeekByTechnician, statics as unknown as ViewStatic);

function DayHead({ day, ...props }: WeekProps & { day: Date }) {
  const { localizer, getNow, onDrillDown } = props;
  const isToday = localizer.isSameDate(day, getNow());
  return (
    <span className={`week-day ${isToday ? "rbc-today" : ""}`}>
      <button type="button" onClick={() => onDrillDown(day, "day")}>
        {localizer.format(day, "dayFormat")}
      </button>
    </span>
  );
}

function TechnicianLine({
  technician,
  days,
  ...props
}: WeekProps & { technician: Technician; days: Date[] }) {
  const { localizer, accessors, getters, components, getNow, events } = props;
  const own = events
    .filter((visit) => visit.resourceId === technician.id && isOn(days, visit.start))
    .sort((a, b) => a.start.getTime() - b.start.getTime());
  const line = useRef<HTMLDivElement>(null);
  // The library calls these parts rows of a table, but puts buttons where cells would have to be.
  useEffect(() => {
    const parts = line.current?.querySelectorAll("[role=row], [role=rowgroup]") ?? [];
    for (const part of parts) part.removeAttribute("role");
  });
  return (
    <div ref={line} className="week-line" role="group" aria-label={technician.name}>
      <div className="week-name">{technician.name}</div>
      <DateContentRow
        {...{ localizer, accessors, getters, components, getNow }}
        className="rbc-month-row"
        range={days}
        events={own}
        resourceId={technician.id}
        minRows={1}
        maxRows={Infinity}
        resizable={false}
        onSelect={props.onSelectEvent}
        renderHeader={({ date, key }) => (
          <span key={key} className="sr-only">
            {technician.name}, {localizer.format(date, "dayFormat")}
          </span>
        )}
      />
    </div>
  );
}

function weekOf(date: Date, localizer: DateLocalizer): Date[] {
  const first = localizer.startOf(date, "week", localizer.startOfWeek(""));
  return [0, 1, 2, 3, 4, 5, 6].map((n) => localizer.add(first, n, "day"));
}

/** The first five days, and the last two when something happens on either. */
function daysShown(week: Date[], events: readonly Shown[]): Date[] {
  const end = week.slice(5);
  return events.some((visit) => isOn(end, visit.start)) ? week : week.slice(0, 5);
}

function isOn(days: readonly Date[], moment: Date): boolean {
  return days.some((day) => day.toDateString() === moment.toDateString());
}

import type { CalendarEvent } from "@/lib/present/calendar-event";
import { onWallClock } from "./wall-clock";

/** A visit as the calendar library takes it: its times on the organisation's clock. */
export interface Shown {
  readonly event: CalendarEvent;
  readonly start: Date;
  readonly end: Date;
  readonly title: string;
  readonly resourceId: string;
}

export interface Technician {
  readonly id: string;
  readonly name: string;
}

export function shownVisit(event: CalendarEvent, timeZone: string): Shown {
  return {
    event,
    start: onWallClock(event.startsAt, timeZone),
    end: onWallClock(event.endsAt, timeZone),
    title: event.title,
    resourceId: event.technicianId,
  };
}

/** Hours of the clock that hold these visits, and a usual working day besides. */
export function hoursShown(visits: readonly Shown[]): {
  readonly from: number;
  readonly to: number;
} {
  const starts = visits.map((visit) => visit.start.getHours());
  const ends = visits.map((visit) => visit.end.getHours() + 1);
  return { from: Math.min(7, ...starts), to: Math.min(24, Math.max(17, ...ends)) };
}

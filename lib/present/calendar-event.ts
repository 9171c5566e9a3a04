import { formatTime } from "./format-time";
import type { Presentation } from "./locale";

export interface CalendarStopInput {
  readonly stopId: string;
  readonly siteId: string;
  readonly siteName: string;
  readonly position: number;
  readonly state: string;
  readonly locked: boolean;
  readonly arrivesAt: Date;
  readonly departsAt: Date;
  readonly tasks: readonly { readonly kind: string; readonly tag: string }[];
}

export interface CalendarEvent {
  readonly stopId: string;
  readonly siteId: string;
  readonly planId: string;
  readonly roundId: string;
  readonly technicianId: string;
  readonly technician: string;
  readonly day: string;
  /** ISO 8601 instants. */
  readonly startsAt: string;
  readonly endsAt: string;
  readonly title: string;
  /** "08:35 Sluice 9, 2 swaps, Ada, proposed": for reading out. */
  readonly label: string;
  readonly state: "proposed" | "published" | "started" | "done";
  readonly movable: boolean;
}

function workWords(tasks: CalendarStopInput["tasks"]): string {
  const swaps = tasks.filter((task) => task.kind === "swap").length;
  const rest = tasks.length - swaps;
  return [
    swaps > 0 ? `${swaps} ${swaps === 1 ? "swap" : "swaps"}` : "",
    rest > 0 ? `${rest} to read` : "",
  ]
    .filter(Boolean)
    .join(", ");
}

/** A stop as an event of the calendar. */
export function calendarEvent(
  stop: CalendarStopInput,
  round: {
    readonly id: string;
    readonly planId: string;
    readonly technicianId: string;
    readonly day: string;
    readonly state: string;
  },
  technician: string,
  presentation: Presentation,
): CalendarEvent {
  const state = round.state as CalendarEvent["state"];
  const work = workWords(stop.tasks);
  return {
    stopId: stop.stopId,
    siteId: stop.siteId,
    planId: round.planId,
    roundId: round.id,
    technicianId: round.technicianId,
    technician,
    day: round.day,
    startsAt: stop.arrivesAt.toISOString(),
    endsAt: stop.departsAt.toISOString(),
    title: stop.siteName,
    label: `${formatTime(stop.arrivesAt, presentation)} ${stop.siteName}, ${work}, ${technician}, ${state}`,
    state,
    movable: (state === "proposed" || state === "published") && stop.state === "planned",
  };
}

import { ICalCalendar, ICalCalendarMethod, ICalEventStatus } from "ical-generator";
import type { RoundMailProps } from "./mail-props";
import { taskWords } from "./round-mail";

/**
 * A round as an RFC 5545 calendar file. The UID names the round for ever and SEQUENCE grows
 * with every change, so that a calendar replaces the entry (METHOD:PUBLISH) or drops it
 * (METHOD:CANCEL, STATUS:CANCELLED). Instants are written in UTC: no time zone table needed.
 */
export function roundCalendar(props: RoundMailProps, cancelled: boolean): string {
  const calendar = new ICalCalendar({
    prodId: { company: "Wanewright", product: "Rounds", language: "EN" },
    method: cancelled ? ICalCalendarMethod.CANCEL : ICalCalendarMethod.PUBLISH,
  });
  calendar.createEvent({
    id: props.calendar.uid,
    sequence: props.calendar.sequence,
    stamp: new Date(props.calendar.stamp),
    start: new Date(props.startsAt),
    end: new Date(props.endsAt),
    status: cancelled ? ICalEventStatus.CANCELLED : ICalEventStatus.CONFIRMED,
    summary: `Round: ${props.stops.length === 1 ? "1 stop" : `${props.stops.length} stops`}`,
    location: props.depotName,
    description: props.stops.map(stopWords).join("\n"),
    url: props.url,
  });
  return calendar.toString();
}

function stopWords(stop: RoundMailProps["stops"][number]): string {
  return `${stop.position}. ${stop.siteName}: ${stop.tasks.map(taskWords).join("; ")}`;
}

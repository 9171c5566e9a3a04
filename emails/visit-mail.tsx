import { Text } from "@react-email/components";
import { formatDay } from "@/lib/present/format-day";
import { formatDuration } from "@/lib/present/format-time";
import { HouseMail, text } from "./house-mail";
import type { VisitMailProps } from "./mail-props";

/** Tells the contact of a site when somebody will come. */
export function VisitMail(props: VisitMailProps) {
  const day = formatDay(props.day, props.locale, { weekday: true, year: true });
  const stay = formatDuration(props.minutes * 60, props.locale);
  return (
    <HouseMail
      organisation={props.organisation}
      locale={props.locale}
      preview={`${day}, about ${props.around}`}
      title={`A visit to ${props.siteName}`}
      because={`You get this mail because you are the contact for ${props.siteName}.`}
    >
      <Text style={text}>Hello{props.contactName ? ` ${props.contactName}` : ""},</Text>
      <Text style={text}>
        {props.technicianName} of {props.organisation} plans to be at {props.siteName} on {day}, at
        about {props.around}, for about {stay}, to look after our sensors there.
      </Text>
      <Text style={text}>
        The time may move by an hour or so with the round. If the day does not suit you, please
        answer this mail.
      </Text>
    </HouseMail>
  );
}

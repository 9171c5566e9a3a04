import { Text } from "@react-email/components";
import { formatDay } from "@/lib/present/format-day";
import { formatDistance } from "@/lib/present/format-quantity";
import { formatDuration, formatTime } from "@/lib/present/format-time";
import { cell, HouseMail, label, soft, text } from "./house-mail";
import type { RoundMailProps, RoundMailStop, RoundMailTask } from "./mail-props";

export type RoundNews = "published" | "changed" | "cancelled";

const HAZARDS: Record<string, string> = {
  water: "near water",
  height: "work at height",
  confined_space: "confined space",
  roadside: "roadside",
  explosive_atmosphere: "explosive atmosphere: permit needed",
  lone_working: "working alone",
  livestock: "livestock",
  soft_ground: "soft ground",
};

/** A technician's round: when, what to load, the stops in order. */
export function RoundMail({ news, ...props }: RoundMailProps & { news: RoundNews }) {
  const day = formatDay(props.day, props.locale, { weekday: true, year: true });
  if (news === "cancelled") return <CancelledRound date={day} {...props} />;
  const load = props.load.map((line) => `${line.cells} × ${line.designation}`);
  return (
    <HouseMail
      organisation={props.organisation}
      locale={props.locale}
      preview={`${props.stops.length} stops, from ${formatTime(new Date(props.startsAt), props)}`}
      title={news === "changed" ? `Changed: round on ${day}` : `Your round on ${day}`}
      action={{ label: "Open the round", url: props.url }}
      because="You get this mail because this round is yours. The attached calendar file adds it to your calendar, or replaces what was there."
    >
      <Text style={text}>Hello {props.technicianName},</Text>
      {props.changes.length > 0 && <Text style={text}>{props.changes.join(" ")}</Text>}
      <Text style={text}>{summary(props)}</Text>
      <Text style={label}>Load</Text>
      <Text style={text}>
        {[...load, ...props.keys.map((key) => `key ${key}`)].join(" · ") || "nothing"}
      </Text>
      <Text style={label}>Stops</Text>
      <table role="presentation" width="100%" cellPadding={0} cellSpacing={0}>
        <tbody>
          {props.stops.map((stop) => (
            <StopRow key={stop.position} stop={stop} props={props} />
          ))}
        </tbody>
      </table>
      <Text style={{ ...text, marginTop: "16px" }}>
        Site rules, permits and the maker’s data come first. Tape the terminals of cells that come
        out; replace all cells of a pack together.
      </Text>
    </HouseMail>
  );
}

function CancelledRound({ date, ...props }: RoundMailProps & { date: string }) {
  return (
    <HouseMail
      organisation={props.organisation}
      locale={props.locale}
      preview={`The round on ${date} will not take place.`}
      title={`Cancelled: round on ${date}`}
      because="You get this mail because this round was yours. The attached calendar file takes it out of your calendar."
    >
      <Text style={text}>Hello {props.technicianName},</Text>
      <Text style={text}>
        the round on {date} will not take place. {props.changes.join(" ")}
      </Text>
    </HouseMail>
  );
}

function StopRow({ stop, props }: { stop: RoundMailStop; props: RoundMailProps }) {
  const hazards = stop.hazards.map((hazard) => HAZARDS[hazard] ?? hazard);
  const notes = [stop.access, hazards.length > 0 ? `Mind: ${hazards.join(", ")}.` : ""];
  return (
    <tr>
      <td style={{ ...cell, width: "24px" }}>{stop.position}</td>
      <td style={{ ...cell, width: "52px" }}>{formatTime(new Date(stop.arrivesAt), props)}</td>
      <td style={cell}>
        <strong>{stop.siteName}</strong>
        {stop.tasks.map((task) => (
          <div key={task.tag}>{taskWords(task)}</div>
        ))}
        <div style={{ color: soft }}>{notes.filter(Boolean).join(" ")}</div>
      </td>
    </tr>
  );
}

function summary(props: RoundMailProps): string {
  const from = formatTime(new Date(props.startsAt), props);
  const until = formatTime(new Date(props.endsAt), props);
  const stops = props.stops.length === 1 ? "1 stop" : `${props.stops.length} stops`;
  const driving = formatDuration(props.driveS, props.locale);
  return `${stops}, ${from} to ${until} from ${props.depotName}: ${formatDistance(props.distanceM, props.locale)}, ${driving} of it driving.`;
}

/** "Swap QF-0981 Piezometer P-14: 1 × ER34615". */
export function taskWords(task: RoundMailTask): string {
  const verb = { swap: "Swap", read: "Read", inspect: "Inspect" }[task.kind];
  const cells = task.kind === "swap" ? `: ${task.cells} × ${task.designation ?? "cells"}` : "";
  return `${verb} ${task.tag} ${task.assetName}${cells}`;
}

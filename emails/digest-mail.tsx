import { Text } from "@react-email/components";
import { formatDay, formatWindow } from "@/lib/present/format-day";
import { cell, HouseMail, label, soft, text } from "./house-mail";
import type { DigestLine, DigestProps } from "./mail-props";

/** What is due soon, for supervisors: how many, which first, what is not booked. */
export function DigestMail(props: DigestProps) {
  const { expected } = props;
  return (
    <HouseMail
      organisation={props.organisation}
      locale={props.locale}
      preview={`${props.outNow.length} out now, about ${expected.mean} due in ${props.horizonDays} days`}
      title={`Due in the next ${props.horizonDays} days`}
      action={{ label: "Open the Horizon", url: props.url }}
      because="You get this mail on the days you chose in Settings, Digests."
    >
      <Text style={text}>Hello {props.name},</Text>
      <Text style={text}>
        {props.outNow.length === 0 ? "No device is out." : `${props.outNow.length} out now.`} About{" "}
        {expected.mean} packs reach cut-off in {props.horizonDays} days, likely {expected.p05} to{" "}
        {expected.p95}. {props.notBooked} of those below have no published visit.
      </Text>
      <Lines title="Out now" lines={props.outNow} props={props} />
      <Lines title="Due soon" lines={props.due} props={props} />
      {props.more > 0 && <Text style={text}>and {props.more} more on the Horizon.</Text>}
    </HouseMail>
  );
}

function Lines(given: { title: string; lines: readonly DigestLine[]; props: DigestProps }) {
  if (given.lines.length === 0) return null;
  return (
    <>
      <Text style={label}>{given.title}</Text>
      <table role="presentation" width="100%" cellPadding={0} cellSpacing={0}>
        <tbody>
          {given.lines.map((line) => (
            <tr key={line.tag}>
              <td style={cell}>
                <strong>{line.tag}</strong> {line.assetName}
                <div style={{ color: soft }}>{line.siteName}</div>
              </td>
              <td style={{ ...cell, whiteSpace: "nowrap" }}>
                {line.left === "out" ? "out" : `${line.left} left`}
              </td>
              <td style={cell}>{windowWords(line, given.props)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </>
  );
}

function windowWords(line: DigestLine, props: DigestProps): string {
  const window = formatWindow(
    { p5: line.p05, p50: line.p50, p95: line.p95 },
    props.locale,
    props.day,
  );
  const visit = line.visitOn
    ? `visit ${formatDay(line.visitOn, props.locale, { weekday: true, today: props.day })}`
    : "no visit booked";
  return `${window.text}; ${visit}`;
}

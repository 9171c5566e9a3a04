import {
  Body,
  Container,
  Head,
  Heading,
  Hr,
  Html,
  Link,
  Preview,
  Text,
} from "@react-email/components";
import type { ReactNode } from "react";

/** The house's hand in mails: mail programs know no style sheets, so every rule is inline. */
export const ink = "#17211D";
export const soft = "#55625B";
export const rule = "#D8D3C4";
const sans = "Roboto, Helvetica, Arial, sans-serif";
const serif = "'Roboto Serif', Georgia, 'Times New Roman', serif";

export const text = { font: `15px/1.5 ${sans}`, color: ink, margin: "0 0 12px" } as const;
export const label = {
  font: `600 11px/1.3 ${sans}`,
  letterSpacing: "0.08em",
  textTransform: "uppercase",
  color: soft,
  margin: "20px 0 4px",
} as const;
export const cell = {
  font: `14px/1.4 ${sans}`,
  color: ink,
  padding: "8px 10px 8px 0",
  borderTop: `1px solid ${rule}`,
  verticalAlign: "top",
} as const;

interface HouseMailProps {
  readonly organisation: string;
  readonly locale: string;
  readonly preview: string;
  readonly title: string;
  /** The one clear action. */
  readonly action?: { readonly label: string; readonly url: string };
  /** Why the reader gets this mail. */
  readonly because: string;
  readonly children: ReactNode;
}

/** Ruled sheet with a serif head, one action and the reason for the mail at its foot. */
export function HouseMail(props: HouseMailProps) {
  return (
    <Html lang={props.locale}>
      <Head>
        <meta name="color-scheme" content="light dark" />
        <meta name="supported-color-schemes" content="light dark" />
      </Head>
      <Preview>{props.preview}</Preview>
      <Body style={{ backgroundColor: "#F6F3EA", margin: 0, padding: "24px 8px" }}>
        <Container
          style={{
            backgroundColor: "#FDFCF8",
            borderTop: `3px solid ${ink}`,
            padding: "24px 24px 16px",
            maxWidth: "600px",
          }}
        >
          <Text style={{ ...label, margin: "0 0 8px" }}>{props.organisation}</Text>
          <Heading
            as="h1"
            style={{ font: `500 26px/1.2 ${serif}`, color: ink, margin: "0 0 16px" }}
          >
            {props.title}
          </Heading>
          {props.children}
          {props.action && (
            <Link
              href={props.action.url}
              style={{
                display: "inline-block",
                font: `500 15px/1 ${sans}`,
                color: "#ffffff",
                backgroundColor: "#12534A",
                padding: "14px 18px",
                borderRadius: "3px",
                textDecoration: "none",
                margin: "12px 0",
              }}
            >
              {props.action.label}
            </Link>
          )}
          <Hr style={{ borderColor: rule, margin: "20px 0 12px" }} />
          <Text style={{ font: `12px/1.5 ${sans}`, color: soft, margin: 0 }}>{props.because}</Text>
        </Container>
      </Body>
    </Html>
  );
}

import { Text } from "@react-email/components";
import { formatInstant } from "@/lib/present/format-time";
import { HouseMail, text } from "./house-mail";
import type { LinkMailProps } from "./mail-props";

export type LinkPurpose = "invitation" | "password" | "sign-in-link";

const WORDS: Record<LinkPurpose, { title: string; lead: string; action: string; because: string }> =
  {
    invitation: {
      title: "You are invited",
      lead: "An administrator has made an account for you. Choose a password and you can start.",
      action: "Take up the invitation",
      because: "You get this mail because an administrator entered your address.",
    },
    password: {
      title: "Choose a new password",
      lead: "Somebody, probably you, asked for a new password. If it was not you, do nothing: the old one stays.",
      action: "Choose a new password",
      because: "You get this mail because a new password was asked for with your address.",
    },
    "sign-in-link": {
      title: "Your sign-in link",
      lead: "Open this link on the device on which you want to sign in. If you did not ask for it, do nothing.",
      action: "Sign in",
      because: "You get this mail because a sign-in link was asked for with your address.",
    },
  };

/** Invitation, new password and one-time sign-in: a sentence, one link, its end. */
export function LinkMail({ purpose, ...props }: LinkMailProps & { purpose: LinkPurpose }) {
  const words = WORDS[purpose];
  const until = formatInstant(new Date(props.expiresAt), props, { weekday: true });
  return (
    <HouseMail
      organisation={props.organisation}
      locale={props.locale}
      preview={words.lead}
      title={words.title}
      action={{ label: words.action, url: props.url }}
      because={words.because}
    >
      <Text style={text}>Hello {props.name},</Text>
      <Text style={text}>{words.lead}</Text>
      <Text style={text}>The link works once, until {until}.</Text>
    </HouseMail>
  );
}

import { render } from "@react-email/render";
import type { ReactElement } from "react";
import { DigestMail } from "./digest-mail";
import { LinkMail } from "./link-mail";
import type { DigestProps, LinkMailProps, RoundMailProps, VisitMailProps } from "./mail-props";
import { RoundMail } from "./round-mail";
import { VisitMail } from "./visit-mail";

/** Every template by the name that the job carries. */
const TEMPLATES: Record<string, (props: never) => ReactElement> = {
  invitation: (props: LinkMailProps) => <LinkMail purpose="invitation" {...props} />,
  password: (props: LinkMailProps) => <LinkMail purpose="password" {...props} />,
  "sign-in-link": (props: LinkMailProps) => <LinkMail purpose="sign-in-link" {...props} />,
  "round-published": (props: RoundMailProps) => <RoundMail news="published" {...props} />,
  "round-changed": (props: RoundMailProps) => <RoundMail news="changed" {...props} />,
  "round-cancelled": (props: RoundMailProps) => <RoundMail news="cancelled" {...props} />,
  "visit-notice": (props: VisitMailProps) => <VisitMail {...props} />,
  "due-digest": (props: DigestProps) => <DigestMail {...props} />,
};

/** Renders a mail to HTML and to the plain text that reads the same. @throws on an unknown template */
export async function renderMail(
  template: string,
  props: unknown,
): Promise<{ html: string; text: string }> {
  const make = TEMPLATES[template];
  if (!make) throw new Error(`no mail template "${template}"`);
  const element = make(props as never);
  return { html: await render(element), text: await render(element, { plainText: true }) };
}

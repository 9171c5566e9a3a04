import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { replaceToken, type TokenPurpose } from "@/db/queries/one-time-tokens";
import { getOrganisation } from "@/db/queries/organisation";
import type { LinkMailProps } from "@/emails/mail-props";
import { hashOfSecret, newSecret } from "./one-time-secret";
import { type MailTemplate, queueMail } from "./queue-mail";
import type { Deps } from "./use-case";

interface LinkKind {
  readonly template: MailTemplate;
  readonly path: string;
  readonly minutes: number;
  readonly subject: (organisation: string) => string;
}

const KINDS: Record<TokenPurpose, LinkKind> = {
  sign_in: {
    template: "sign-in-link",
    path: "/sign-in/link",
    minutes: 15,
    subject: () => "Your sign-in link for Wanewright",
  },
  password: {
    template: "password",
    path: "/forgotten/choose",
    minutes: 60,
    subject: () => "Choose a new password for Wanewright",
  },
  invitation: {
    template: "invitation",
    path: "/welcome",
    minutes: 7 * 24 * 60,
    subject: (organisation) => `Your invitation to Wanewright at ${organisation}`,
  },
};

export interface LinkReceiver {
  readonly id: string;
  readonly name: string;
  readonly email: string;
}

/** Makes a one-time link; an earlier unused one of its kind stops working. */
export async function makeLink(
  trx: Transaction<Database>,
  deps: Deps,
  personId: string,
  purpose: TokenPurpose,
): Promise<{ id: string; url: string; expiresAt: Date }> {
  const secret = newSecret(deps);
  const createdAt = deps.now();
  const expiresAt = new Date(createdAt.getTime() + KINDS[purpose].minutes * 60_000);
  const id = deps.newId();
  const tokenHash = hashOfSecret(secret);
  await replaceToken(trx, { id, personId, purpose, tokenHash, expiresAt, createdAt });
  return { id, url: `${deps.appUrl}${KINDS[purpose].path}?token=${secret}`, expiresAt };
}

/** Sends a one-time link by mail. Call it in the transaction of what it follows from. */
export async function sendLink(
  trx: Transaction<Database>,
  deps: Deps,
  person: LinkReceiver,
  purpose: TokenPurpose,
): Promise<void> {
  const link = await makeLink(trx, deps, person.id, purpose);
  const { name: organisation, locale, timeZone, currency } = await getOrganisation(trx);
  const props: LinkMailProps = {
    ...{ organisation, locale, timeZone, currency, name: person.name, url: link.url },
    expiresAt: link.expiresAt.toISOString(),
  };
  await queueMail(trx, deps, {
    template: KINDS[purpose].template,
    toEmail: person.email,
    toPersonId: person.id,
    subject: KINDS[purpose].subject(organisation),
    props: { ...props },
    idempotencyKey: `link/${link.id}`,
  });
}

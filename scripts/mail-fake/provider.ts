import { z } from "zod";
import type { Mail, MailAttachment, Mailbox } from "./mailbox";

/**
 * The sending endpoints of the mail provider, as far as a sender can tell: what is accepted,
 * what is refused and how. Source of names and statuses: the provider's published reference,
 * https://resend.com/docs/api-reference/errors and .../emails/send-email (read in 2026).
 */
export interface Answer {
  readonly status: number;
  readonly body: unknown;
}

const BATCH_LIMIT = 100;
const RECIPIENT_LIMIT = 50;
const KEY_LIFE_MS = 24 * 3_600_000;

const address = z
  .string()
  .regex(
    /^([^<>@]*<[^<>@\s]+@[^<>@\s]+>|[^<>@\s]+@[^<>@\s]+)$/,
    "Use `email@example.com` or `Name <email@example.com>`.",
  );
const addresses = z
  .union([address, z.array(address).max(RECIPIENT_LIMIT)])
  .transform((given) => (Array.isArray(given) ? given : [given]));

const attachment = z.object({
  filename: z.string().min(1),
  content: z.base64(),
  content_type: z.string().optional(),
});

const sending = z.object({
  from: address,
  to: addresses.refine((list) => list.length > 0, "Name at least one recipient."),
  cc: addresses.optional(),
  bcc: addresses.optional(),
  reply_to: addresses.optional(),
  subject: z.string().min(1),
  html: z.string().optional(),
  text: z.string().optional(),
  headers: z.record(z.string(), z.string()).optional(),
  attachments: z.array(attachment).optional(),
});
type Sending = z.output<typeof sending>;

interface Remembered {
  readonly payload: string;
  readonly answer: Answer;
  readonly at: number;
}

export interface ProviderDeps {
  readonly mailbox: Mailbox;
  readonly now: () => Date;
  readonly newId: () => string;
}

/** Accepts mails as the provider does. */
export class Provider {
  private readonly answers = new Map<string, Remembered>();

  constructor(private readonly deps: ProviderDeps) {}

  /** `POST /emails` takes one mail, `POST /emails/batch` a list without attachments. */
  send(endpoint: "one" | "batch", body: unknown, key: string | null): Answer {
    if (key !== null && (key.length < 1 || key.length > 256)) {
      return refusal(400, "invalid_idempotency_key", "Use a key of 1 to 256 characters.");
    }
    const payload = JSON.stringify([endpoint, body]);
    const earlier = key === null ? undefined : this.earlier(key);
    if (earlier && earlier.payload === payload) return earlier.answer;
    if (earlier) {
      const message = "This idempotency key was used with another payload.";
      return refusal(409, "invalid_idempotent_request", message);
    }
    const answer = endpoint === "one" ? this.one(body, key) : this.batch(body, key);
    if (key !== null && answer.status === 200) {
      this.answers.set(key, { payload, answer, at: this.deps.now().getTime() });
    }
    return answer;
  }

  private earlier(key: string): Remembered | undefined {
    const found = this.answers.get(key);
    return found && this.deps.now().getTime() - found.at < KEY_LIFE_MS ? found : undefined;
  }

  private one(body: unknown, key: string | null): Answer {
    const read = readSending(body);
    return "refused" in read ? read.refused : { status: 200, body: this.accept(read.sent, key) };
  }

  private batch(body: unknown, key: string | null): Answer {
    if (!Array.isArray(body) || body.length === 0 || body.length > BATCH_LIMIT) {
      return refusal(422, "validation_error", `A batch is a list of 1 to ${BATCH_LIMIT} emails.`);
    }
    const sent: Sending[] = [];
    for (const [index, item] of body.entries()) {
      const read = readSending(item);
      if ("refused" in read) return inBatch(read.refused, index);
      if (read.sent.attachments?.length) {
        const message = "Attachments are not supported in a batch.";
        return inBatch(refusal(422, "validation_error", message), index);
      }
      sent.push(read.sent);
    }
    return { status: 200, body: { data: sent.map((mail) => this.accept(mail, key)) } };
  }

  private accept(sent: Sending, idempotencyKey: string | null): { id: string } {
    const mail: Mail = {
      id: this.deps.newId(),
      at: this.deps.now().toISOString(),
      from: sent.from,
      to: sent.to,
      cc: sent.cc ?? [],
      bcc: sent.bcc ?? [],
      replyTo: sent.reply_to ?? [],
      subject: sent.subject,
      html: sent.html ?? null,
      text: sent.text ?? null,
      headers: sent.headers ?? {},
      attachments: (sent.attachments ?? []).map(asAttachment),
      idempotencyKey,
    };
    this.deps.mailbox.add(mail);
    return { id: mail.id };
  }
}

/** An error as the provider words it. */
export function refusal(statusCode: number, name: string, message: string): Answer {
  return { status: statusCode, body: { statusCode, name, message } };
}

function inBatch(answer: Answer, index: number): Answer {
  const body = answer.body as { message: string };
  return { ...answer, body: { ...body, message: `Email ${index}: ${body.message}` } };
}

function readSending(body: unknown): { sent: Sending } | { refused: Answer } {
  const parsed = sending.safeParse(body);
  if (!parsed.success) {
    const issue = parsed.error.issues[0];
    const field = issue?.path.join(".") ?? "";
    const missing = isMissing(body, issue?.path ?? []);
    if (missing) {
      return { refused: refusal(422, "missing_required_field", `Missing \`${field}\` field.`) };
    }
    const name = field === "from" ? "invalid_from_address" : "validation_error";
    return { refused: refusal(422, name, `Invalid \`${field}\` field. ${issue?.message ?? ""}`) };
  }
  if (parsed.data.html === undefined && parsed.data.text === undefined) {
    return { refused: refusal(422, "missing_required_field", "Missing `html` or `text` field.") };
  }
  return { sent: parsed.data };
}

function isMissing(body: unknown, path: readonly PropertyKey[]): boolean {
  let value: unknown = body;
  for (const step of path) value = (value as Record<PropertyKey, unknown> | null)?.[step];
  return value === undefined;
}

function asAttachment(given: z.output<typeof attachment>): MailAttachment {
  const contentType = given.content_type ?? "application/octet-stream";
  return { filename: given.filename, contentType, content: given.content };
}

import { Resend } from "resend";
import type { Env } from "@/lib/env";
import type { Mailer } from "@/lib/usecases/use-case";

/** What the provider says of a mail that no repetition will make it accept. */
const FINAL = new Set([
  "validation_error",
  "missing_required_field",
  "invalid_from_address",
  "invalid_attachment",
  "invalid_idempotent_request",
  "missing_api_key",
  "invalid_api_key",
  "restricted_api_key",
]);

/** Mails through Resend's HTTP interface, or whatever speaks it at RESEND_BASE_URL. */
export function resendMailer(
  env: Pick<Env, "RESEND_API_KEY" | "RESEND_BASE_URL" | "MAIL_FROM">,
): Mailer {
  const client = new Resend(
    env.RESEND_API_KEY,
    env.RESEND_BASE_URL ? { baseUrl: env.RESEND_BASE_URL } : {},
  );
  return {
    async send(message) {
      const { data, error } = await client.emails.send(
        {
          from: env.MAIL_FROM,
          to: message.to,
          subject: message.subject,
          html: message.html,
          text: message.text,
          attachments: message.attachments.map((attachment) => ({
            filename: attachment.filename,
            contentType: attachment.contentType,
            content: Buffer.from(attachment.content, "utf8").toString("base64"),
          })),
        },
        { idempotencyKey: message.idempotencyKey },
      );
      if (data) return { ok: true, providerId: data.id };
      const reason = error ? `${error.name}: ${error.message}` : "no answer";
      return { ok: false, reason, retry: !FINAL.has(error?.name ?? "") };
    },
  };
}

import { z } from "zod";
import { findOutboundMail, markMailFailed, markMailSent } from "@/db/queries/outbound-mail";
import type { RoundMailProps } from "@/emails/mail-props";
import { renderMail } from "@/emails/render-mail";
import { roundCalendar } from "@/emails/round-calendar";
import { AppError } from "@/lib/errors";
import { defineUseCase, type MailMessage } from "./use-case";

/**
 * Sends one queued mail. Safe to run twice: a mail marked sent is left alone, and the
 * provider gets the same idempotency key each time.
 * @throws AppError unavailable when another attempt may succeed, so that the queue tries again
 */
export const deliverMail = defineUseCase({
  name: "deliver-mail",
  allow: { system: true },
  input: z.object({ mailId: z.uuid() }),
  async run(deps, _actor, { mailId }): Promise<{ sent: boolean }> {
    const mail = await findOutboundMail(deps.db, mailId);
    if (!mail || mail.state === "sent") return { sent: false };
    const { html, text } = await renderMail(mail.template, mail.props);
    const outcome = await deps.mailer.send({
      to: mail.toEmail,
      subject: mail.subject,
      html,
      text,
      attachments: attachmentsOf(mail.template, mail.props),
      idempotencyKey: mail.idempotencyKey,
    });
    if (outcome.ok) {
      await markMailSent(deps.db, mailId, outcome.providerId, deps.now());
      return { sent: true };
    }
    await markMailFailed(deps.db, mailId, outcome.reason, outcome.retry);
    if (outcome.retry) throw new AppError("unavailable", `mail ${mailId}: ${outcome.reason}`);
    return { sent: false };
  },
});

function attachmentsOf(template: string, props: unknown): MailMessage["attachments"] {
  if (!template.startsWith("round-")) return [];
  const cancelled = template === "round-cancelled";
  const content = roundCalendar(props as RoundMailProps, cancelled);
  const contentType = `text/calendar; charset=utf-8; method=${cancelled ? "CANCEL" : "PUBLISH"}`;
  return [{ filename: "round.ics", contentType, content }];
}

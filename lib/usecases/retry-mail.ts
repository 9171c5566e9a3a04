import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { lockUnsentMail, requeueMail } from "@/db/queries/mail-log";
import { conflict, notFound } from "@/lib/errors";
import { defineUseCase, personIdOf } from "./use-case";

/** Tries a mail again that could not be sent. Its idempotency key stays, so it arrives once. */
export const retryMail = defineUseCase({
  name: "retry-mail",
  allow: { roles: ["administrator"] },
  input: z.object({ mailId: z.uuid() }),
  run: (deps, actor, { mailId }) =>
    deps.db.transaction().execute(async (trx) => {
      const mail = await lockUnsentMail(trx, mailId);
      if (!mail) throw notFound("A mail that waits to be sent");
      const at = deps.now();
      if (mail.linkEnds !== null && new Date(mail.linkEnds) <= at) {
        throw conflict("The link in this mail has expired. Send a new one instead.");
      }
      await requeueMail(trx, mailId);
      await deps.jobs.enqueue(trx, "mail", { mailId });
      await appendAudit(trx, {
        ...{ at, personId: personIdOf(actor), act: "retry-mail" },
        ...{ subjectKind: "mail", subjectId: mailId, detail: { to: mail.toEmail } },
      });
    }),
});

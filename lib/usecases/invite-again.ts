import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { findPerson, markInvited } from "@/db/queries/people-directory";
import { conflict, notFound } from "@/lib/errors";
import { sendLink } from "./send-link";
import { defineUseCase, personIdOf } from "./use-case";

/** Mails the invitation once more; the earlier link stops working. */
export const inviteAgain = defineUseCase({
  name: "invite-again",
  allow: { roles: ["administrator"] },
  input: z.object({ personId: z.uuid() }),
  run: (deps, actor, { personId }) =>
    deps.db.transaction().execute(async (trx) => {
      const person = await findPerson(trx, personId);
      if (!person) throw notFound("This person");
      if (person.state === "off") throw conflict("Switch this person on first.");
      if (person.state === "active") {
        throw conflict("This person has joined already; they can ask for a new password.");
      }
      const at = deps.now();
      await markInvited(trx, personId, at);
      await sendLink(trx, deps, person, "invitation");
      await appendAudit(trx, {
        ...{ at, personId: personIdOf(actor), act: "invite-again" },
        ...{ subjectKind: "person", subjectId: personId },
      });
      return { email: person.email };
    }),
});

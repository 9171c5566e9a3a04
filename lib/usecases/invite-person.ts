import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { insertInvitedPerson } from "@/db/queries/people-directory";
import { mapDatabaseFault } from "./database-faults";
import { mailAddress, personName, personRoles } from "./person-fields";
import { sendLink } from "./send-link";
import { defineUseCase, personIdOf } from "./use-case";

/**
 * Makes an account and mails its invitation.
 * @throws AppError conflict when the address has an account already
 */
export const invitePerson = defineUseCase({
  name: "invite-person",
  allow: { roles: ["administrator"] },
  input: z.object({ name: personName, email: mailAddress, roles: personRoles }),
  async run(deps, actor, person): Promise<{ personId: string; email: string }> {
    const id = deps.newId();
    const at = deps.now();
    await mapDatabaseFault(() =>
      deps.db.transaction().execute(async (trx) => {
        await insertInvitedPerson(trx, { id, ...person, at });
        await sendLink(trx, deps, { id, ...person }, "invitation");
        await appendAudit(trx, {
          ...{ at, personId: personIdOf(actor), act: "invite-person" },
          ...{ subjectKind: "person", subjectId: id, detail: { roles: person.roles } },
        });
      }),
    );
    return { personId: id, email: person.email };
  },
});

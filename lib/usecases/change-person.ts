import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { deleteOpenTokens } from "@/db/queries/one-time-tokens";
import { findPerson, updatePerson } from "@/db/queries/people-directory";
import { notFound } from "@/lib/errors";
import { mapDatabaseFault } from "./database-faults";
import { keepAnAdministrator } from "./keep-an-administrator";
import { mailAddress, personName, personRoles } from "./person-fields";
import { defineUseCase, personIdOf } from "./use-case";

/**
 * Changes a person's name, address and roles; they hold from the person's next request.
 * @throws AppError conflict when the address is another's, or the last administrator would go
 */
export const changePerson = defineUseCase({
  name: "change-person",
  allow: { roles: ["administrator"] },
  input: z.object({
    personId: z.uuid(),
    name: personName,
    email: mailAddress,
    roles: personRoles,
  }),
  run: (deps, actor, { personId, ...changes }) =>
    mapDatabaseFault(() =>
      deps.db.transaction().execute(async (trx) => {
        if (!changes.roles.includes("administrator")) await keepAnAdministrator(trx, personId);
        const before = await findPerson(trx, personId);
        if (!before) throw notFound("This person");
        await updatePerson(trx, personId, changes);
        // Links that went to an address that is no longer theirs must not work.
        if (before.email !== changes.email) await deleteOpenTokens(trx, personId);
        const { name, email, roles } = before;
        await appendAudit(trx, {
          ...{ at: deps.now(), personId: personIdOf(actor), act: "change-person" },
          ...{ subjectKind: "person", subjectId: personId },
          detail: { before: { name, email, roles }, after: changes },
        });
      }),
    ),
});

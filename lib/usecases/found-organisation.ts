import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { insertOrganisation } from "@/db/queries/organisation";
import { storePassword } from "@/db/queries/people";
import { hasAdministrator, insertInvitedPerson } from "@/db/queries/people-directory";
import { conflict } from "@/lib/errors";
import { mapDatabaseFault } from "./database-faults";
import { textEntry } from "./form-entries";
import { currencyEntry, localeEntry, timeZoneEntry } from "./organisation-fields";
import { hashPassword } from "./passwords";
import { mailAddress, newPassword, personName } from "./person-fields";
import { makeLink } from "./send-link";
import { defineUseCase } from "./use-case";

/**
 * Makes the organisation of an empty deployment and its first administrator.
 * @returns without a password: a one-time link with which the administrator chooses one
 * @throws AppError conflict when there is an administrator already
 */
export const foundOrganisation = defineUseCase({
  name: "found-organisation",
  allow: { system: true },
  input: z.object({
    organisation: textEntry("the organisation's name", 120),
    timeZone: timeZoneEntry,
    currency: currencyEntry,
    locale: localeEntry,
    name: personName,
    email: mailAddress,
    password: newPassword.nullable(),
  }),
  async run(deps, _actor, { password, ...given }): Promise<{ url: string | null }> {
    const passwordHash = password === null ? null : await hashPassword(password);
    const { organisation, timeZone, currency, locale, name, email } = given;
    const id = deps.newId();
    const at = deps.now();
    return mapDatabaseFault(() =>
      deps.db.transaction().execute(async (trx) => {
        // Of two at once the second waits here for the first.
        await insertOrganisation(trx, { name: organisation, timeZone, currency, locale });
        if (await hasAdministrator(trx)) {
          throw conflict("There is an administrator already, who can invite others.");
        }
        await insertInvitedPerson(trx, { id, name, email, roles: ["administrator"], at });
        if (passwordHash !== null) await storePassword(trx, id, passwordHash);
        await appendAudit(trx, {
          ...{ at, personId: null, act: "found-organisation" },
          ...{ subjectKind: "person", subjectId: id, detail: { organisation } },
        });
        if (passwordHash !== null) return { url: null };
        return { url: (await makeLink(trx, deps, id, "invitation")).url };
      }),
    );
  },
});

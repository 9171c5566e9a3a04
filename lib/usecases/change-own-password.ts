import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { deleteOpenTokens } from "@/db/queries/one-time-tokens";
import { findCredentials, storePassword } from "@/db/queries/people";
import { invalid, notFound } from "@/lib/errors";
import { countAttempt } from "./limit-attempts";
import { passwordMatches, hashPassword } from "./passwords";
import { newPassword } from "./person-fields";
import { refuseOwnName } from "./set-password";
import { defineUseCase, personIdOf, ROLES } from "./use-case";

/**
 * Changes one's own password. It ends every session, this one too; the entrance signs in again.
 * @throws AppError invalid when the present password is wrong | too_many
 */
export const changeOwnPassword = defineUseCase({
  name: "change-own-password",
  allow: { roles: ROLES },
  input: z.object({ present: z.string().max(1000), password: newPassword }),
  async run(deps, actor, { present, password }): Promise<{ email: string }> {
    const personId = personIdOf(actor);
    const person = personId ? await findCredentials(deps.db, personId) : null;
    if (!person) throw notFound("Your account");
    const bucket = `password:person:${person.id}`;
    const attempt = await countAttempt(deps, [{ bucket, most: 10, minutes: 15 }], "");
    if (!(await passwordMatches(person.passwordHash, present))) {
      throw invalid("Some entries need mending.", [
        { field: "present", message: "This is not your present password." },
      ]);
    }
    await attempt.forgive([bucket]);
    refuseOwnName(password, person);
    const passwordHash = await hashPassword(password);
    await deps.db.transaction().execute(async (trx) => {
      await storePassword(trx, person.id, passwordHash);
      await deleteOpenTokens(trx, person.id);
      await appendAudit(trx, {
        at: deps.now(),
        personId: person.id,
        act: "change-own-password",
        subjectKind: "person",
        subjectId: person.id,
      });
    });
    return { email: person.email };
  },
});

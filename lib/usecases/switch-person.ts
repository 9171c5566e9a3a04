import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { deleteOpenTokens } from "@/db/queries/one-time-tokens";
import { findPerson, setPersonActive } from "@/db/queries/people-directory";
import { notFound } from "@/lib/errors";
import { keepAnAdministrator } from "./keep-an-administrator";
import { defineUseCase, personIdOf } from "./use-case";

/**
 * Switches a person off (they lose access at their next request, and open links stop working) or
 * on again. What they did stays in the record.
 */
export const switchPerson = defineUseCase({
  name: "switch-person",
  allow: { roles: ["administrator"] },
  input: z.object({ personId: z.uuid(), active: z.boolean() }),
  run: (deps, actor, { personId, active }) =>
    deps.db.transaction().execute(async (trx) => {
      if (!active) await keepAnAdministrator(trx, personId);
      const before = await findPerson(trx, personId);
      if (!before) throw notFound("This person");
      await setPersonActive(trx, personId, active);
      await deleteOpenTokens(trx, personId);
      await appendAudit(trx, {
        ...{ at: deps.now(), personId: personIdOf(actor) },
        act: active ? "switch-person-on" : "switch-person-off",
        ...{ subjectKind: "person", subjectId: personId },
      });
    }),
});

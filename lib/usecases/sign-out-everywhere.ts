import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { deleteOpenTokens } from "@/db/queries/one-time-tokens";
import { endSessions } from "@/db/queries/people";
import { forbidden, notFound } from "@/lib/errors";
import { defineUseCase, personIdOf, ROLES } from "./use-case";

/** Ends every session of a person at their next request: one's own, or anybody's as administrator. */
export const signOutEverywhere = defineUseCase({
  name: "sign-out-everywhere",
  allow: { roles: ROLES },
  input: z.object({ personId: z.uuid() }),
  async run(deps, actor, { personId }) {
    const administers = actor.kind === "person" && actor.roles.includes("administrator");
    if (personId !== personIdOf(actor) && !administers) throw forbidden();
    await deps.db.transaction().execute(async (trx) => {
      if (!(await endSessions(trx, personId))) throw notFound("This person");
      await deleteOpenTokens(trx, personId);
      await appendAudit(trx, {
        at: deps.now(),
        personId: personIdOf(actor),
        act: "sign-out-everywhere",
        subjectKind: "person",
        subjectId: personId,
      });
    });
  },
});

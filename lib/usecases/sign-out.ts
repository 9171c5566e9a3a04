import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { defineUseCase, personIdOf, ROLES } from "./use-case";

/** Notes that a person signed out on one device; the entrance drops the cookie. */
export const signOut = defineUseCase({
  name: "sign-out",
  allow: { roles: ROLES },
  input: z.object({}),
  async run(deps, actor) {
    const personId = personIdOf(actor);
    await appendAudit(deps.db, {
      at: deps.now(),
      personId,
      act: "sign-out",
      subjectKind: "person",
      subjectId: personId,
    });
  },
});

import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { endMatter } from "@/db/queries/field-matters";
import { openMatter } from "./open-matter";
import { textEntry } from "./form-entries";
import { defineUseCase, personIdOf } from "./use-case";

/** Closes a matter from the field with the reason why nothing more is done about it. */
export const closeMatter = defineUseCase({
  name: "close-matter",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({ id: z.uuid(), reason: textEntry("why nothing more is done about it", 500) }),
  run: async (deps, actor, { id, reason }) =>
    deps.db.transaction().execute(async (trx) => {
      const matter = await openMatter(trx, id);
      const closedBy = personIdOf(actor);
      await endMatter(trx, id, { closedAt: deps.now(), closedBy, outcome: "closed", note: reason });
      await appendAudit(trx, {
        ...{ at: deps.now(), personId: closedBy, act: "close-matter" },
        ...{ subjectKind: "field-matter", subjectId: id },
        detail: { kind: matter.kind, reason },
      });
      return { id };
    }),
});

import type { Transaction } from "kysely";
import { z } from "zod";
import type { Database } from "@/db/client";
import { appendAudit } from "@/db/queries/audit";
import { endMatter, findEntryMaker } from "@/db/queries/field-matters";
import { markEntryApplied } from "@/db/queries/sync-entries";
import { conflict, invalid, notFound } from "@/lib/errors";
import { correctedInstant } from "@/lib/sync/clock-skew";
import { entryBody } from "@/lib/sync/entries";
import { applyEntry } from "./apply-entry";
import { mapDatabaseFault } from "./database-faults";
import { openMatter } from "./open-matter";
import { defineUseCase, type PersonActor, personIdOf, type Role } from "./use-case";

/**
 * Applies a refused entry after all, as the person who made it and at the time it happened, once
 * what stood in its way has been put right. The phone that asks again hears that it is applied.
 * @throws AppError the refusal, when it still stands; nothing is changed then
 */
export const sendEntryAgain = defineUseCase({
  name: "send-entry-again",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({ id: z.uuid() }),
  run: async (deps, actor, { id }) =>
    deps.db.transaction().execute(async (trx) => {
      const matter = await openMatter(trx, id);
      if (matter.outcome !== "refused") throw conflict("This entry has been applied already.");
      const body = entryBody.safeParse(matter.body);
      if (!body.success) {
        throw invalid("This entry cannot be read: ask its maker to enter it again.");
      }
      const maker = await actorOf(trx, matter.personId);
      const happenedAt = correctedInstant(
        matter.happenedAt,
        matter.clockSkewMs ?? 0,
        matter.receivedAt,
      );
      const entry = { id: matter.entryId, happenedAt, body: body.data };
      await mapDatabaseFault(() => applyEntry(trx, deps, maker, entry));
      await markEntryApplied(trx, matter.entryId);
      const end = { closedAt: deps.now(), closedBy: personIdOf(actor), note: "" };
      await endMatter(trx, id, { ...end, outcome: "sent_again" });
      await appendAudit(trx, {
        ...{ at: deps.now(), personId: end.closedBy, act: "send-entry-again" },
        ...{ subjectKind: "field-matter", subjectId: id },
        detail: { entry: matter.entryId, madeBy: maker.name },
      });
      return { id };
    }),
});

/** The maker, who may also do what only the office may: it is the office that asks. */
async function actorOf(trx: Transaction<Database>, personId: string): Promise<PersonActor> {
  const maker = await findEntryMaker(trx, personId);
  if (!maker) throw notFound("The person who made this entry");
  const { name, email, technicianId } = maker;
  const roles: Role[] = [...new Set<Role>([...(maker.roles as Role[]), "dispatcher"])];
  return { kind: "person", personId, name, email, technicianId, roles };
}

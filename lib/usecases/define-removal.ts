import type { Transaction } from "kysely";
import { z } from "zod";
import type { Database } from "@/db/client";
import { appendAudit } from "@/db/queries/audit";
import { notFound } from "@/lib/errors";
import { refuseInUse } from "./refuse-in-use";
import { defineUseCase, personIdOf } from "./use-case";

export interface Removal {
  readonly name: string;
  readonly subjectKind: string;
  /** Said when it is gone already: "This crew". */
  readonly what: string;
  /** Said when other rows still need it, with what to do. */
  readonly inUse: string;
  /** @returns what the thing was called, or null when there is none */
  readonly remove: (trx: Transaction<Database>, id: string) => Promise<string | null>;
}

/** A use case by which an administrator removes one thing that nothing needs any more. */
export function defineRemoval({ name, subjectKind, what, inUse, remove }: Removal) {
  return defineUseCase({
    name,
    allow: { roles: ["administrator"] },
    input: z.object({ id: z.uuid() }),
    run: (deps, actor, { id }) =>
      refuseInUse(inUse, () =>
        deps.db.transaction().execute(async (trx) => {
          const called = await remove(trx, id);
          if (called === null) throw notFound(what);
          await appendAudit(trx, {
            ...{ at: deps.now(), personId: personIdOf(actor), act: name },
            ...{ subjectKind, subjectId: id, detail: { name: called } },
          });
        }),
      ),
  });
}

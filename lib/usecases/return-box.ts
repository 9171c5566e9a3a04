import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { getOrganisation } from "@/db/queries/organisation";
import { collectReturned, listReturnBox } from "@/db/queries/returned-cells";
import { requiredId } from "./form-entries";
import { defineUseCase, personIdOf } from "./use-case";

/** Old cells that wait for recycling, by cell type and lot. */
export const readReturnBox = defineUseCase({
  name: "read-return-box",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({}),
  run: async (deps) => ({
    organisation: await getOrganisation(deps.db),
    rows: await listReturnBox(deps.db),
    now: deps.now(),
  }),
});
export type ReturnBoxView = Awaited<ReturnType<typeof readReturnBox>>;

/** Records that recycling has taken the cells of a type that the page showed, and no later ones. */
export const collectReturnedCells = defineUseCase({
  name: "collect-returned-cells",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({ cellTypeId: requiredId, until: z.iso.datetime() }),
  run: async (deps, actor, { cellTypeId, until }): Promise<{ readonly cells: number }> =>
    deps.db.transaction().execute(async (trx) => {
      const given = { at: deps.now(), personId: personIdOf(actor) };
      const cells = await collectReturned(trx, { ...given, cellTypeId, until: new Date(until) });
      await appendAudit(trx, {
        ...{ ...given, act: "collect-returned-cells" },
        ...{ subjectKind: "cell-type", subjectId: cellTypeId },
        detail: { cells },
      });
      return { cells };
    }),
});

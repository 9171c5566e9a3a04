import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { findLot } from "@/db/queries/lots";
import { applyStockMove, lockLotStock, stockMoveExists } from "@/db/queries/stock";
import { notFound } from "@/lib/errors";
import { optionalTextEntry, requiredId, scaledEntry } from "./form-entries";
import { defineUseCase, personIdOf } from "./use-case";

/** Puts a count right: the difference is appended as a move, nothing is overwritten. */
export const countCells = defineUseCase({
  name: "count-cells",
  allow: { roles: ["administrator", "dispatcher", "technician"] },
  input: z.object({
    id: z.uuid(),
    lotId: requiredId,
    placeId: requiredId,
    counted: scaledEntry(0, { min: 0, max: 1_000_000, wanted: "how many cells lie there" }),
    note: optionalTextEntry(200),
  }),
  run: async (deps, actor, given): Promise<{ readonly lotCode: string; difference: number }> =>
    deps.db.transaction().execute(async (trx) => {
      const { id, lotId, placeId, counted, note } = given;
      const lot = await findLot(trx, lotId);
      if (!lot) throw notFound("The lot");
      if (await stockMoveExists(trx, id)) return { lotCode: lot.code, difference: 0 };
      const difference = counted - (await lockLotStock(trx, lotId, placeId));
      if (difference === 0) return { lotCode: lot.code, difference };
      const at = deps.now();
      const personId = personIdOf(actor);
      await applyStockMove(trx, {
        ...{ id, lotId, at, personId, note, cells: Math.abs(difference) },
        fromPlaceId: difference < 0 ? placeId : null,
        toPlaceId: difference > 0 ? placeId : null,
        reason: "counted",
      });
      await appendAudit(trx, {
        ...{ at, personId, act: "count-cells", subjectKind: "lot", subjectId: lotId },
        detail: { code: lot.code, counted, difference },
      });
      return { lotCode: lot.code, difference };
    }),
});

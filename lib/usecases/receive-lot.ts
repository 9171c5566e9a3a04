import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { insertLot } from "@/db/queries/lots";
import { applyStockMove, stockMoveExists } from "@/db/queries/stock";
import { invalid } from "@/lib/errors";
import { mapDatabaseFault } from "./database-faults";
import { optionalDay, optionalTextEntry, requiredId, scaledEntry, textEntry } from "./form-entries";
import { defineUseCase, personIdOf } from "./use-case";

/** Takes a delivery in: a lot with its cells at one place. */
export const receiveLot = defineUseCase({
  name: "receive-lot",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({
    /** The client's id of the move: sending it twice receives one lot. */
    id: z.uuid(),
    code: textEntry("the lot's code", 60),
    cellTypeId: requiredId,
    placeId: requiredId,
    cells: scaledEntry(0, { min: 1, max: 1_000_000, wanted: "how many cells came" }),
    receivedOn: z.string().regex(/^\d{4}-\d{2}-\d{2}$/, "Enter the day it came."),
    madeOn: optionalDay,
    supplierReference: optionalTextEntry(100),
    unitCost: scaledEntry(2, { min: 0, max: 1e8, wanted: "what one cell costs" }),
  }),
  run: async (deps, actor, given): Promise<{ readonly code: string }> => {
    if (given.madeOn && given.madeOn > given.receivedOn) {
      const message = "It was made before it came.";
      throw invalid(message, [{ field: "madeOn", message }]);
    }
    const { id, code, cellTypeId, placeId, cells, receivedOn, madeOn, supplierReference } = given;
    const at = deps.now();
    const personId = personIdOf(actor);
    await deps.db.transaction().execute(async (trx) => {
      if (await stockMoveExists(trx, id)) return;
      const lotId = deps.newId();
      const lot = { code, cellTypeId, receivedOn, madeOn, supplierReference };
      await mapDatabaseFault(() =>
        insertLot(trx, { ...lot, id: lotId, cellsReceived: cells, unitCostMinor: given.unitCost }),
      );
      await applyStockMove(trx, {
        ...{ id, lotId, cells, at, personId, note: supplierReference },
        ...{ fromPlaceId: null, toPlaceId: placeId, reason: "received" },
      });
      await appendAudit(trx, {
        ...{ at, personId, act: "receive-lot", subjectKind: "lot", subjectId: lotId },
        detail: { code, cells },
      });
    });
    return { code };
  },
});

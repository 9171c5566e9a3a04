import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { findLot } from "@/db/queries/lots";
import { applyStockMove, lockLotStock, stockMoveExists } from "@/db/queries/stock";
import { invalid, notFound } from "@/lib/errors";
import { optionalTextEntry, requiredId, scaledEntry } from "./form-entries";
import { defineUseCase, personIdOf } from "./use-case";

const cells = scaledEntry(0, { min: 1, max: 1_000_000, wanted: "how many cells" });

/** Moves cells of a lot from one place to another: stores to a van, a van to the return box. */
export const moveCells = defineUseCase({
  name: "move-cells",
  allow: { roles: ["administrator", "dispatcher", "technician"] },
  input: z.object({
    id: z.uuid(),
    lotId: requiredId,
    fromPlaceId: requiredId,
    toPlaceId: requiredId,
    cells,
    note: optionalTextEntry(200),
  }),
  run: async (deps, actor, given): Promise<{ readonly lotCode: string }> => {
    if (given.fromPlaceId === given.toPlaceId) {
      throw fault("toPlaceId", "Choose another place than the one they lie in.");
    }
    return deps.db.transaction().execute(async (trx) => {
      const lot = await findLot(trx, given.lotId);
      if (!lot) throw notFound("The lot");
      if (await stockMoveExists(trx, given.id)) return { lotCode: lot.code };
      const held = await lockLotStock(trx, given.lotId, given.fromPlaceId);
      if (held < given.cells) {
        throw fault("cells", `Only ${held} cells of lot ${lot.code} are counted there.`);
      }
      const at = deps.now();
      const personId = personIdOf(actor);
      await applyStockMove(trx, { ...given, at, personId, reason: "moved" });
      await appendAudit(trx, {
        ...{ at, personId, act: "move-cells", subjectKind: "lot", subjectId: lot.id },
        detail: { code: lot.code, cells: given.cells },
      });
      return { lotCode: lot.code };
    });
  },
});

function fault(field: string, message: string) {
  return invalid(message, [{ field, message }]);
}

import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { findReading, insertVerdict } from "@/db/queries/readings";
import { forbidden, invalid, notFound } from "@/lib/errors";
import { optionalScaledEntry, optionalTextEntry } from "./form-entries";
import { MAX_PACK_MV } from "./record-reading";
import { touchForecasts } from "./touch-forecasts";
import { defineUseCase, personIdOf } from "./use-case";

/**
 * Confirms a reading, sets it aside or corrects it. The reading itself stays as it was
 * logged; the verdict that stands is the latest.
 */
export const giveVerdict = defineUseCase({
  name: "give-verdict",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({
    id: z.uuid(),
    readingId: z.uuid(),
    verdict: z.enum(["confirmed", "set_aside", "corrected"], "Choose what to do with it."),
    correctedVolts: optionalScaledEntry(3, {
      min: 0,
      max: MAX_PACK_MV,
      wanted: "the right voltage in V",
    }),
    note: optionalTextEntry(),
  }),
  run: async (deps, actor, given): Promise<{ readonly tag: string }> => {
    const personId = personIdOf(actor);
    if (!personId) throw forbidden();
    const correctedMv = given.verdict === "corrected" ? given.correctedVolts : null;
    if (given.verdict === "corrected" && correctedMv === null) {
      const message = "Enter the right voltage in V.";
      throw invalid(message, [{ field: "correctedVolts", message }]);
    }
    return deps.db.transaction().execute(async (trx) => {
      const reading = await findReading(trx, given.readingId);
      if (!reading) throw notFound("The reading");
      const { id, readingId, verdict, note } = given;
      const at = deps.now();
      const isNew = await insertVerdict(trx, {
        ...{ id, readingId, verdict, note },
        ...{ correctedMv, personId, at },
      });
      if (isNew) {
        await touchForecasts(trx, deps, [reading.packId]);
        const detail = { tag: reading.tag, verdict, was: reading.millivolts, correctedMv };
        await appendAudit(trx, {
          ...{ at, personId, act: "give-verdict", detail },
          ...{ subjectKind: "reading", subjectId: readingId },
        });
      }
      return { tag: reading.tag };
    });
  },
});

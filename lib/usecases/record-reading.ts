import { z } from "zod";
import { getOrganisation } from "@/db/queries/organisation";
import { invalid } from "@/lib/errors";
import { optionalScaledEntry, optionalTextEntry, scaledEntry } from "./form-entries";
import { localInstant } from "./local-instant";
import { logReadings, type ReadingResult } from "./log-readings";
import { defineUseCase, personIdOf } from "./use-case";

export const MAX_PACK_MV = 60_000;

const input = z.object({
  /** Made when the form was opened: sending it twice logs one reading. */
  id: z.uuid(),
  assetId: z.uuid(),
  /** Local time of the organisation, or an instant with offset. */
  at: z.string().trim().min(1, "Enter when it was read."),
  volts: scaledEntry(3, { min: 0, max: MAX_PACK_MV, wanted: "a voltage in V, such as 3.48" }),
  kind: z.enum(["resting", "loaded"], "Choose resting or under load."),
  loadMilliamps: optionalScaledEntry(3, {
    min: 1,
    max: 100_000_000,
    wanted: "a load current in mA, or leave it empty",
  }),
  temperatureC: optionalScaledEntry(1, {
    min: -600,
    max: 1000,
    wanted: "a temperature in °C, or leave it empty",
  }),
  accuracyMv: optionalScaledEntry(0, {
    min: 1,
    max: 5000,
    wanted: "the meter's accuracy in mV, or leave it empty",
  }),
  instrument: optionalTextEntry(100),
  note: optionalTextEntry(),
});

/**
 * Logs one voltage from a form.
 * @throws AppError invalid when the value is impossible, with the field and the reason
 */
export const recordReading = defineUseCase({
  name: "record-reading",
  allow: { roles: ["administrator", "dispatcher", "technician"] },
  input,
  run: async (deps, actor, given): Promise<ReadingResult> => {
    const { timeZone } = await getOrganisation(deps.db);
    const order = {
      ...given,
      at: localInstant(given.at, timeZone, "at"),
      millivolts: given.volts,
      loadUa: given.kind === "loaded" ? given.loadMilliamps : null,
      temperatureDc: given.temperatureC,
    };
    const [result] = await deps.db.transaction().execute((trx) =>
      logReadings(trx, deps, [order], {
        source: "form",
        personId: personIdOf(actor),
        apiKeyId: null,
      }),
    );
    if (!result || result.refusal) throw refusal(result);
    return result;
  },
});

function refusal(result: ReadingResult | undefined) {
  const message = result?.refusal?.message ?? "The reading was not logged.";
  const field = result?.refusal?.field === "millivolts" ? "volts" : (result?.refusal?.field ?? "");
  return invalid(message, [{ field, message }]);
}

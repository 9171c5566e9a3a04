import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { listCellTypes } from "@/db/queries/cell-types";
import { findDeviceModel, packsOfModel, saveDeviceModelRecord } from "@/db/queries/device-models";
import { getOrganisation } from "@/db/queries/organisation";
import { invalid, notFound } from "@/lib/errors";
import { mapDatabaseFault } from "./database-faults";
import { optionalScaledEntry, scaledEntry, textEntry } from "./form-entries";
import { touchForecasts } from "./touch-forecasts";
import { defineUseCase, personIdOf } from "./use-case";

const state = z.object({
  name: textEntry("a name, such as sleep", 60),
  currentMilliamps: scaledEntry(3, { min: 0, max: 100_000_000, wanted: "a current in mA" }),
  seconds: scaledEntry(3, { min: 1, max: 2_000_000_000, wanted: "a time in s" }),
});

const input = z
  .object({
    id: z.uuid(),
    name: textEntry("a name"),
    cutoffVolts: scaledEntry(3, { min: 1, max: 60_000, wanted: "the cut-off of the pack in V" }),
    series: scaledEntry(0, { min: 1, max: 24, wanted: "how many cells in series" }),
    parallel: scaledEntry(0, { min: 1, max: 12, wanted: "how many beside each other" }),
    swapMinutes: scaledEntry(0, { min: 1, max: 480, wanted: "minutes" }),
    readMinutes: scaledEntry(0, { min: 1, max: 480, wanted: "minutes" }),
    silenceCostPerHour: scaledEntry(2, { min: 0, max: 1e8, wanted: "a cost" }),
    habitIntervalDays: optionalScaledEntry(0, { min: 1, max: 20_000, wanted: "days, or nothing" }),
    states: z.array(state).min(1, "Enter at least one state.").max(20),
    cellTypeIds: z.array(z.uuid()).min(1, "Choose at least one cell type."),
    preferredId: z.union([z.uuid(), z.literal(""), z.null()]).optional(),
  })
  .refine((model) => new Set(model.states.map((s) => s.name)).size === model.states.length, {
    path: ["states"],
    message: "Two states have the same name.",
  });

/** Adds a device model or changes it; forecasts of its packs are renewed. */
export const saveDeviceModel = defineUseCase({
  name: "save-device-model",
  allow: { roles: ["administrator", "dispatcher"] },
  input,
  run: async (deps, actor, given): Promise<{ readonly id: string }> => {
    const { states, cellTypeIds, preferredId, cutoffVolts, silenceCostPerHour, ...rest } = given;
    if (preferredId && !cellTypeIds.includes(preferredId)) {
      const message = "The preferred cells are among the accepted ones.";
      throw invalid(message, [{ field: "preferredId", message }]);
    }
    const at = deps.now();
    const model = {
      ...rest,
      cutoffMv: cutoffVolts,
      silenceCostMinorPerHour: silenceCostPerHour,
      updatedAt: at,
    };
    const duty = states.map((s) => ({
      name: s.name,
      currentUa: s.currentMilliamps,
      durationMs: s.seconds,
    }));
    const cells = cellTypeIds.map((cellTypeId) => ({
      cellTypeId,
      preferred: cellTypeId === preferredId,
    }));
    await deps.db.transaction().execute(async (trx) => {
      await mapDatabaseFault(() => saveDeviceModelRecord(trx, model, duty, cells));
      await touchForecasts(trx, deps, await packsOfModel(trx, given.id));
      await appendAudit(trx, {
        ...{ at, personId: personIdOf(actor), act: "save-device-model" },
        ...{ subjectKind: "device_model", subjectId: given.id, detail: { name: given.name } },
      });
    });
    return { id: given.id };
  },
});

/** What the model form needs: the model (null: a new one) and the cell types. */
export const readDeviceModelForm = defineUseCase({
  name: "read-device-model-form",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({ id: z.uuid().nullable() }),
  run: async (deps, _actor, { id }) => {
    const model = id === null ? null : await findDeviceModel(deps.db, id);
    if (id !== null && !model) throw notFound("The device model");
    const cellTypes = (await listCellTypes(deps.db)).map(
      ({ id: key, designation, name, retired }) => ({ id: key, designation, name, retired }),
    );
    return { model, cellTypes, organisation: await getOrganisation(deps.db) };
  },
});

export type DeviceModelFormView = Awaited<ReturnType<typeof readDeviceModelForm>>;

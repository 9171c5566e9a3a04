import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { findCellType, packsOfCellType, saveCellTypeRecord } from "@/db/queries/cell-types";
import { getOrganisation } from "@/db/queries/organisation";
import { CHEMISTRIES } from "@/lib/battery/pack";
import { notFound } from "@/lib/errors";
import { mapDatabaseFault } from "./database-faults";
import { optionalScaledEntry, optionalTextEntry, scaledEntry, textEntry } from "./form-entries";
import { touchForecasts } from "./touch-forecasts";
import { defineUseCase, personIdOf } from "./use-case";

const milliamps = scaledEntry(3, { min: 1, max: 2_000_000_000, wanted: "a current in mA" });
const ampereHours = scaledEntry(3, { min: 1, max: 2_000_000_000, wanted: "a capacity in Ah" });
const volts = scaledEntry(3, { min: 1, max: 60_000, wanted: "a voltage in V" });
const celsius = scaledEntry(1, { min: -600, max: 1000, wanted: "a temperature in °C" });

const input = z.object({
  id: z.uuid(),
  designation: textEntry("a designation, such as LR20", 60),
  name: optionalTextEntry(200),
  chemistry: z.enum(CHEMISTRIES, "Choose a chemistry."),
  size: optionalTextEntry(60),
  nominalVolts: volts,
  ratedCapacityAh: ampereHours,
  ratedMilliamps: milliamps,
  ratedCutoffVolts: volts,
  ratedTemperatureC: celsius,
  selfDischargePercent: scaledEntry(4, { min: 0, max: 1_000_000, wanted: "% a year" }),
  resistanceOhms: scaledEntry(3, { min: 1, max: 2_000_000_000, wanted: "a resistance in Ω" }),
  maxPulseMilliamps: optionalScaledEntry(3, { min: 1, max: 2e9, wanted: "mA, or nothing" }),
  massGrams: optionalScaledEntry(3, { min: 1, max: 2e9, wanted: "g, or nothing" }),
  shelfLifeMonths: optionalScaledEntry(0, { min: 1, max: 600, wanted: "months, or nothing" }),
  unitCost: scaledEntry(2, { min: 0, max: 1e8, wanted: "what one cell costs" }),
  reorderPoint: scaledEntry(0, { min: 0, max: 1e6, wanted: "a number of cells" }),
  leadTimeDays: scaledEntry(0, { min: 0, max: 1000, wanted: "a number of days" }),
  points: z
    .array(
      z.object({
        milliamps,
        cutoffVolts: volts,
        temperatureC: celsius,
        capacityAh: ampereHours,
        source: optionalTextEntry(200),
      }),
    )
    .max(200)
    .default([]),
});

/** Adds a cell type or changes it, with its capacity table; forecasts are renewed. */
export const saveCellType = defineUseCase({
  name: "save-cell-type",
  allow: { roles: ["administrator", "dispatcher"] },
  input: input.superRefine((given, context) => {
    const seen = new Set<string>();
    given.points.forEach((p, n) => {
      const key = `${p.milliamps} ${p.cutoffVolts} ${p.temperatureC}`;
      if (seen.has(key)) {
        const message = "This current, cut-off and temperature stand in another row already.";
        context.addIssue({ code: "custom", path: ["points", n, "milliamps"], message });
      }
      seen.add(key);
    });
  }),
  run: async (deps, actor, given): Promise<{ readonly id: string }> => {
    const at = deps.now();
    await deps.db.transaction().execute(async (trx) => {
      const points = given.points.map((p) => ({
        currentUa: p.milliamps,
        cutoffMv: p.cutoffVolts,
        temperatureDc: p.temperatureC,
        capacityMah: p.capacityAh,
        source: p.source,
      }));
      await mapDatabaseFault(() => saveCellTypeRecord(trx, asRecord(given, at), points));
      await touchForecasts(trx, deps, await packsOfCellType(trx, given.id));
      await appendAudit(trx, {
        ...{ at, personId: personIdOf(actor), act: "save-cell-type" },
        ...{ subjectKind: "cell_type", subjectId: given.id },
        detail: { designation: given.designation },
      });
    });
    return { id: given.id };
  },
});

function asRecord(given: z.output<typeof input>, updatedAt: Date) {
  const { id, designation, name, chemistry, size, reorderPoint, leadTimeDays } = given;
  return {
    ...{ id, designation, name, chemistry, size, reorderPoint, leadTimeDays, updatedAt },
    nominalMv: given.nominalVolts,
    ratedCapacityMah: given.ratedCapacityAh,
    ratedCurrentUa: given.ratedMilliamps,
    ratedCutoffMv: given.ratedCutoffVolts,
    ratedTemperatureDc: given.ratedTemperatureC,
    selfDischargePpmPerYear: given.selfDischargePercent,
    resistanceMohm: given.resistanceOhms,
    maxPulseUa: given.maxPulseMilliamps,
    massMg: given.massGrams,
    shelfLifeMonths: given.shelfLifeMonths,
    unitCostMinor: given.unitCost,
  };
}

/** What the cell type form needs: the type with its table; null: a new one. */
export const readCellTypeForm = defineUseCase({
  name: "read-cell-type-form",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({ id: z.uuid().nullable() }),
  run: async (deps, _actor, { id }) => {
    const cellType = id === null ? null : await findCellType(deps.db, id);
    if (id !== null && !cellType) throw notFound("The cell type");
    return { cellType, organisation: await getOrganisation(deps.db) };
  },
});

export type CellTypeFormView = Awaited<ReturnType<typeof readCellTypeForm>>;

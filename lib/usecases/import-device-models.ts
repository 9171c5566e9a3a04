import { findNames } from "@/db/queries/bulk-register";
import {
  type DeviceModelRecord,
  findDeviceModel,
  listDeviceModels,
  packsOfModel,
  saveDeviceModelRecord,
} from "@/db/queries/device-models";
import type { ImportRecord } from "@/lib/csv/read-records";
import { type DutyEntry, readDuty } from "@/lib/csv/read-duty";
import { given, type ImportContext, ImportOutcome, overlay } from "./import-outcome";
import { naturalId } from "./natural-id";
import { touchForecasts } from "./touch-forecasts";

/** Device models with their duty cycle and cell types, known by their name. */
export async function importDeviceModels(context: ImportContext): Promise<ImportOutcome> {
  const outcome = new ImportOutcome(context);
  const models = new Map(
    (await listDeviceModels(context.trx)).map((m) => [m.name.toLowerCase(), m.id]),
  );
  const { cellTypes } = await findNames(context.trx);
  const cellsOf = new Map(cellTypes.map((c) => [c.name.toLowerCase(), c.id]));
  const seen = new Map<string, number>();
  for (const record of context.records) {
    const name = String(record.values.name);
    const earlier = seen.get(name.toLowerCase());
    if (earlier !== undefined) {
      outcome.refuse(record.row, "name", `The model ${name} stands in row ${earlier} already.`);
      continue;
    }
    seen.set(name.toLowerCase(), record.row);
    await importOne(context, outcome, record, models.get(name.toLowerCase()) ?? null, cellsOf);
  }
  await context.progress(context.records.length);
  return outcome;
}

async function importOne(
  context: ImportContext,
  outcome: ImportOutcome,
  record: ImportRecord,
  modelId: string | null,
  cellsOf: ReadonlyMap<string, string>,
): Promise<void> {
  const { trx, deps } = context;
  const before = modelId ? await findDeviceModel(trx, modelId) : null;
  const duty = readDuty(String(record.values.duty), context.decimal);
  if (typeof duty === "string") outcome.refuse(record.row, "duty", duty);
  const cells = readCells(record, outcome, cellsOf);
  if (typeof duty === "string" || outcome.isRefused(record.row)) return;
  const base = before ?? blankModel(String(record.values.name), deps.now());
  const { after, changed } = overlay<DeviceModelRecord>(base, modelChanges(record));
  if (before && dutyText(before.states) !== dutyText(duty)) changed.push("duty cycle");
  if (before && cellsText(before.cells) !== cellsText(cells)) changed.push("cell types");
  const outcomeOf = before === null ? "new" : changed.length > 0 ? "changed" : "same";
  outcome.settle(record.row, outcomeOf, before ? changed.join("; ") : "");
  if (!context.write || outcomeOf === "same") return;
  await saveDeviceModelRecord(trx, asRecord(after, deps.now()), duty, cells);
  await touchForecasts(trx, deps, await packsOfModel(trx, after.id));
}

interface AcceptedCell {
  readonly cellTypeId: string;
  readonly preferred: boolean;
}

/** "LR20 | LR14": the first is the preferred one. */
function readCells(
  record: ImportRecord,
  outcome: ImportOutcome,
  cellsOf: ReadonlyMap<string, string>,
): AcceptedCell[] {
  const names = String(record.values.cells)
    .split(/[|;,]/)
    .map((name) => name.trim())
    .filter(Boolean);
  return [...new Set(names)].flatMap((name, n) => {
    const cellTypeId = cellsOf.get(name.toLowerCase());
    if (cellTypeId) return [{ cellTypeId, preferred: n === 0 }];
    outcome.refuse(
      record.row,
      "cells",
      `There is no cell type ${name}: import the cell types first.`,
    );
    return [];
  });
}

const COLUMNS = {
  cutoff: "cutoffMv",
  series: "series",
  parallel: "parallel",
  swapMinutes: "swapMinutes",
  readMinutes: "readMinutes",
  silence: "silenceCostMinorPerHour",
  habit: "habitIntervalDays",
} as const satisfies Record<string, keyof DeviceModelRecord>;

function modelChanges(record: ImportRecord): Partial<DeviceModelRecord> {
  const told = given(record);
  return Object.fromEntries(
    Object.entries(COLUMNS).flatMap(([key, column]) =>
      told[key] === undefined ? [] : [[column, told[key]]],
    ),
  );
}

function blankModel(name: string, updatedAt: Date): DeviceModelRecord {
  return {
    ...{ id: naturalId("device-model", name), name, cutoffMv: 0, series: 1, parallel: 1 },
    ...{ swapMinutes: 15, readMinutes: 5, silenceCostMinorPerHour: 20 },
    ...{ habitIntervalDays: null, updatedAt },
  };
}

/** Only the columns of the record: a row read from the database has more. */
function asRecord(model: DeviceModelRecord, updatedAt: Date): DeviceModelRecord {
  const columns = Object.values(COLUMNS).map((column) => [column, model[column]]);
  return {
    ...blankModel(model.name, updatedAt),
    ...(Object.fromEntries(columns) as Partial<DeviceModelRecord>),
    id: model.id,
  };
}

function dutyText(states: readonly DutyEntry[]): string {
  return states.map((s) => `${s.name} ${s.currentUa} ${s.durationMs}`).join("|");
}

function cellsText(cells: readonly AcceptedCell[]): string {
  return cells
    .map((c) => `${c.cellTypeId} ${c.preferred}`)
    .sort()
    .join("|");
}

import {
  type CapacityRecord,
  type CellTypeRecord,
  findCellType,
  listCellTypes,
  packsOfCellType,
  saveCellTypeRecord,
} from "@/db/queries/cell-types";
import type { ImportRecord } from "@/lib/csv/read-records";
import { given, type ImportContext, ImportOutcome, overlay } from "./import-outcome";
import { naturalId } from "./natural-id";
import { touchForecasts } from "./touch-forecasts";

/**
 * Cell types, known by their designation. Further rows with the same designation add points
 * to the capacity table; a point is known by its current, cut-off and temperature.
 */
export async function importCellTypes(context: ImportContext): Promise<ImportOutcome> {
  const outcome = new ImportOutcome(context);
  const types = new Map((await listCellTypes(context.trx)).map((t) => [t.designation, t]));
  for (const [designation, rows] of groups(context.records)) {
    const old = types.get(designation);
    const before = old ? await findCellType(context.trx, old.id) : null;
    await importOne(context, outcome, designation, rows, before);
  }
  await context.progress(context.records.length);
  return outcome;
}

function groups(records: readonly ImportRecord[]): Map<string, ImportRecord[]> {
  const groups = new Map<string, ImportRecord[]>();
  for (const record of records) {
    const key = String(record.values.designation);
    groups.set(key, [...(groups.get(key) ?? []), record]);
  }
  return groups;
}

type Before = Awaited<ReturnType<typeof findCellType>>;

async function importOne(
  context: ImportContext,
  outcome: ImportOutcome,
  designation: string,
  rows: readonly ImportRecord[],
  before: Before,
): Promise<void> {
  const { trx, deps } = context;
  const [first] = rows;
  if (!first) return;
  const told = typeChanges(first);
  if (!before) {
    for (const [key, label] of NEEDED) {
      if (first.values[key] === null || first.values[key] === undefined) {
        outcome.refuse(first.row, key, `A new cell type needs its ${label}.`);
      }
    }
  }
  if (outcome.isRefused(first.row)) {
    const message = `Row ${first.row} with the figures of ${designation} was refused.`;
    for (const { row } of rows.slice(1)) outcome.refuse(row, "designation", message);
    return;
  }
  const base: CellTypeRecord = before ?? blankType(designation, deps.now());
  const { after, changed } = overlay(base, told);
  const points = new Map((before?.points ?? []).map((p) => [keyOf(p), p]));
  const altered = rows.map((record) => addPoint(points, record, outcome));
  const isNew = before === null;
  rows.forEach((record, n) => {
    const own = n === 0 && (isNew || changed.length > 0);
    const does = own ? (isNew ? "new" : "changed") : (altered[n] ?? "same");
    outcome.settle(record.row, does, n === 0 ? changed.slice(0, 6).join("; ") : "capacity point");
  });
  if (!context.write || (!isNew && changed.length === 0 && altered.every((a) => a === "same"))) {
    return;
  }
  await saveCellTypeRecord(trx, asRecord(after, deps.now()), [...points.values()]);
  await touchForecasts(trx, deps, await packsOfCellType(trx, after.id));
}

/** What a cell type cannot do without. */
const NEEDED = [
  ["chemistry", "chemistry"],
  ["nominal", "nominal voltage"],
  ["capacity", "rated capacity"],
  ["ratedCurrent", "rated current"],
  ["ratedCutoff", "rated cut-off"],
  ["selfDischarge", "self-discharge a year"],
  ["resistance", "resistance"],
] as const;

const COLUMNS = {
  name: "name",
  chemistry: "chemistry",
  size: "size",
  nominal: "nominalMv",
  capacity: "ratedCapacityMah",
  ratedCurrent: "ratedCurrentUa",
  ratedCutoff: "ratedCutoffMv",
  ratedTemperature: "ratedTemperatureDc",
  selfDischarge: "selfDischargePpmPerYear",
  resistance: "resistanceMohm",
  maxPulse: "maxPulseUa",
  mass: "massMg",
  shelfLife: "shelfLifeMonths",
  unitCost: "unitCostMinor",
  reorderPoint: "reorderPoint",
  leadTime: "leadTimeDays",
} as const satisfies Record<string, keyof CellTypeRecord>;

function typeChanges(record: ImportRecord): Partial<CellTypeRecord> {
  const told = given(record);
  return Object.fromEntries(
    Object.entries(COLUMNS).flatMap(([key, column]) =>
      told[key] === undefined ? [] : [[column, told[key]]],
    ),
  );
}

const POINT_KEYS = ["pointCurrent", "pointCutoff", "pointCapacity"] as const;

function addPoint(
  points: Map<string, CapacityRecord>,
  record: ImportRecord,
  outcome: ImportOutcome,
): "new" | "changed" | "same" {
  const told = given(record);
  const missing = POINT_KEYS.filter((key) => told[key] === undefined);
  if (missing.length === POINT_KEYS.length) return "same";
  if (missing[0]) {
    const message = "A capacity point needs its current, cut-off and capacity.";
    outcome.refuse(record.row, missing[0], message);
    return "same";
  }
  const point = {
    currentUa: Number(told.pointCurrent),
    cutoffMv: Number(told.pointCutoff),
    temperatureDc: Number(told.pointTemperature ?? 200),
    capacityMah: Number(told.pointCapacity),
    source: String(told.pointSource ?? ""),
  };
  const old = points.get(keyOf(point));
  points.set(keyOf(point), point);
  if (!old) return "new";
  return old.capacityMah === point.capacityMah && old.source === point.source ? "same" : "changed";
}

function keyOf(p: Pick<CapacityRecord, "currentUa" | "cutoffMv" | "temperatureDc">): string {
  return `${p.currentUa} ${p.cutoffMv} ${p.temperatureDc}`;
}

function blankType(designation: string, updatedAt: Date): CellTypeRecord {
  return {
    ...{ id: naturalId("cell-type", designation), designation, name: "", chemistry: "", size: "" },
    ...{ nominalMv: 0, ratedCapacityMah: 0, ratedCurrentUa: 0, ratedCutoffMv: 0 },
    ...{ ratedTemperatureDc: 200, selfDischargePpmPerYear: 0, resistanceMohm: 0 },
    ...{ maxPulseUa: null, massMg: null, shelfLifeMonths: null },
    ...{ unitCostMinor: 0, reorderPoint: 0, leadTimeDays: 7, updatedAt },
  };
}

/** Only the columns of the record: a row read from the database has more. */
function asRecord(type: CellTypeRecord, updatedAt: Date): CellTypeRecord {
  const { id, designation } = type;
  const columns = Object.values(COLUMNS).map((column) => [column, type[column]]);
  return {
    ...blankType(designation, updatedAt),
    ...(Object.fromEntries(columns) as Partial<CellTypeRecord>),
    id,
  };
}

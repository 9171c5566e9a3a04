import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "../client";

export interface DeviceModelRow {
  readonly id: string;
  readonly name: string;
  readonly cutoffMv: number;
  readonly series: number;
  readonly parallel: number;
  readonly swapMinutes: number;
  readonly readMinutes: number;
  readonly silenceCostMinorPerHour: number;
  readonly habitIntervalDays: number | null;
  readonly retired: boolean;
  readonly states: readonly { name: string; currentUa: number; durationMs: number }[];
  readonly cells: readonly { designation: string; preferred: boolean }[];
  readonly assets: number;
}

/** All device models with their duty cycle and the cells they take. */
export async function listDeviceModels(db: Kysely<Database>): Promise<DeviceModelRow[]> {
  const result = await sql<DeviceModelRow>`
    select m.id, m.name, m.cutoff_mv, m.series, m.parallel, m.swap_minutes, m.read_minutes,
      m.silence_cost_minor_per_hour, m.habit_interval_days, m.retired,
      coalesce((select json_agg(json_build_object('name', d.name, 'currentUa', d.current_ua,
        'durationMs', d.duration_ms) order by d.position) from duty_state d
        where d.device_model_id = m.id), '[]') as states,
      coalesce((select json_agg(json_build_object('designation', c.designation, 'preferred', t.preferred)
        order by t.preferred desc, c.designation) from device_model_cell_type t
        join cell_type c on c.id = t.cell_type_id where t.device_model_id = m.id), '[]') as cells,
      (select count(*)::int from asset where device_model_id = m.id and state <> 'retired') as assets
    from device_model m order by m.retired, lower(m.name)`.execute(db);
  return result.rows;
}

/** A device model with its duty cycle and accepted cell types; null when there is none. */
export async function findDeviceModel(db: Kysely<Database>, id: string) {
  const model = await db
    .selectFrom("deviceModel")
    .selectAll()
    .where("id", "=", id)
    .executeTakeFirst();
  if (!model) return null;
  const states = await db
    .selectFrom("dutyState")
    .select(["name", "currentUa", "durationMs"])
    .where("deviceModelId", "=", id)
    .orderBy("position")
    .execute();
  const cells = await db
    .selectFrom("deviceModelCellType")
    .select(["cellTypeId", "preferred"])
    .where("deviceModelId", "=", id)
    .execute();
  return { ...model, states, cells };
}

export interface DeviceModelRecord {
  readonly id: string;
  readonly name: string;
  readonly cutoffMv: number;
  readonly series: number;
  readonly parallel: number;
  readonly swapMinutes: number;
  readonly readMinutes: number;
  readonly silenceCostMinorPerHour: number;
  readonly habitIntervalDays: number | null;
  readonly updatedAt: Date;
}

export interface DutyRecord {
  readonly name: string;
  readonly currentUa: number;
  readonly durationMs: number;
}

/** Writes a model, its duty cycle and its cell types in place of the old ones. */
export async function saveDeviceModelRecord(
  trx: Transaction<Database>,
  model: DeviceModelRecord,
  states: readonly DutyRecord[],
  cells: readonly { readonly cellTypeId: string; readonly preferred: boolean }[],
): Promise<void> {
  const { id, ...changes } = model;
  await trx
    .insertInto("deviceModel")
    .values(model)
    .onConflict((conflict) => conflict.column("id").doUpdateSet(changes))
    .execute();
  await trx.deleteFrom("dutyState").where("deviceModelId", "=", id).execute();
  await trx.deleteFrom("deviceModelCellType").where("deviceModelId", "=", id).execute();
  if (states.length > 0) {
    await trx
      .insertInto("dutyState")
      .values(states.map((state, position) => ({ ...state, position, deviceModelId: id })))
      .execute();
  }
  if (cells.length > 0) {
    await trx
      .insertInto("deviceModelCellType")
      .values(cells.map((cell) => ({ ...cell, deviceModelId: id })))
      .execute();
  }
}

/** Packs in service in assets of this model: their forecasts hang on its figures. */
export async function packsOfModel(db: Kysely<Database>, modelId: string): Promise<string[]> {
  const rows = await db
    .selectFrom("pack")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .select("pack.id")
    .where("asset.deviceModelId", "=", modelId)
    .where("pack.removedAt", "is", null)
    .execute();
  return rows.map((row) => row.id);
}

/** Cell types that a model takes, the preferred one first. */
export async function listAcceptedCellTypes(db: Kysely<Database>, modelId: string) {
  return db
    .selectFrom("deviceModelCellType")
    .innerJoin("cellType", "cellType.id", "deviceModelCellType.cellTypeId")
    .select([
      "cellType.id",
      "cellType.designation",
      "cellType.chemistry",
      "deviceModelCellType.preferred",
    ])
    .where("deviceModelId", "=", modelId)
    .orderBy("deviceModelCellType.preferred", "desc")
    .orderBy("cellType.designation")
    .execute();
}

import { type Kysely, type RawBuilder, sql, type Transaction } from "kysely";
import type { Database } from "../client";

export const ASSET_ORDERS = [
  "tag",
  "name",
  "site",
  "model",
  "pack",
  "left",
  "likely",
  "reading",
  "state",
] as const;
export type AssetOrder = (typeof ASSET_ORDERS)[number];

export const ASSET_STATES = ["in_service", "stored", "retired"] as const;
export type AssetState = (typeof ASSET_STATES)[number];

export interface AssetFilter {
  /** Part of a tag, a name or a site's name or code. */
  readonly search: string;
  readonly modelId: string | null;
  readonly chemistry: string | null;
  readonly state: string | null;
  readonly crewId: string | null;
  readonly siteCode: string | null;
}

export interface AssetListing extends AssetFilter {
  readonly order: AssetOrder;
  readonly descending: boolean;
  /** null: all. */
  readonly limit: number | null;
  readonly offset: number;
}

export interface AssetRow {
  readonly id: string;
  readonly tag: string;
  readonly name: string;
  readonly state: AssetState;
  readonly siteCode: string;
  readonly siteName: string;
  readonly latitude: number;
  readonly longitude: number;
  readonly crewName: string | null;
  readonly modelName: string;
  readonly firmware: string;
  readonly note: string;
  /** The asset's own; null: its model's holds. */
  readonly silenceCostMinorPerHour: number | null;
  readonly packId: string | null;
  readonly series: number | null;
  readonly parallel: number | null;
  readonly designation: string | null;
  readonly chemistry: string | null;
  readonly installedAt: Date | null;
  readonly shareLeftPermille: number | null;
  readonly outNowPermille: number | null;
  readonly p05: Date | null;
  readonly p50: Date | null;
  readonly p95: Date | null;
  readonly staleSince: Date | null;
  readonly readAt: Date | null;
  readonly readMv: number | null;
}

const ORDER_SQL: Record<AssetOrder, RawBuilder<unknown>> = {
  tag: sql`a.tag`,
  name: sql`lower(a.name)`,
  site: sql`lower(s.name)`,
  model: sql`lower(m.name)`,
  pack: sql`c.designation`,
  left: sql`f.share_left_permille`,
  likely: sql`f.p50`,
  reading: sql`r.at`,
  state: sql`a.state`,
};

const FROM = sql`
  from asset a
  join site s on s.id = a.site_id
  join device_model m on m.id = a.device_model_id
  left join crew on crew.id = s.crew_id
  left join pack p on p.asset_id = a.id and p.removed_at is null
  left join cell_type c on c.id = p.cell_type_id`;

function where(filter: AssetFilter): RawBuilder<unknown> {
  const like = `%${filter.search.replace(/[\\%_]/g, "\\$&")}%`;
  const parts = [
    filter.search === ""
      ? null
      : sql`(a.tag ilike ${like} or a.name ilike ${like} or s.name ilike ${like} or s.code ilike ${like})`,
    filter.modelId && sql`a.device_model_id = ${filter.modelId}::uuid`,
    filter.chemistry && sql`c.chemistry = ${filter.chemistry}`,
    filter.state && sql`a.state = ${filter.state}`,
    filter.crewId && sql`s.crew_id = ${filter.crewId}::uuid`,
    filter.siteCode && sql`s.code = ${filter.siteCode}`,
  ].filter((part) => part !== null && part !== "");
  return parts.length === 0 ? sql`true` : sql.join(parts, sql` and `);
}

/** One page of assets with their pack, forecast and last voltage. */
export async function listAssets(db: Kysely<Database>, listing: AssetListing): Promise<AssetRow[]> {
  const direction = listing.descending ? sql`desc nulls last` : sql`asc nulls last`;
  const result = await sql<AssetRow>`
    select a.id, a.tag, a.name, a.state, a.firmware, a.note, a.silence_cost_minor_per_hour, s.code as site_code, s.name as site_name,
      s.latitude, s.longitude, crew.name as crew_name, m.name as model_name, p.id as pack_id,
      p.series, p.parallel, c.designation, c.chemistry, p.installed_at, f.share_left_permille,
      f.out_now_permille, f.p05, f.p50, f.p95, f.stale_since, r.at as read_at, r.millivolts as read_mv
    ${FROM}
    left join forecast f on f.pack_id = p.id
    left join lateral (
      select at, millivolts from reading where pack_id = p.id order by at desc limit 1) r on true
    where ${where(listing)}
    order by ${ORDER_SQL[listing.order]} ${direction}, a.tag
    limit ${listing.limit} offset ${listing.offset}`.execute(db);
  return result.rows;
}

export async function countAssets(db: Kysely<Database>, filter: AssetFilter): Promise<number> {
  const result = await sql<{ n: number }>`
    select count(*)::int as n ${FROM} where ${where(filter)}`.execute(db);
  return result.rows[0]?.n ?? 0;
}

/** Everything the register holds about one asset, by its tag; null when there is none. */
export async function findAsset(db: Kysely<Database>, tag: string) {
  const row = await db
    .selectFrom("asset")
    .innerJoin("site", "site.id", "asset.siteId")
    .innerJoin("deviceModel", "deviceModel.id", "asset.deviceModelId")
    .leftJoin("crew", "crew.id", "site.crewId")
    .select([
      "asset.id",
      "asset.tag",
      "asset.name",
      "asset.state",
      "asset.firmware",
      "asset.note",
      "asset.lastHeardAt",
      "asset.silenceCostMinorPerHour",
      "asset.siteId",
      "asset.deviceModelId",
      "site.code as siteCode",
      "site.name as siteName",
      "site.noticeDays",
      "site.hazards",
      "site.tickets",
      "crew.name as crewName",
      "deviceModel.name as modelName",
      "deviceModel.cutoffMv",
      "deviceModel.series",
      "deviceModel.parallel",
      "deviceModel.silenceCostMinorPerHour as modelSilenceCostMinorPerHour",
    ])
    .where("asset.tag", "=", tag)
    .executeTakeFirst();
  return row ? { ...row, state: row.state as AssetState } : null;
}

/** The few columns that a change is compared with; null when the asset is new. */
export async function findAssetById(db: Kysely<Database>, id: string) {
  const row = await db
    .selectFrom("asset")
    .select(["id", "tag", "deviceModelId", "firmware", "state"])
    .where("id", "=", id)
    .executeTakeFirst();
  return row ?? null;
}

export interface AssetRecord {
  readonly id: string;
  readonly tag: string;
  readonly name: string;
  readonly siteId: string;
  readonly deviceModelId: string;
  readonly silenceCostMinorPerHour: number | null;
  readonly firmware: string;
  readonly note: string;
  readonly updatedAt: Date;
}

/** Writes an asset, new or known by its id. */
export async function saveAssetRecord(
  trx: Transaction<Database>,
  asset: AssetRecord,
): Promise<void> {
  const { id: _, ...changes } = asset;
  await trx
    .insertInto("asset")
    .values(asset)
    .onConflict((conflict) => conflict.column("id").doUpdateSet(changes))
    .execute();
}

export async function setAssetState(
  trx: Transaction<Database>,
  assetId: string,
  state: AssetState,
  at: Date,
): Promise<void> {
  await trx.updateTable("asset").set({ state, updatedAt: at }).where("id", "=", assetId).execute();
}

/** Events of a device: replacements, firmware changes, reports, stops; newest first. */
export async function listDeviceEvents(db: Kysely<Database>, assetId: string) {
  return db
    .selectFrom("deviceEvent")
    .leftJoin("person", "person.id", "deviceEvent.personId")
    .select([
      "deviceEvent.id",
      "deviceEvent.at",
      "deviceEvent.kind",
      "deviceEvent.note",
      "person.name as personName",
    ])
    .where("assetId", "=", assetId)
    .orderBy("at", "desc")
    .limit(200)
    .execute();
}

/** Visits of an asset: published ones of any day, proposed ones of drafts still open. */
export async function listAssetVisits(db: Kysely<Database>, assetId: string) {
  return db
    .selectFrom("task")
    .innerJoin("stop", "stop.id", "task.stopId")
    .innerJoin("round", "round.id", "stop.roundId")
    .innerJoin("plan", "plan.id", "round.planId")
    .innerJoin("technician", "technician.id", "round.technicianId")
    .innerJoin("person", "person.id", "technician.personId")
    .select([
      "round.id as roundId",
      "round.day",
      "round.state as roundState",
      "task.kind",
      "task.state as taskState",
      "stop.cannotReason",
      "stop.cannotNote",
      "person.name as technicianName",
    ])
    .where("task.assetId", "=", assetId)
    .where("plan.state", "in", ["draft", "published"])
    .where("round.state", "<>", "cancelled")
    .orderBy("round.day", "desc")
    .limit(50)
    .execute();
}

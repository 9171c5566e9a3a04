import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "../client";
import type { AssetRecord, AssetState } from "./assets";
import type { ClosureRecord, SiteRecord } from "./sites";

/** Sites with these codes as they stand. */
export async function findSitesByCode(db: Kysely<Database>, codes: readonly string[]) {
  if (codes.length === 0) return [];
  return db.selectFrom("site").selectAll().where("code", "in", codes).execute();
}

/** Closed seasons by site. */
export async function findClosures(db: Kysely<Database>, siteIds: readonly string[]) {
  const bySite = new Map<string, Omit<ClosureRecord, "id">[]>();
  if (siteIds.length === 0) return bySite;
  const rows = await db
    .selectFrom("siteClosure")
    .select(["siteId", "firstMonthDay", "lastMonthDay", "reason"])
    .where("siteId", "in", siteIds)
    .execute();
  for (const { siteId, ...closure } of rows) {
    bySite.set(siteId, [...(bySite.get(siteId) ?? []), closure]);
  }
  return bySite;
}

/** Assets with these tags as they stand. */
export async function findAssetsByTag(db: Kysely<Database>, tags: readonly string[]) {
  if (tags.length === 0) return [];
  return db
    .selectFrom("asset")
    .innerJoin("deviceModel", "deviceModel.id", "asset.deviceModelId")
    .selectAll("asset")
    .select(["deviceModel.series", "deviceModel.parallel"])
    .where("tag", "in", tags)
    .execute();
}

/** Ids by name of crews, climates and device models: what a file names in words. */
export async function findNames(db: Kysely<Database>) {
  const [crews, climates, models, cellTypes] = await Promise.all([
    db.selectFrom("crew").select(["id", "name"]).execute(),
    db.selectFrom("climate").select(["id", "name"]).execute(),
    db.selectFrom("deviceModel").select(["id", "name"]).execute(),
    db.selectFrom("cellType").select(["id", "designation as name"]).execute(),
  ]);
  return { crews, climates, models, cellTypes };
}

/** Writes sites, new or known by their id, in one statement. */
export async function upsertSites(
  trx: Transaction<Database>,
  sites: readonly SiteRecord[],
): Promise<void> {
  if (sites.length === 0) return;
  const rows = sites.map((s) => ({
    ...{ id: s.id, code: s.code, name: s.name, latitude: s.latitude, longitude: s.longitude },
    ...{ crew_id: s.crewId, climate_id: s.climateId, notice_days: s.noticeDays },
    ...{ opens: s.opens, closes: s.closes, key_code: s.keyCode, contact_name: s.contactName },
    ...{ contact_email: s.contactEmail, contact_phone: s.contactPhone, hazards: s.hazards },
    ...{ tickets: s.tickets, drive_up_notes: s.driveUpNotes, updated_at: s.updatedAt },
  }));
  await sql`
    insert into site (id, code, name, latitude, longitude, crew_id, climate_id, notice_days, opens, closes,
      key_code, contact_name, contact_email, contact_phone, hazards, tickets, drive_up_notes, updated_at)
    select id, code, name, latitude, longitude, crew_id, climate_id, notice_days, opens, closes,
      key_code, contact_name, contact_email, contact_phone, hazards, tickets, drive_up_notes, updated_at
    from json_populate_recordset(null::site, ${JSON.stringify(rows)}::json)
    on conflict (id) do update set code = excluded.code, name = excluded.name,
      latitude = excluded.latitude, longitude = excluded.longitude, crew_id = excluded.crew_id,
      climate_id = excluded.climate_id, notice_days = excluded.notice_days, opens = excluded.opens,
      closes = excluded.closes, key_code = excluded.key_code, contact_name = excluded.contact_name,
      contact_email = excluded.contact_email, contact_phone = excluded.contact_phone,
      hazards = excluded.hazards, tickets = excluded.tickets,
      drive_up_notes = excluded.drive_up_notes, updated_at = excluded.updated_at`.execute(trx);
}

/** Puts these closed seasons in place of what their sites had. */
export async function replaceClosures(
  trx: Transaction<Database>,
  closures: ReadonlyMap<string, readonly ClosureRecord[]>,
): Promise<void> {
  if (closures.size === 0) return;
  await trx
    .deleteFrom("siteClosure")
    .where("siteId", "in", [...closures.keys()])
    .execute();
  const rows = [...closures].flatMap(([siteId, list]) => list.map((c) => ({ ...c, siteId })));
  if (rows.length > 0) await trx.insertInto("siteClosure").values(rows).execute();
}

/** Writes assets, new or known by their id, in one statement. */
export async function upsertAssets(
  trx: Transaction<Database>,
  assets: readonly (AssetRecord & { readonly state: AssetState })[],
): Promise<void> {
  if (assets.length === 0) return;
  const rows = assets.map((a) => ({
    ...{ id: a.id, tag: a.tag, name: a.name, site_id: a.siteId, state: a.state },
    ...{ device_model_id: a.deviceModelId, firmware: a.firmware, note: a.note },
    silence_cost_minor_per_hour: a.silenceCostMinorPerHour,
    updated_at: a.updatedAt,
  }));
  await sql`
    insert into asset (id, tag, name, site_id, device_model_id, state, silence_cost_minor_per_hour,
      firmware, note, updated_at)
    select id, tag, name, site_id, device_model_id, state, silence_cost_minor_per_hour,
      firmware, note, updated_at
    from json_populate_recordset(null::asset, ${JSON.stringify(rows)}::json)
    on conflict (id) do update set tag = excluded.tag, name = excluded.name,
      site_id = excluded.site_id, device_model_id = excluded.device_model_id, state = excluded.state,
      silence_cost_minor_per_hour = excluded.silence_cost_minor_per_hour,
      firmware = excluded.firmware, note = excluded.note, updated_at = excluded.updated_at`.execute(
    trx,
  );
}

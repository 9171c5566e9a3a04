import { type Kysely, type RawBuilder, sql, type Transaction } from "kysely";
import type { Database } from "../client";

export const SITE_ORDERS = ["code", "name", "crew", "notice", "assets"] as const;
export type SiteOrder = (typeof SITE_ORDERS)[number];

export interface SiteListing {
  readonly search: string;
  readonly crewId: string | null;
  readonly order: SiteOrder;
  readonly descending: boolean;
  /** null: all. */
  readonly limit: number | null;
  readonly offset: number;
}

/** When a site can be entered, by whom, and what must be known before. */
export interface SiteAccess {
  readonly noticeDays: number;
  readonly opens: string | null;
  readonly closes: string | null;
  readonly keyCode: string | null;
  readonly contactName: string | null;
  readonly contactEmail: string | null;
  readonly contactPhone: string | null;
  readonly hazards: string[];
  readonly tickets: string[];
  readonly driveUpNotes: string;
}

export interface SiteRow extends SiteAccess {
  readonly id: string;
  readonly code: string;
  readonly name: string;
  readonly latitude: number;
  readonly longitude: number;
  readonly crewName: string | null;
  readonly climateName: string | null;
  readonly closures: number;
  readonly assets: number;
}

const ORDER_SQL: Record<SiteOrder, RawBuilder<unknown>> = {
  code: sql`s.code`,
  name: sql`lower(s.name)`,
  crew: sql`crew.name`,
  notice: sql`s.notice_days`,
  assets: sql`assets`,
};

function where({ search, crewId }: Pick<SiteListing, "search" | "crewId">): RawBuilder<unknown> {
  const like = `%${search.replace(/[\\%_]/g, "\\$&")}%`;
  return sql`(${search} = '' or s.name ilike ${like} or s.code ilike ${like})
    and (${crewId}::uuid is null or s.crew_id = ${crewId}::uuid)`;
}

/** One page of sites with their crew and how many assets stand there. */
export async function listSites(db: Kysely<Database>, listing: SiteListing): Promise<SiteRow[]> {
  const direction = listing.descending ? sql`desc nulls last` : sql`asc nulls last`;
  const result = await sql<SiteRow>`
    select s.id, s.code, s.name, s.latitude, s.longitude, s.notice_days, s.opens, s.closes, s.key_code,
      s.contact_name, s.contact_email, s.contact_phone, s.hazards, s.tickets, s.drive_up_notes,
      crew.name as crew_name, climate.name as climate_name,
      (select count(*)::int from site_closure where site_id = s.id) as closures,
      (select count(*)::int from asset where site_id = s.id and state <> 'retired') as assets
    from site s
    left join crew on crew.id = s.crew_id
    left join climate on climate.id = s.climate_id
    where ${where(listing)}
    order by ${ORDER_SQL[listing.order]} ${direction}, s.code
    limit ${listing.limit} offset ${listing.offset}`.execute(db);
  return result.rows;
}

export async function countSites(
  db: Kysely<Database>,
  filter: Pick<SiteListing, "search" | "crewId">,
): Promise<number> {
  const result = await sql<{ n: number }>`
    select count(*)::int as n from site s where ${where(filter)}`.execute(db);
  return result.rows[0]?.n ?? 0;
}

/** A site by its code with its closed seasons; null when there is none. */
export async function findSite(db: Kysely<Database>, code: string) {
  const site = await db.selectFrom("site").selectAll().where("code", "=", code).executeTakeFirst();
  if (!site) return null;
  const closures = await db
    .selectFrom("siteClosure")
    .select(["id", "firstMonthDay", "lastMonthDay", "reason"])
    .where("siteId", "=", site.id)
    .orderBy("firstMonthDay")
    .execute();
  return { ...site, closures };
}

export interface SiteRecord extends SiteAccess {
  readonly id: string;
  readonly code: string;
  readonly name: string;
  readonly latitude: number;
  readonly longitude: number;
  readonly crewId: string | null;
  readonly climateId: string | null;
  readonly updatedAt: Date;
}

export interface ClosureRecord {
  readonly id: string;
  readonly firstMonthDay: string;
  readonly lastMonthDay: string;
  readonly reason: string;
}

/** Writes a site, new or known by its id, and its closed seasons in place of the old ones. */
export async function saveSiteRecord(
  trx: Transaction<Database>,
  site: SiteRecord,
  closures: readonly ClosureRecord[],
): Promise<void> {
  const { id, ...changes } = site;
  await trx
    .insertInto("site")
    .values(site)
    .onConflict((conflict) => conflict.column("id").doUpdateSet(changes))
    .execute();
  await trx.deleteFrom("siteClosure").where("siteId", "=", id).execute();
  if (closures.length === 0) return;
  await trx
    .insertInto("siteClosure")
    .values(closures.map((closure) => ({ ...closure, siteId: id })))
    .execute();
}

/** Codes and names of all sites, to choose one while typing. */
export async function listSiteNames(db: Kysely<Database>) {
  return db.selectFrom("site").select(["code", "name"]).orderBy("code").execute();
}

export async function listClimates(db: Kysely<Database>) {
  return db.selectFrom("climate").select(["id", "name", "monthlyMeanDc"]).orderBy("name").execute();
}

/** Names of these sites by id. */
export async function loadSiteNames(
  db: Kysely<Database>,
  ids: readonly string[],
): Promise<Map<string, string>> {
  if (ids.length === 0) return new Map();
  const rows = await db.selectFrom("site").select(["id", "name"]).where("id", "in", ids).execute();
  return new Map(rows.map((row) => [row.id, row.name]));
}

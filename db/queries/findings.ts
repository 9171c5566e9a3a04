import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "../client";

/** A finding as the look at the fleet makes it. */
export interface FoundFinding {
  readonly id: string;
  readonly kind: "bad-lot" | "draw-shift";
  readonly lotId: string | null;
  readonly deviceModelId: string | null;
  readonly since: string | null;
  readonly factor: number;
  readonly chance: number;
  /** Draw shifts: how well the factor is known, one standard deviation as a share. */
  readonly relativeSd: number | null;
  readonly packsBehind: number;
}

/** Found this much later than one that was dismissed, a draw shift is another one. */
const ANOTHER_SHIFT_DAYS = 60;

/**
 * Writes what was found, in place of what was found before: known ones keep their id and their
 * dismissal, open ones that are no longer found go. Twice the same changes nothing but `seen_at`.
 */
export async function replaceFindings(
  trx: Transaction<Database>,
  found: readonly FoundFinding[],
  at: Date,
): Promise<void> {
  for (const finding of found) {
    const { factor, chance, packsBehind, since, relativeSd } = finding;
    const again = sql<boolean>`excluded.since > finding.since + ${ANOTHER_SHIFT_DAYS}::int`;
    await trx
      .insertInto("finding")
      .values({ ...finding, foundAt: at, seenAt: at })
      .onConflict((conflict) =>
        conflict.column(finding.kind === "bad-lot" ? "lotId" : "deviceModelId").doUpdateSet({
          ...{ factor, chance, packsBehind, since, relativeSd, seenAt: at },
          foundAt: sql<Date>`case when ${again} then excluded.found_at else finding.found_at end`,
          dismissedAt: sql<Date | null>`case when ${again} then null else finding.dismissed_at end`,
          dismissedBy: sql<
            string | null
          >`case when ${again} then null else finding.dismissed_by end`,
          dismissedBecause: sql<
            string | null
          >`case when ${again} then null else finding.dismissed_because end`,
        }),
      )
      .execute();
  }
  await trx
    .deleteFrom("finding")
    .where("seenAt", "<", at)
    .where("dismissedAt", "is", null)
    .execute();
}

/** Packs in service that each finding concerns. */
const CONCERNED = sql`
  select f.id as finding_id, p.id as pack_id, p.asset_id
  from finding f
  join asset a on true
  join pack p on p.asset_id = a.id and p.removed_at is null
  where (f.lot_id = p.lot_id or f.device_model_id = a.device_model_id) and a.state = 'in_service'`;

export interface FindingRow {
  readonly id: string;
  readonly kind: "bad-lot" | "draw-shift";
  readonly lotCode: string | null;
  readonly designation: string | null;
  readonly deviceModelId: string | null;
  readonly modelName: string | null;
  readonly since: string | null;
  readonly factor: number;
  readonly chance: number;
  readonly packsBehind: number;
  readonly foundAt: Date;
  readonly dismissedAt: Date | null;
  readonly dismissedBecause: string | null;
  readonly dismissedByName: string | null;
  /** In service now, with what is left of the lot in stores and vans. */
  readonly packsConcerned: number;
  readonly cellsLeft: number;
  /** Assets of the model whose firmware changed in the months before the shift, and when. */
  readonly firmwareAssets: number;
  readonly firmwareFrom: Date | null;
  readonly firmwareTo: Date | null;
  /** Those that reach cut-off first. */
  readonly packs: readonly {
    readonly tag: string;
    readonly name: string;
    readonly p50: string | null;
  }[];
}

const PACKS_SHOWN = 12;
/** A shift shows in voltages up to so long after its cause. */
const FIRMWARE_DAYS_BEFORE = 240;

/** Findings, open ones first, each with the packs in service that it concerns. */
export async function listFindingRows(db: Kysely<Database>): Promise<FindingRow[]> {
  const result = await sql<FindingRow>`
    with concerned as (${CONCERNED})
    select f.id, f.kind, l.code as lot_code, c.designation, f.device_model_id, m.name as model_name,
      f.since, f.factor, f.chance, f.packs_behind, f.found_at, f.dismissed_at, f.dismissed_because,
      who.name as dismissed_by_name,
      (select count(*)::int from concerned where finding_id = f.id) as packs_concerned,
      coalesce((select sum(ls.cells)::int from lot_stock ls join stock_place sp on sp.id = ls.place_id
        where ls.lot_id = f.lot_id and sp.kind <> 'return_box'), 0) as cells_left,
      coalesce(e.assets, 0) as firmware_assets, e.began as firmware_from, e.ended as firmware_to,
      coalesce((select json_agg(row_to_json(first)) from (
        select a.tag, a.name, fc.p50 from concerned k join asset a on a.id = k.asset_id
        left join forecast fc on fc.pack_id = k.pack_id where k.finding_id = f.id
        order by fc.p50 nulls last, a.tag limit ${PACKS_SHOWN}) first), '[]') as packs
    from finding f
    left join lot l on l.id = f.lot_id
    left join cell_type c on c.id = l.cell_type_id
    left join device_model m on m.id = f.device_model_id
    left join person who on who.id = f.dismissed_by
    left join lateral (select count(distinct ev.asset_id)::int as assets, min(ev.at) as began,
      max(ev.at) as ended from device_event ev join asset own on own.id = ev.asset_id
      where own.device_model_id = f.device_model_id and ev.kind = 'firmware_changed'
        and ev.at between f.since - ${FIRMWARE_DAYS_BEFORE}::int and f.since + 30) e on true
    order by f.dismissed_at is not null, f.found_at desc, f.id`.execute(db);
  return result.rows;
}

export interface PackFinding {
  readonly id: string;
  readonly kind: "bad-lot" | "draw-shift";
  readonly lotCode: string | null;
  readonly modelName: string | null;
  readonly since: string | null;
  readonly factor: number;
}

/** Open findings that concern an asset's pack. */
export async function listFindingsOfAsset(
  db: Kysely<Database>,
  assetId: string,
): Promise<PackFinding[]> {
  const result = await sql<PackFinding>`
    with concerned as (${CONCERNED})
    select f.id, f.kind, l.code as lot_code, m.name as model_name, f.since, f.factor
    from concerned k join finding f on f.id = k.finding_id
    left join lot l on l.id = f.lot_id
    left join device_model m on m.id = f.device_model_id
    where k.asset_id = ${assetId}::uuid and f.dismissed_at is null
    order by f.kind`.execute(db);
  return result.rows;
}

/** Packs in service that an open finding concerns: pack id to the kinds of finding. */
export async function findingKindsByPack(
  db: Kysely<Database>,
): Promise<ReadonlyMap<string, readonly string[]>> {
  const result = await sql<{ packId: string; kinds: string[] }>`
    with concerned as (${CONCERNED})
    select k.pack_id, array_agg(f.kind order by f.kind) as kinds
    from concerned k join finding f on f.id = k.finding_id
    where f.dismissed_at is null group by k.pack_id`.execute(db);
  return new Map(result.rows.map((row) => [row.packId, row.kinds]));
}

/** Lots with an open finding. */
export async function badLotIds(db: Kysely<Database>): Promise<ReadonlySet<string>> {
  const rows = await db
    .selectFrom("finding")
    .select("lotId")
    .where("kind", "=", "bad-lot")
    .where("dismissedAt", "is", null)
    .execute();
  return new Set(rows.flatMap((row) => row.lotId ?? []));
}

/** Packs in service in devices of a model. */
export async function packsOfModel(db: Kysely<Database>, deviceModelId: string): Promise<string[]> {
  const rows = await db
    .selectFrom("pack")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .select("pack.id")
    .where("asset.deviceModelId", "=", deviceModelId)
    .where("pack.removedAt", "is", null)
    .execute();
  return rows.map((row) => row.id);
}

/** A finding to be dismissed, locked; null when it is gone. */
export async function lockFinding(trx: Transaction<Database>, id: string) {
  const row = await trx
    .selectFrom("finding")
    .leftJoin("lot", "lot.id", "finding.lotId")
    .leftJoin("deviceModel", "deviceModel.id", "finding.deviceModelId")
    .select([
      "finding.id",
      "finding.kind",
      "finding.dismissedAt",
      "finding.deviceModelId",
      "lot.code as lotCode",
      "deviceModel.name as modelName",
    ])
    .where("finding.id", "=", id)
    .forUpdate("finding")
    .executeTakeFirst();
  return row ?? null;
}

export async function setDismissal(
  trx: Transaction<Database>,
  id: string,
  dismissal: { readonly at: Date; readonly by: string; readonly because: string } | null,
): Promise<void> {
  await trx
    .updateTable("finding")
    .set({
      dismissedAt: dismissal?.at ?? null,
      dismissedBy: dismissal?.by ?? null,
      dismissedBecause: dismissal?.because ?? null,
    })
    .where("id", "=", id)
    .execute();
}

import type { Kysely } from "kysely";
import { sql } from "kysely";
import type { Database } from "../client";

export interface WatchedPackRow {
  readonly packId: string;
  readonly assetId: string;
  readonly deviceModelId: string;
  readonly cellTypeId: string;
  readonly climateId: string | null;
  readonly lotId: string | null;
  readonly installedAt: Date;
  readonly until: Date;
  readonly ranOut: boolean;
  /** Median life promised by the sheet alone; null: still in, or not worked out. */
  readonly promisedDays: number | null;
}

/** Packs in service at some time since a moment, with how they ended if they did. */
export async function listWatchedPacks(
  db: Kysely<Database>,
  since: Date,
  now: Date,
): Promise<WatchedPackRow[]> {
  const result = await sql<WatchedPackRow>`
    select p.id as pack_id, p.asset_id, a.device_model_id, p.cell_type_id, s.climate_id, p.lot_id,
      p.installed_at, coalesce(o.ended_at, p.removed_at, ${now}::timestamptz) as until,
      p.removed_at is not null and coalesce(not o.censored, p.stopped_at is not null) as ran_out,
      o.promised_days
    from pack p
    join asset a on a.id = p.asset_id
    join site s on s.id = a.site_id
    left join forecast_outcome o on o.pack_id = p.id
    where (p.removed_at is null or p.removed_at >= ${since}) and p.installed_at < ${now}
    order by p.id`.execute(db);
  return result.rows;
}

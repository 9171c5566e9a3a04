import type { Kysely } from "kysely";
import { sql } from "kysely";
import type { Database } from "../client";

export interface ModelPlace {
  readonly climateId: string | null;
  readonly climateName: string | null;
  readonly latitude: number;
  readonly longitude: number;
  readonly assets: number;
}

/** Where assets of a model stand: the middle of each climate's sites, the commonest first. */
export async function placesOfModel(
  db: Kysely<Database>,
  deviceModelId: string,
): Promise<ModelPlace[]> {
  const result = await sql<ModelPlace>`
    select s.climate_id, c.name as climate_name, avg(s.latitude) as latitude,
      avg(s.longitude) as longitude, count(*)::int as assets
    from asset a join site s on s.id = a.site_id left join climate c on c.id = s.climate_id
    where a.device_model_id = ${deviceModelId}::uuid and a.state <> 'retired'
    group by s.climate_id, c.name order by assets desc, c.name`.execute(db);
  return result.rows;
}

/** Where one asset stands. */
export async function siteOfAsset(
  db: Kysely<Database>,
  assetId: string,
): Promise<ModelPlace | null> {
  const row = await db
    .selectFrom("asset")
    .innerJoin("site", "site.id", "asset.siteId")
    .leftJoin("climate", "climate.id", "site.climateId")
    .select(["site.climateId", "climate.name as climateName", "site.latitude", "site.longitude"])
    .where("asset.id", "=", assetId)
    .executeTakeFirst();
  return row ? { ...row, assets: 1 } : null;
}

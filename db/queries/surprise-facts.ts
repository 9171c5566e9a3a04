import { type Kysely, sql } from "kysely";
import type { Database } from "../client";

export interface SurpriseFacts {
  readonly packId: string;
  readonly readings: number;
  readonly monthlyMeanDc: readonly number[] | null;
  /** Code of its lot where a finding says that the lot is weak. */
  readonly weakLot: string | null;
  /** Since about when its model draws otherwise, and how much, where a finding says so. */
  readonly drawShiftSince: string | null;
  readonly drawFactor: number | null;
}

/** What may explain how these packs ended; dismissed findings explain nothing. */
export async function surpriseFacts(
  db: Kysely<Database>,
  packIds: readonly string[],
): Promise<ReadonlyMap<string, SurpriseFacts>> {
  if (packIds.length === 0) return new Map();
  const result = await sql<SurpriseFacts>`
    select p.id as pack_id,
      (select count(*)::int from reading r where r.pack_id = p.id) as readings,
      c.monthly_mean_dc, l.code as weak_lot, shift.since as draw_shift_since,
      shift.factor as draw_factor
    from pack p
    join asset a on a.id = p.asset_id
    join site s on s.id = a.site_id
    left join climate c on c.id = s.climate_id
    left join finding weak on weak.lot_id = p.lot_id and weak.dismissed_at is null
    left join lot l on l.id = weak.lot_id
    left join finding shift
      on shift.device_model_id = a.device_model_id and shift.dismissed_at is null
    where p.id = any(${packIds}::uuid[])`.execute(db);
  return new Map(result.rows.map((row) => [row.packId, row]));
}

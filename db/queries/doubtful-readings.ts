import { type Kysely, sql } from "kysely";
import type { Database } from "../client";

export interface DoubtfulReading {
  readonly id: string;
  readonly at: Date;
  readonly tag: string;
  readonly assetName: string;
  readonly millivolts: number;
  readonly kind: string;
  readonly source: string;
  readonly doubt: string | null;
  readonly personName: string | null;
  readonly apiKeyName: string | null;
  /** How far the standing forecast counts it, 0 to 1, and why; null: not weighed yet. */
  readonly weight: number | null;
  readonly reason: string | null;
  readonly expectedLowMv: number | null;
  readonly expectedHighMv: number | null;
}

/** Below this weight the forecast takes a reading for somebody's slip rather than the pack's. */
const HARDLY_COUNTS = 0.5;

/**
 * Readings of packs in service that the standing forecast hardly counts, or, not weighed yet, that
 * were marked unlikely when logged, and on which nobody has given a verdict; newest first. One
 * that was unlikely then and fits now (the one before it was the slip) is in doubt no longer.
 */
export async function listDoubtfulReadings(
  db: Kysely<Database>,
  limit: number,
): Promise<{ readonly rows: DoubtfulReading[]; readonly total: number }> {
  const result = await sql<DoubtfulReading & { total: number }>`
    select r.id, r.at, a.tag, a.name as asset_name, r.millivolts, r.kind, r.source, r.doubt,
      person.name as person_name, api_key.name as api_key_name,
      (w.w->>'weight')::float8 as weight, w.w->>'reason' as reason,
      (w.w->>'expectedLowMv')::float8 as expected_low_mv,
      (w.w->>'expectedHighMv')::float8 as expected_high_mv,
      count(*) over ()::int as total
    from pack p
    join asset a on a.id = p.asset_id
    join reading r on r.pack_id = p.id
    left join forecast f on f.pack_id = p.id
    left join lateral (select w from jsonb_array_elements(f.weights) w
      where w->>'readingId' = r.id::text limit 1) w on true
    left join person on person.id = r.person_id
    left join api_key on api_key.id = r.api_key_id
    where p.removed_at is null
      and not exists (select 1 from reading_verdict v where v.reading_id = r.id)
      and case when w.w is null then r.doubt is not null
        else (w.w->>'weight')::float8 < ${HARDLY_COUNTS}
          and (r.doubt is not null or w.w->>'reason' <> 'passivation') end
    order by r.at desc, r.id limit ${limit}`.execute(db);
  return { rows: result.rows, total: result.rows[0]?.total ?? 0 };
}

import { type Insertable, type Kysely, sql } from "kysely";
import type { Database } from "../client";

export type ClaimRow = Insertable<Database["forecastClaim"]>;

/** A quarter's first day, and the moment it starts in the organisation's time zone. */
export interface QuarterStart {
  readonly day: string;
  readonly at: Date;
}

/**
 * When a pack's life ended, as far as is known: it stopped, or came out before that. A device
 * that fell silent and has not reported since has stopped with the pack in it.
 */
const ENDED = sql<Date | null>`coalesce(p.stopped_at, p.removed_at, (
  select case when e.kind = 'stopped' then e.at end from device_event e
  where e.asset_id = p.asset_id and e.at >= p.installed_at and e.kind in ('stopped', 'reported')
  order by e.at desc limit 1))`;

/** A claim kept after the fact, before voltages of its time were known here. */
const OVERTAKEN = sql`exists (select 1 from reading r where r.pack_id = p.id
  and r.at < q.at and r.received_at > c.kept_at)`;

/** Of these quarters, how many packs ran at the start and have no claim; none left out. */
export async function countUnclaimed(
  db: Kysely<Database>,
  quarters: readonly QuarterStart[],
): Promise<ReadonlyMap<string, number>> {
  const result = await sql<{ day: string; packs: number }>`
    select q.day::text as day, count(*)::int as packs
    from ${asTable(quarters)}
    join (select p.*, ${ENDED} as ended from pack p) p
      on p.installed_at < q.at and (p.ended is null or p.ended > q.at)
    left join forecast_claim c on c.pack_id = p.id and c.quarter = q.day
    where c.pack_id is null or ${OVERTAKEN}
    group by q.day`.execute(db);
  return new Map(result.rows.map((row) => [row.day, row.packs]));
}

/** The next packs by id, after one, that ran when the quarter started and have no claim. */
export async function unclaimedPackPage(
  db: Kysely<Database>,
  quarter: QuarterStart,
  after: string | null,
  count: number,
): Promise<string[]> {
  const result = await sql<{ id: string }>`
    select p.id from ${asTable([quarter])}
    join (select p.*, ${ENDED} as ended from pack p) p
      on p.installed_at < q.at and (p.ended is null or p.ended > q.at)
    left join forecast_claim c on c.pack_id = p.id and c.quarter = q.day
    where (c.pack_id is null or ${OVERTAKEN}) and (${after}::uuid is null or p.id > ${after}::uuid)
    order by p.id limit ${count}`.execute(db);
  return result.rows.map((row) => row.id);
}

function asTable(quarters: readonly QuarterStart[]) {
  const days = quarters.map(({ day }) => day);
  const starts = quarters.map(({ at }) => at.toISOString());
  return sql`unnest(${days}::date[], ${starts}::timestamptz[]) as q(day, at)`;
}

export async function saveClaims(db: Kysely<Database>, rows: readonly ClaimRow[]): Promise<void> {
  if (rows.length === 0) return;
  await db
    .insertInto("forecastClaim")
    .values([...rows])
    .onConflict((conflict) =>
      conflict.columns(["packId", "quarter"]).doUpdateSet((eb) => ({
        madeAt: eb.ref("excluded.madeAt"),
        keptAt: eb.ref("excluded.keptAt"),
        cdfDays: eb.ref("excluded.cdfDays"),
      })),
    )
    .execute();
}

export interface ClaimLine {
  readonly packId: string;
  readonly quarter: string;
  readonly madeAt: Date;
  readonly keptAt: Date;
  readonly cdfDays: number[];
  readonly tag: string;
  readonly modelName: string;
  readonly crewName: string | null;
  readonly designation: string;
  readonly chemistry: string;
  readonly installedAt: Date;
  readonly removedAt: Date | null;
  readonly reasonOut: string | null;
  /** When it stopped or came out; null: it runs. */
  readonly endedAt: Date | null;
  /** Ended by stopping, as far as is known. */
  readonly stopped: boolean;
}

/** What was said of packs at the start of each quarter since one, with what has come of them. */
export async function listClaims(
  db: Kysely<Database>,
  sinceQuarter: string,
  crewId: string | null,
): Promise<ClaimLine[]> {
  const result = await sql<ClaimLine>`
    select c.pack_id, c.quarter, c.made_at, c.kept_at, c.cdf_days, p.installed_at, p.removed_at,
      p.reason_out, p.ended as ended_at, t.designation, t.chemistry, a.tag, m.name as model_name,
      crew.name as crew_name,
      p.ended is not null and (p.removed_at is null or p.stopped_at is not null) as stopped
    from forecast_claim c
    join (select p.*, ${ENDED} as ended from pack p) p on p.id = c.pack_id
    join cell_type t on t.id = p.cell_type_id
    join asset a on a.id = p.asset_id
    join device_model m on m.id = a.device_model_id
    join site s on s.id = a.site_id
    left join crew on crew.id = s.crew_id
    where c.quarter >= ${sinceQuarter}::date
      and (${crewId}::uuid is null or s.crew_id = ${crewId}::uuid)
    order by c.quarter, c.pack_id`.execute(db);
  return result.rows;
}

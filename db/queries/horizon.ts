import { type Kysely, sql, type SqlBool } from "kysely";
import type { Database } from "../client";

export const HORIZON_ORDERS = ["waiting", "cutoff", "tag", "site", "left"] as const;
export type HorizonOrder = (typeof HORIZON_ORDERS)[number];

export interface HorizonFilter {
  /** Only packs whose likely cut-off lies within so many days; null: all. */
  readonly withinDays: number | null;
  readonly crewId: string | null;
  readonly chemistry: string | null;
  readonly notBooked: boolean;
  readonly search: string;
}

export interface HorizonPage {
  readonly order: HorizonOrder;
  readonly descending: boolean;
  readonly limit: number;
  readonly offset: number;
}

/** What the horizon is seen from. */
export interface Standpoint {
  readonly now: Date;
  /** Today in the organisation's time zone. */
  readonly today: string;
}

/** Every installed pack of an asset in service with its forecast and its next visit. */
function installedPacks(db: Kysely<Database>, from: Standpoint) {
  return db
    .with("nextVisit", (cte) =>
      cte
        .selectFrom("task")
        .innerJoin("stop", "stop.id", "task.stopId")
        .innerJoin("round", "round.id", "stop.roundId")
        .innerJoin("plan", "plan.id", "round.planId")
        .innerJoin("technician", "technician.id", "round.technicianId")
        .innerJoin("person", "person.id", "technician.personId")
        .distinctOn("task.assetId")
        .select([
          "task.assetId",
          "round.id as roundId",
          "round.day",
          "round.state as roundState",
          "person.name as technicianName",
        ])
        .where("round.day", ">=", from.today)
        .where("task.kind", "=", "swap")
        .where("task.state", "=", "planned")
        .where("round.state", "in", ["proposed", "published", "started"])
        .where("plan.state", "in", ["draft", "published"])
        .orderBy("task.assetId")
        .orderBy(sql`round.state = 'proposed'`)
        .orderBy("round.day"),
    )
    .selectFrom("pack")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .innerJoin("site", "site.id", "asset.siteId")
    .innerJoin("cellType", "cellType.id", "pack.cellTypeId")
    .leftJoin("forecast", "forecast.packId", "pack.id")
    .leftJoin("nextVisit", "nextVisit.assetId", "asset.id")
    .where("pack.removedAt", "is", null)
    .where("asset.state", "=", "in_service");
}

type Selection = ReturnType<typeof installedPacks>;

function narrow(query: Selection, filter: HorizonFilter, from: Standpoint): Selection {
  const { withinDays, crewId, chemistry, notBooked, search } = filter;
  return query
    .$if(withinDays !== null, (q) =>
      q.where(
        sql<SqlBool>`forecast.p50 <= ${from.now}::timestamptz + make_interval(days => ${withinDays ?? 0})`,
      ),
    )
    .$if(crewId !== null, (q) => q.where("site.crewId", "=", crewId))
    .$if(chemistry !== null, (q) => q.where("cellType.chemistry", "=", chemistry ?? ""))
    .$if(notBooked, (q) =>
      q.where((eb) =>
        eb.or([
          eb("nextVisit.roundState", "is", null),
          eb("nextVisit.roundState", "=", "proposed"),
        ]),
      ),
    )
    .$if(search !== "", (q) => {
      const like = `%${search.replace(/[\\%_]/g, "\\$&")}%`;
      return q.where((eb) =>
        eb.or([
          eb("asset.tag", "ilike", like),
          eb("asset.name", "ilike", like),
          eb("site.name", "ilike", like),
          eb("site.code", "ilike", like),
        ]),
      );
    });
}

const ORDER = {
  waiting: sql`forecast.waiting_cost_minor_per_week`,
  cutoff: sql`forecast.p50`,
  tag: sql`asset.tag`,
  site: sql`site.name`,
  left: sql`forecast.share_left_permille`,
} as const;

const SHOWN = [
  "pack.id as packId",
  "pack.series",
  "pack.parallel",
  "pack.installedAt",
  "asset.id as assetId",
  "asset.tag",
  "asset.name as assetName",
  "site.name as siteName",
  "site.noticeDays",
  "cellType.designation",
  "cellType.chemistry",
  "forecast.p05",
  "forecast.p50",
  "forecast.p95",
  "forecast.shareLeftPermille",
  "forecast.outNowPermille",
  "forecast.staleSince",
  "forecast.waitingCostMinorPerWeek",
  "nextVisit.roundId",
  "nextVisit.day as visitDay",
  "nextVisit.roundState",
  "nextVisit.technicianName",
] as const;

/** One page of the horizon, and how many there are. */
export async function horizonPage(
  db: Kysely<Database>,
  filter: HorizonFilter,
  page: HorizonPage,
  from: Standpoint,
) {
  return narrow(installedPacks(db, from), filter, from)
    .select(SHOWN)
    .select([
      sql<number>`count(*) over ()`.as("total"),
      sql<Date[] | null>`(select array_agg(r.at order by r.at) from (
        select reading.at from reading where reading.pack_id = pack.id
        order by reading.at desc limit 12) r)`.as("readAt"),
    ])
    .orderBy(ORDER[page.order], (order) =>
      page.descending ? order.desc().nullsLast() : order.asc().nullsLast(),
    )
    .orderBy("forecast.p50", (order) => order.asc().nullsLast())
    .orderBy("asset.tag")
    .limit(page.limit)
    .offset(page.offset)
    .execute();
}
export type HorizonRow = Awaited<ReturnType<typeof horizonPage>>[number];

export interface WeekOfCutoffs {
  /** Whole weeks from now, 0 is the coming seven days; what is past counts as week 0. */
  readonly week: number;
  readonly mean: number;
  readonly variance: number;
}

/** Expected cut-offs a week among the filtered packs, summed from the forecasts' distributions. */
export async function cutoffsByWeek(
  db: Kysely<Database>,
  filter: HorizonFilter,
  weeks: number,
  from: Standpoint,
): Promise<WeekOfCutoffs[]> {
  const nowDays = from.now.getTime() / 86_400_000;
  const perPack = narrow(installedPacks(db, from), filter, from)
    .innerJoinLateral(
      sql<{ week: number; share: number }>`(select
          greatest(0, floor((day - ${nowDays}) / 7))::int as week, count(*) / 50.0 as share
        from unnest(forecast.cdf_days) as day group by 1)`.as("part"),
      (join) => join.onTrue(),
    )
    .select(["part.week", "part.share"])
    .as("perPack");
  const rows = await db
    .selectFrom(perPack)
    .select([
      "week",
      sql<number>`sum(share)::float8`.as("mean"),
      sql<number>`sum(share * (1 - share))::float8`.as("variance"),
    ])
    .where("week", "<", weeks)
    .groupBy("week")
    .orderBy("week")
    .execute();
  return rows;
}

import { type Kysely, sql, type SqlBool } from "kysely";
import type { Database } from "../client";
import type { Standpoint } from "./horizon";

/** Chance of each pack to reach cut-off within `days`, for those not out already; tiny ones left out. */
export async function chancesWithin(
  db: Kysely<Database>,
  crewId: string | null,
  days: number,
  from: Standpoint,
): Promise<number[]> {
  const limit = from.now.getTime() / 86_400_000 + days;
  const rows = await db
    .selectFrom("forecast")
    .innerJoin("pack", "pack.id", "forecast.packId")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .innerJoin("site", "site.id", "asset.siteId")
    .select(
      sql<number>`(select count(*) from unnest(forecast.cdf_days) d where d <= ${limit}) / 50.0::float8`.as(
        "chance",
      ),
    )
    .where("pack.removedAt", "is", null)
    .where("asset.state", "=", "in_service")
    .where("forecast.outNowPermille", "<", 500)
    .where(sql<SqlBool>`forecast.cdf_days[1] <= ${limit}`)
    .$if(crewId !== null, (q) => q.where("site.crewId", "=", crewId))
    .execute();
  return rows.map((row) => row.chance);
}

/** How many are out now and since when the longest. */
export async function outNow(db: Kysely<Database>, crewId: string | null) {
  return db
    .selectFrom("forecast")
    .innerJoin("pack", "pack.id", "forecast.packId")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .innerJoin("site", "site.id", "asset.siteId")
    .select([sql<number>`count(*)`.as("count"), sql<Date | null>`min(forecast.p50)`.as("oldest")])
    .where("pack.removedAt", "is", null)
    .where("asset.state", "=", "in_service")
    .where("forecast.outNowPermille", ">=", 500)
    .$if(crewId !== null, (q) => q.where("site.crewId", "=", crewId))
    .executeTakeFirstOrThrow();
}

/** Work in published rounds of these days, and the shift hours there are. */
export async function bookedHours(
  db: Kysely<Database>,
  crewId: string | null,
  days: readonly string[],
) {
  const booked = await db
    .selectFrom("round")
    .innerJoin("technician", "technician.id", "round.technicianId")
    .select(sql<number>`coalesce(sum(drive_s + work_s), 0)`.as("seconds"))
    .where("round.day", "in", days)
    .where("round.state", "in", ["published", "started", "done"])
    .$if(crewId !== null, (q) => q.where("technician.crewId", "=", crewId ?? ""))
    .executeTakeFirstOrThrow();
  const there = await db
    .selectFrom("shift")
    .innerJoin("technician", "technician.id", "shift.technicianId")
    .innerJoin("person", "person.id", "technician.personId")
    .innerJoin(sql<{ day: string }>`unnest(${days}::date[])`.as<"each">(sql`each(day)`), (join) =>
      join.on(sql<SqlBool>`shift.weekday = extract(isodow from each.day)`),
    )
    .select(sql<number>`coalesce(sum(extract(epoch from ends - starts)), 0)::float8`.as("seconds"))
    .where("person.active", "=", true)
    .where((eb) =>
      eb.not(
        eb.exists(
          eb
            .selectFrom("absence")
            .select("absence.id")
            .whereRef("absence.technicianId", "=", "technician.id")
            .where(sql<SqlBool>`each.day between absence.first_day and absence.last_day`),
        ),
      ),
    )
    .$if(crewId !== null, (q) => q.where("technician.crewId", "=", crewId ?? ""))
    .executeTakeFirstOrThrow();
  return { bookedS: Number(booked.seconds), shiftS: Number(there.seconds) };
}

/** Cells that the published rounds of these days need, most first. */
export async function cellsToLoad(
  db: Kysely<Database>,
  crewId: string | null,
  days: readonly string[],
) {
  return db
    .selectFrom("task")
    .innerJoin("stop", "stop.id", "task.stopId")
    .innerJoin("round", "round.id", "stop.roundId")
    .innerJoin("technician", "technician.id", "round.technicianId")
    .innerJoin("cellType", "cellType.id", "task.cellTypeId")
    .select(["cellType.designation", sql<number>`sum(task.cells)::int`.as("cells")])
    .where("round.day", "in", days)
    .where("round.state", "in", ["published", "started"])
    .where("task.state", "=", "planned")
    .$if(crewId !== null, (q) => q.where("technician.crewId", "=", crewId ?? ""))
    .groupBy("cellType.designation")
    .orderBy("cells", "desc")
    .execute();
}

/** Charge that came out unused since `since`, as a share of the rated charge of those packs. */
export async function chargeThrownAway(
  db: Kysely<Database>,
  crewId: string | null,
  since: Date,
): Promise<number | null> {
  const row = await db
    .selectFrom("forecastOutcome")
    .innerJoin("pack", "pack.id", "forecastOutcome.packId")
    .innerJoin("cellType", "cellType.id", "pack.cellTypeId")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .innerJoin("site", "site.id", "asset.siteId")
    .select(
      sql<number | null>`(sum(share_left_permille / 1000.0 * rated_capacity_mah * pack.parallel)
        / nullif(sum(rated_capacity_mah * pack.parallel), 0))::float8`.as("share"),
    )
    .where("forecastOutcome.endedAt", ">=", since)
    .$if(crewId !== null, (q) => q.where("site.crewId", "=", crewId))
    .executeTakeFirstOrThrow();
  return row.share;
}

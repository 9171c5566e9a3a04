import { randomUUID } from "node:crypto";
import type { Kysely } from "kysely";
import { connect, type Database } from "@/db/client";

export interface FieldScenario {
  readonly db: Kysely<Database>;
  readonly email: string;
  readonly personId: string;
  readonly roundId: string;
  readonly vanPlaceId: string;
  /** In the order of the round. */
  readonly stops: readonly FieldStop[];
}

export interface FieldStop {
  readonly id: string;
  readonly assetId: string;
  readonly tag: string;
  readonly packId: string;
  readonly lotId: string;
  /** A resting voltage that lies within what such a pack can show. */
  readonly plausibleMv: number;
  readonly cells: number;
}

const EMAIL = "technician3@quillmere.example";

/**
 * Gives one technician of the seeded scenario a published round today, of so many stops with one
 * pack each, and enough cells of one lot in the van for every one of them.
 */
export async function fieldScenario(url: string, stops: number): Promise<FieldScenario> {
  const db = connect(url, { max: 2, applicationName: "wanewright-e2e" });
  const who = await db
    .selectFrom("technician")
    .innerJoin("person", "person.id", "technician.personId")
    .innerJoin("stockPlace", "stockPlace.vanId", "technician.vanId")
    .select(["technician.id", "person.id as personId", "stockPlace.id as vanPlaceId"])
    .where("person.email", "=", EMAIL)
    .executeTakeFirstOrThrow();
  const places = await placesToVisit(db, stops);
  const roundId = await publishRound(db, who.id);
  const made: FieldStop[] = [];
  for (const [n, place] of places.entries()) {
    made.push(await addStop(db, { roundId, vanPlaceId: who.vanPlaceId, position: n + 1 }, place));
  }
  const { personId, vanPlaceId } = who;
  return { db, email: EMAIL, personId, roundId, vanPlaceId, stops: made };
}

/** One asset a site whose pack has a resting voltage and stands in a model's preferred cells. */
async function placesToVisit(db: Kysely<Database>, count: number) {
  const rows = await db
    .selectFrom("pack")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .innerJoin("reading", "reading.packId", "pack.id")
    .innerJoin("deviceModelCellType", (join) =>
      join
        .onRef("deviceModelCellType.deviceModelId", "=", "asset.deviceModelId")
        .onRef("deviceModelCellType.cellTypeId", "=", "pack.cellTypeId"),
    )
    .select(["asset.siteId", "asset.id as assetId", "asset.tag", "pack.id as packId"])
    .select(["pack.cellTypeId", "reading.millivolts"])
    .select((eb) => eb(eb.ref("pack.series"), "*", eb.ref("pack.parallel")).as("cells"))
    .distinctOn("asset.siteId")
    .where("pack.removedAt", "is", null)
    .where("asset.state", "=", "in_service")
    .where("reading.kind", "=", "resting")
    .orderBy("asset.siteId")
    .orderBy("reading.at", "desc")
    .limit(count)
    .execute();
  if (rows.length < count) throw new Error(`the scenario has ${rows.length} such sites`);
  return rows;
}

async function publishRound(db: Kysely<Database>, technicianId: string): Promise<string> {
  const { timeZone } = await db
    .selectFrom("organisation")
    .select("timeZone")
    .executeTakeFirstOrThrow();
  const day = new Intl.DateTimeFormat("sv-SE", { timeZone }).format(new Date());
  await db
    .updateTable("round")
    .set({ state: "cancelled" })
    .where("technicianId", "=", technicianId)
    .where("day", "=", day)
    .execute();
  const [planId, id] = [randomUUID(), randomUUID()];
  const at = (time: string) => new Date(`${day}T${time}:00Z`);
  await db
    .insertInto("plan")
    .values({
      ...{ id: planId, name: "Field day", firstDay: day, lastDay: day, state: "published" },
      ...{ createdAt: at("00:01"), publishedAt: at("00:01") },
    })
    .execute();
  await db
    .insertInto("round")
    .values({
      ...{ id, planId, technicianId, day, state: "published", icalUid: id },
      ...{ startsAt: at("07:30"), endsAt: at("16:00"), distanceM: 61_000 },
    })
    .execute();
  return id;
}

type Place = Awaited<ReturnType<typeof placesToVisit>>[number];

async function addStop(
  db: Kysely<Database>,
  where: { roundId: string; vanPlaceId: string; position: number },
  place: Place,
): Promise<FieldStop> {
  const { roundId, vanPlaceId, position } = where;
  const [id, lotId] = [randomUUID(), randomUUID()];
  const cells = Number(place.cells);
  const arrivesAt = new Date(Date.now() + position * 20 * 60_000);
  await db
    .insertInto("stop")
    .values({
      ...{ id, roundId, siteId: place.siteId, position, arrivesAt },
      departsAt: new Date(arrivesAt.getTime() + 10 * 60_000),
    })
    .execute();
  const { assetId, packId, cellTypeId, tag } = place;
  await db
    .insertInto("task")
    .values({
      ...{ id: randomUUID(), stopId: id, assetId, packId, cellTypeId },
      kind: "swap",
      cells,
    })
    .execute();
  const code = `E2E-${lotId.slice(0, 8)}`;
  await db
    .insertInto("lot")
    .values({
      ...{ id: lotId, code, cellTypeId, madeOn: "2026-01-01", receivedOn: "2026-02-01" },
      cellsReceived: cells,
    })
    .execute();
  await db.insertInto("lotStock").values({ lotId, placeId: vanPlaceId, cells }).execute();
  return { id, assetId, tag, packId, lotId, plausibleMv: place.millivolts, cells };
}

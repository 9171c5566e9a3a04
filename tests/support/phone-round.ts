import { randomUUID } from "node:crypto";
import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import type { PersonActor } from "@/lib/usecases/use-case";
import type { SmallRegister } from "./small-register";

export interface PhoneRound {
  readonly technician: PersonActor;
  readonly roundId: string;
  readonly stopId: string;
  /** Three assets of its own; the first two hold a pack. */
  readonly assets: readonly string[];
  readonly packs: readonly string[];
  readonly vanPlaceId: string;
  readonly cellsInVan: () => Promise<number>;
}

/**
 * A technician with a van of 20 LR20, three assets of which two hold a pack, and a round of one
 * stop where both are to be swapped. Called again it makes another, beside the first.
 */
export async function phoneRound(
  db: Kysely<Database>,
  register: SmallRegister,
  day = "2026-12-01",
): Promise<PhoneRound> {
  const ids = {
    depot: randomUUID(),
    crew: randomUUID(),
    van: randomUUID(),
    place: randomUUID(),
    technician: randomUUID(),
    plan: randomUUID(),
    round: randomUUID(),
    stop: randomUUID(),
  };
  const name = `Van ${ids.van}`;
  await db
    .insertInto("depot")
    .values({ id: ids.depot, name, latitude: 52.5, longitude: 0.1 })
    .execute();
  await db.insertInto("crew").values({ id: ids.crew, name, depotId: ids.depot }).execute();
  await db.insertInto("van").values({ id: ids.van, name, crewId: ids.crew }).execute();
  await db
    .insertInto("stockPlace")
    .values({ id: ids.place, kind: "van", name, vanId: ids.van })
    .execute();
  await db
    .insertInto("lotStock")
    .values({ lotId: register.lotId, placeId: ids.place, cells: 20 })
    .execute();
  const person = await register.actor(["technician"]);
  await db
    .insertInto("technician")
    .values({ id: ids.technician, personId: person.personId, crewId: ids.crew, vanId: ids.van })
    .execute();
  const assets = await insertAssets(db, register);
  const packs = await fitPacks(db, register, assets);
  await insertRound(db, register, ids, assets, packs, day);
  const cellsInVan = async () =>
    (
      await db
        .selectFrom("lotStock")
        .select("cells")
        .where("placeId", "=", ids.place)
        .executeTakeFirstOrThrow()
    ).cells;
  return {
    technician: { ...person, technicianId: ids.technician },
    ...{ roundId: ids.round, stopId: ids.stop, vanPlaceId: ids.place, assets, packs, cellsInVan },
  };
}

async function insertAssets(db: Kysely<Database>, register: SmallRegister): Promise<string[]> {
  const { siteId, modelId: deviceModelId } = register;
  const assets = [randomUUID(), randomUUID(), randomUUID()];
  const rows = assets.map((id) => ({ id, tag: `PH-${id}`, name: "Gauge", siteId, deviceModelId }));
  await db.insertInto("asset").values(rows).execute();
  return assets;
}

async function fitPacks(
  db: Kysely<Database>,
  register: SmallRegister,
  assets: readonly string[],
): Promise<string[]> {
  const installedAt = new Date("2026-03-01T09:00:00Z");
  const rows = assets.slice(0, 2).map((assetId) => ({
    ...{ id: randomUUID(), assetId, cellTypeId: register.lr20, lotId: register.lotId },
    ...{ series: 2, parallel: 1, installedAt },
  }));
  await db.insertInto("pack").values(rows).execute();
  return rows.map((row) => row.id);
}

async function insertRound(
  db: Kysely<Database>,
  register: SmallRegister,
  ids: { plan: string; round: string; stop: string; technician: string },
  assets: readonly string[],
  packs: readonly string[],
  day: string,
): Promise<void> {
  const at = (time: string) => new Date(`${day}T${time}:00Z`);
  await db
    .insertInto("plan")
    .values({
      ...{ id: ids.plan, name: "Week", firstDay: day, lastDay: day, state: "published" },
      ...{ createdAt: at("06:00"), publishedAt: at("06:00") },
    })
    .execute();
  await db
    .insertInto("round")
    .values({
      ...{ id: ids.round, planId: ids.plan, technicianId: ids.technician, day },
      ...{ state: "published", startsAt: at("08:00"), endsAt: at("16:00"), icalUid: ids.round },
    })
    .execute();
  await db
    .insertInto("stop")
    .values({
      ...{ id: ids.stop, roundId: ids.round, siteId: register.siteId, position: 1 },
      ...{ arrivesAt: at("08:30"), departsAt: at("09:00") },
    })
    .execute();
  await db
    .insertInto("task")
    .values(
      packs.map((packId, n) => ({
        ...{ id: randomUUID(), stopId: ids.stop, assetId: assets[n] ?? "", packId },
        ...{ kind: "swap", cellTypeId: register.lr20, cells: 2 },
      })),
    )
    .execute();
}

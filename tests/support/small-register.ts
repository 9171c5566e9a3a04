import { randomUUID } from "node:crypto";
import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import type { PersonActor, Role } from "@/lib/usecases/use-case";
import { actorWith } from "./deps";

/** Ids of a small invented register: one site, one model on two LR20 in series, three assets. */
export interface SmallRegister {
  readonly siteId: string;
  readonly modelId: string;
  readonly lr20: string;
  readonly er34615: string;
  readonly assets: readonly string[];
  readonly lotId: string;
  readonly storesId: string;
  readonly actor: (roles: readonly Role[]) => Promise<PersonActor>;
}

/** Fills an empty database with just enough to log, swap and count. */
export async function smallRegister(db: Kysely<Database>): Promise<SmallRegister> {
  await db
    .insertInto("organisation")
    .values({
      name: "Quillmere Drainage Board",
      timeZone: "Europe/London",
      currency: "GBP",
      locale: "en-GB",
    })
    .execute();
  const ids = {
    siteId: randomUUID(),
    modelId: randomUUID(),
    lr20: randomUUID(),
    er34615: randomUUID(),
    lotId: randomUUID(),
    storesId: randomUUID(),
  };
  await insertCellTypes(db, ids);
  await insertModel(db, ids);
  await db
    .insertInto("site")
    .values({ id: ids.siteId, code: "S-1", name: "Sluice 9", latitude: 52.5, longitude: 0.1 })
    .execute();
  const assets = [randomUUID(), randomUUID(), randomUUID()];
  await db
    .insertInto("asset")
    .values(
      assets.map((id, n) => ({
        id,
        tag: `QF-000${n + 1}`,
        name: `Level gauge ${n + 1}`,
        siteId: ids.siteId,
        deviceModelId: ids.modelId,
      })),
    )
    .execute();
  return { ...ids, assets, actor: (roles) => insertPerson(db, roles) };
}

async function insertCellTypes(db: Kysely<Database>, ids: { lr20: string; er34615: string }) {
  const base = { name: "", ratedTemperatureDc: 200, selfDischargePpmPerYear: 20_000 };
  await db
    .insertInto("cellType")
    .values([
      {
        ...base,
        id: ids.lr20,
        designation: "LR20",
        chemistry: "alkaline",
        nominalMv: 1500,
        ratedCapacityMah: 15_000,
        ratedCurrentUa: 50_000,
        ratedCutoffMv: 800,
        resistanceMohm: 120,
      },
      {
        ...base,
        id: ids.er34615,
        designation: "ER34615",
        chemistry: "li-socl2",
        nominalMv: 3600,
        ratedCapacityMah: 19_000,
        ratedCurrentUa: 3000,
        ratedCutoffMv: 2000,
        resistanceMohm: 3000,
      },
    ])
    .execute();
}

async function insertModel(
  db: Kysely<Database>,
  ids: { modelId: string; lr20: string; lotId: string; storesId: string },
) {
  await db
    .insertInto("deviceModel")
    .values({ id: ids.modelId, name: "Gauge M1", cutoffMv: 2200, series: 2, parallel: 1 })
    .execute();
  await db
    .insertInto("deviceModelCellType")
    .values({ deviceModelId: ids.modelId, cellTypeId: ids.lr20, preferred: true })
    .execute();
  await db
    .insertInto("lot")
    .values({
      id: ids.lotId,
      code: "LOT-1",
      cellTypeId: ids.lr20,
      madeOn: "2025-06-01",
      receivedOn: "2025-07-01",
      cellsReceived: 10,
    })
    .execute();
  await db
    .insertInto("stockPlace")
    .values({ id: ids.storesId, kind: "stores", name: "Stores" })
    .execute();
  await db
    .insertInto("lotStock")
    .values({ lotId: ids.lotId, placeId: ids.storesId, cells: 10 })
    .execute();
}

async function insertPerson(db: Kysely<Database>, roles: readonly Role[]): Promise<PersonActor> {
  const actor = actorWith(roles, { email: `${randomUUID()}@quillmere.example` });
  await db
    .insertInto("person")
    .values({ id: actor.personId, name: actor.name, email: actor.email, roles: [...roles] })
    .execute();
  return actor;
}

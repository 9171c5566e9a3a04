import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "@/db/client";
import { replaceRoads } from "@/db/queries/roads";
import { transactionalJobs } from "@/lib/server/jobs";
import { hashPassword } from "@/lib/usecases/passwords";
import { buildScenario } from "../simulate/scenario/build-scenario";
import type { Scenario } from "../simulate/scenario/scenario";
import * as history from "./history-rows";
import { insertRows } from "./insert-rows";
import * as people from "./people-rows";
import * as register from "./register-rows";
import { roundRows } from "./round-rows";
import * as stock from "./stock-rows";

export interface SeedOptions {
  /** The moment the scenario ends at; the product's real now. */
  readonly today: Date;
  readonly seed: string | number;
  /** Every demonstration account signs in with it. */
  readonly password: string;
}

export type SeedOutcome =
  | { readonly seeded: false; readonly reason: string }
  | {
      readonly seeded: true;
      readonly assets: number;
      readonly packs: number;
      readonly readings: number;
      readonly rounds: number;
      /** Whether the worker has been asked to forecast every pack. */
      readonly forecastsAsked: boolean;
    };

async function insertPeople(trx: Transaction<Database>, s: Scenario, hash: string): Promise<void> {
  await insertRows(trx, "organisation", [people.organisationRow(s)]);
  await insertRows(trx, "person", people.personRows(s, hash));
  await insertRows(trx, "digestSetting", people.digestRows());
  await insertRows(trx, "depot", people.depotRows(s));
  await insertRows(trx, "crew", people.crewRows(s));
  await insertRows(trx, "van", people.vanRows(s));
  await insertRows(trx, "technician", people.technicianRows(s));
  await insertRows(trx, "shift", people.shiftRows(s));
  await insertRows(trx, "absence", people.absenceRows(s));
}

async function insertRegister(trx: Transaction<Database>, s: Scenario): Promise<void> {
  await insertRows(trx, "climate", register.climateRows(s));
  await insertRows(trx, "site", register.siteRows(s));
  await insertRows(trx, "siteClosure", register.closureRows(s));
  await insertRows(trx, "cellType", register.cellTypeRows(s));
  await insertRows(trx, "capacityPoint", register.capacityRows(s));
  await insertRows(trx, "deviceModel", register.modelRows(s));
  await insertRows(trx, "dutyState", register.dutyRows(s));
  await insertRows(trx, "deviceModelCellType", register.acceptedCellRows(s));
  await insertRows(trx, "asset", register.assetRows(s));
}

async function insertStock(trx: Transaction<Database>, s: Scenario): Promise<void> {
  await insertRows(trx, "lot", stock.lotRows(s));
  await insertRows(trx, "stockPlace", stock.placeRows(s));
  await insertRows(trx, "lotStock", stock.lotStockRows(s));
  await insertRows(trx, "stockMove", stock.moveRows(s));
}

async function insertHistory(
  trx: Transaction<Database>,
  s: Scenario,
): Promise<{ readings: number; rounds: number }> {
  const readings = history.readingRows(s);
  const { plans, rounds, stops, tasks } = roundRows(s);
  await insertRows(trx, "pack", history.packRows(s));
  await insertRows(trx, "reading", readings);
  await insertRows(trx, "deviceEvent", history.eventRows(s));
  await insertRows(trx, "drawMeasurement", history.drawRows(s));
  await insertRows(trx, "plan", plans);
  await insertRows(trx, "round", rounds);
  await insertRows(trx, "stop", stops);
  await insertRows(trx, "task", tasks);
  return { readings: readings.length, rounds: rounds.length };
}

/** The queue's tables are made by the migration script, not by the migrations themselves. */
async function askForForecasts(trx: Transaction<Database>): Promise<boolean> {
  const found = await sql<{ queue: string | null }>`
    select to_regclass('pgboss.job')::text as queue`.execute(trx);
  if (!found.rows[0]?.queue) return false;
  await transactionalJobs.enqueue(trx, "forecast-all", {});
  return true;
}

/**
 * Fills an empty, migrated database with the Quillmere Drainage Board, in one transaction, and
 * asks the worker to forecast. Where an organisation exists nothing is touched.
 */
export async function seedScenario(
  db: Kysely<Database>,
  options: SeedOptions,
): Promise<SeedOutcome> {
  const existing = await db.selectFrom("organisation").select("name").executeTakeFirst();
  if (existing) {
    return { seeded: false, reason: `${existing.name} is in this database already.` };
  }
  const scenario = buildScenario(options.seed, options.today);
  const hash = await hashPassword(options.password);
  return db.transaction().execute(async (trx) => {
    await insertPeople(trx, scenario, hash);
    await insertRegister(trx, scenario);
    await replaceRoads(trx, register.roadRecords(scenario), options.today);
    await insertStock(trx, scenario);
    const { readings, rounds } = await insertHistory(trx, scenario);
    return {
      seeded: true,
      assets: scenario.assets.length,
      packs: scenario.packs.length,
      readings,
      rounds,
      forecastsAsked: await askForForecasts(trx),
    };
  });
}

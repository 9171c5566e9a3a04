/**
 * A large invented fleet: packs of ten device models on the catalogue's cells, each read 20
 * times. The voltages lie roughly along the cells' curves with a seeded scatter; nothing but
 * the time a forecast takes hangs on them.
 */
import { randomUUID } from "node:crypto";
import type { Kysely } from "kysely";
import pg from "pg";
import type { Database } from "../../../db/client";
import { restingMv } from "../../../lib/battery";
import { MS_PER_DAY } from "../../../lib/units";
import { createRng, type Rng } from "../../simulate/prng";
import { copyIn } from "../copy-in";
import { type DeviceModel, drawModel, dutyOf } from "../forecast/devices";

export const READINGS_A_PACK = 20;
/** The day of the forecasts. */
export const NOW = new Date("2026-12-01T03:00:00Z");
const CHEMISTRIES = ["alkaline", "li-fes2", "li-socl2", "li-mno2", "lifepo4"] as const;
const MODELS = 10;
const SITES = 400;
/** Packs sent to the server at a time. */
const CHUNK = 2_000;
const READ_EVERY_DAYS = 18;

interface Placed {
  readonly id: string;
  readonly model: DeviceModel;
  readonly cellTypeId: string;
}

/** Fill a migrated, empty database. */
export async function fillFleet(db: Kysely<Database>, url: string, packs: number): Promise<void> {
  const rng = createRng("forecast-speed");
  await db
    .insertInto("organisation")
    .values({ name: "Many", timeZone: "Europe/London", currency: "GBP", locale: "en-GB" })
    .execute();
  const models = await insertModels(db, rng);
  const sites = await insertSites(db, rng);
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    for (let from = 0; from < packs; from += CHUNK) {
      await sendPacks(client, rng, { models, sites, from, to: Math.min(packs, from + CHUNK) });
    }
    await client.query("analyze");
  } finally {
    await client.end();
  }
}

async function insertModels(db: Kysely<Database>, rng: Rng): Promise<Placed[]> {
  const models: Placed[] = [];
  for (let n = 0; n < MODELS; n++) {
    const model = drawModel(CHEMISTRIES[n % CHEMISTRIES.length]!, `m${n}`, rng.fork(`model/${n}`));
    const placed = { id: randomUUID(), model, cellTypeId: randomUUID() };
    await insertModel(db, placed, n);
    models.push(placed);
  }
  return models;
}

async function insertModel(db: Kysely<Database>, { id, model, cellTypeId }: Placed, n: number) {
  const { rated, capacityTable, chemistry, nominalMv, ...cell } = model.cell;
  const whole = Math.round;
  await db
    .insertInto("cellType")
    .values({
      id: cellTypeId,
      designation: `${model.designation} ${n}`,
      name: "",
      chemistry,
      nominalMv: whole(nominalMv),
      ratedCapacityMah: whole(rated.capacityMah),
      ratedCurrentUa: whole(rated.currentUa),
      ratedCutoffMv: whole(rated.cutoffMv),
      selfDischargePpmPerYear: whole(cell.selfDischargePpmPerYear),
      resistanceMohm: whole(cell.resistanceMohm),
    })
    .execute();
  if (capacityTable.length > 0) {
    const points = capacityTable.map((point) => ({ cellTypeId, ...point }));
    await db.insertInto("capacityPoint").values(points).execute();
  }
  const { cutoffMv, series } = model;
  await db
    .insertInto("deviceModel")
    .values({ id, name: `Model ${n}`, cutoffMv, series, parallel: 1 })
    .execute();
  const states = dutyOf(model).map((state, position) => ({
    deviceModelId: id,
    position,
    name: state.name,
    currentUa: whole(state.currentUa),
    durationMs: Math.max(1, whole(state.durationMs)),
  }));
  await db.insertInto("dutyState").values(states).execute();
}

async function insertSites(db: Kysely<Database>, rng: Rng): Promise<string[]> {
  const sites = Array.from({ length: SITES }, (_, n) => ({
    id: randomUUID(),
    code: `S-${n}`,
    name: `Site ${n}`,
    latitude: rng.uniform(52, 53),
    longitude: rng.uniform(-0.5, 0.5),
  }));
  await db.insertInto("site").values(sites).execute();
  return sites.map((site) => site.id);
}

interface Chunk {
  readonly models: readonly Placed[];
  readonly sites: readonly string[];
  readonly from: number;
  readonly to: number;
}

async function sendPacks(client: pg.Client, rng: Rng, chunk: Chunk): Promise<void> {
  const assets: string[] = [];
  const packs: string[] = [];
  const readings: string[] = [];
  for (let n = chunk.from; n < chunk.to; n++) {
    const placed = rng.pick(chunk.models);
    const [assetId, packId] = [randomUUID(), randomUUID()];
    const days = READINGS_A_PACK * READ_EVERY_DAYS + rng.uniform(5, 60);
    const installed = new Date(NOW.getTime() - days * MS_PER_DAY).toISOString();
    assets.push(`${assetId}\tF-${n}\tAsset ${n}\t${rng.pick(chunk.sites)}\t${placed.id}\n`);
    packs.push(
      `${packId}\t${assetId}\t${placed.cellTypeId}\t${placed.model.series}\t1\t${installed}\n`,
    );
    for (const line of readingLines(packId, placed.model, days, rng)) readings.push(line);
  }
  await copyIn(
    client,
    "copy asset (id, tag, name, site_id, device_model_id) from stdin",
    assets.join(""),
  );
  await copyIn(
    client,
    "copy pack (id, asset_id, cell_type_id, series, parallel, installed_at) from stdin",
    packs.join(""),
  );
  await copyIn(
    client,
    "copy reading (id, pack_id, at, millivolts, kind, temperature_dc, source, received_at) from stdin",
    readings.join(""),
  );
}

function readingLines(packId: string, model: DeviceModel, days: number, rng: Rng): string[] {
  const life = (model.cell.rated.capacityMah * 1000) / model.averageUa / 24;
  const pace = rng.normal(1, 0.15);
  return Array.from({ length: READINGS_A_PACK }, (_, k) => {
    const age = days - (READINGS_A_PACK - k - 0.5) * READ_EVERY_DAYS;
    const at = new Date(NOW.getTime() - (days - age) * MS_PER_DAY).toISOString();
    const depth = Math.min(0.9, Math.max(0, (pace * age) / life));
    const mv = model.series * restingMv(model.cell, depth, 150) + rng.normal(0, 12);
    const loaded = rng.chance(0.3);
    const shown = Math.max(0, Math.round(loaded ? mv * 0.97 : mv));
    const kind = loaded ? "loaded" : "resting";
    return `${randomUUID()}\t${packId}\t${at}\t${shown}\t${kind}\t150\tapi\t${at}\n`;
  });
}

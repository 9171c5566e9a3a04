import { randomUUID } from "node:crypto";
import { type Kysely, sql } from "kysely";
import type { Database } from "@/db/client";
import type { Actor, Deps } from "@/lib/usecases/use-case";

const ASSETS = 1200;
const NOW = new Date("2026-12-01T09:00:00Z");

/** A fleet of 1,200 assets, each with a pack since three years ago. */
export async function benchRegister(db: Kysely<Database>): Promise<void> {
  await sql`insert into organisation (name, time_zone, currency, locale)
    values ('Bench', 'Europe/London', 'GBP', 'en-GB')`.execute(db);
  await sql`insert into cell_type (id, designation, name, chemistry, nominal_mv, rated_capacity_mah,
      rated_current_ua, rated_cutoff_mv, self_discharge_ppm_per_year, resistance_mohm)
    values (gen_random_uuid(), 'LR20', '', 'alkaline', 1500, 15000, 50000, 800, 20000, 120)`.execute(
    db,
  );
  await sql`insert into device_model (id, name, cutoff_mv, series, parallel)
    values (gen_random_uuid(), 'Bench gauge', 2200, 2, 1)`.execute(db);
  await sql`insert into site (id, code, name, latitude, longitude)
    values (gen_random_uuid(), 'B-1', 'Bench', 52, 0)`.execute(db);
  await sql`insert into asset (id, tag, name, site_id, device_model_id)
    select gen_random_uuid(), 'B-' || n, 'Gauge ' || n, site.id, device_model.id
    from site, device_model, generate_series(1, ${ASSETS}::int) n`.execute(db);
  await sql`insert into pack (id, asset_id, cell_type_id, series, parallel, installed_at)
    select gen_random_uuid(), asset.id, cell_type.id, 2, 1, '2023-12-01T09:00:00Z'
    from asset, cell_type`.execute(db);
}

export async function benchActor(db: Kysely<Database>): Promise<Actor> {
  const person = { id: randomUUID(), name: "Bench", email: "bench@example.test" };
  await db
    .insertInto("person")
    .values({ ...person, roles: ["dispatcher"] })
    .execute();
  const { id: personId, ...rest } = person;
  return { kind: "person", personId, ...rest, roles: ["dispatcher"], technicianId: null };
}

/** A fixed clock; jobs go nowhere, as they are not what is measured. */
export function benchDeps(db: Kysely<Database>): Deps {
  return {
    db,
    now: () => NOW,
    newId: randomUUID,
    appUrl: "http://localhost",
    jobs: { enqueue: async () => undefined },
    mailer: { send: async () => ({ ok: false, error: "no mail in a bench", retry: false }) },
  } as unknown as Deps;
}

/** Voltages that fall from 3.2 to 2.4 V over three years, all at different moments. */
export function readingsFile(rows: number): string {
  const lines = ["tag;read_at;voltage_v;kind;load_ma;temperature_c"];
  const perAsset = Math.ceil(rows / ASSETS);
  for (let n = 0; n < rows; n += 1) {
    const turn = Math.floor(n / ASSETS);
    const at = new Date(Date.UTC(2023, 11, 2) + (turn / perAsset) * 1090 * 86_400_000 + n * 1000);
    const volts = (3.2 - (0.8 * turn) / perAsset).toFixed(3).replace(".", ",");
    const local = at.toISOString().slice(0, 19).replace("T", " ");
    const loaded = n % 3 === 0;
    lines.push(
      `B-${(n % ASSETS) + 1};${local};${volts};${loaded ? "loaded" : "resting"};${loaded ? "80" : ""};${n % 25},5`,
    );
  }
  return `${lines.join("\r\n")}\r\n`;
}

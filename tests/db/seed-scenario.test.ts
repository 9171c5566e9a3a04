/**
 * The demonstration, seeded into a fresh database. Checked against what the product's description
 * promises of it (five technicians, about 1,200 assets at about 700 sites, three years, a bad
 * lot, a working day for the demonstration's technician) and against the rules of the data, as
 * plain SQL that shares nothing with the seeder.
 */
import { sql } from "kysely";
import { beforeAll, describe, expect, it } from "vitest";
import { readFieldDay } from "@/lib/usecases/read-field-day";
import { refreshForecasts } from "@/lib/usecases/refresh-forecasts";
import { signInWithPassword } from "@/lib/usecases/sign-in-with-password";
import type { PersonActor, Role } from "@/lib/usecases/use-case";
import accounts from "../../scripts/seed/demo-accounts.json";
import { seedScenario } from "../../scripts/seed/seed-scenario";
import { testDatabase } from "../support/database";
import { actorWith, systemActor, testDeps } from "../support/deps";

const { db } = await testDatabase();
/** A Tuesday at nine in the organisation's zone. */
const NOW = new Date("2026-12-01T09:00:00Z");
const TODAY = "2026-12-01";
const deps = testDeps(db, NOW);
const options = { today: NOW, seed: 1, password: accounts[0]?.password ?? "" };
let outcome: Awaited<ReturnType<typeof seedScenario>>;

beforeAll(async () => {
  outcome = await seedScenario(db, options);
}, 120_000);

async function numberOf(query: ReturnType<typeof sql<{ n: number }>>): Promise<number> {
  const { rows } = await query.execute(db);
  return rows[0]?.n ?? Number.NaN;
}

const count = (from: string) =>
  numberOf(sql<{ n: number }>`select count(*)::int as n from ${sql.raw(from)}`);

describe("the demonstration", () => {
  it("is as large as it is said to be", async () => {
    expect(outcome.seeded).toBe(true);
    const [assets, sites] = [await count("asset"), await count("site")];
    expect(assets).toBeGreaterThanOrEqual(1100);
    expect(assets).toBeLessThanOrEqual(1300);
    expect(sites).toBeGreaterThanOrEqual(600);
    expect(sites).toBeLessThanOrEqual(800);
    expect(await count("technician")).toBe(5);
    expect(await count("depot")).toBe(2);
    const years = await numberOf(
      sql<{
        n: number;
      }>`select (extract(days from max(at) - min(at)) / 365.25)::float8 as n from reading`,
    );
    expect(years).toBeGreaterThan(2.7);
    expect(years).toBeLessThan(3.3);
  });

  it("is seeded once: a second time touches nothing", async () => {
    const before = await count("pack");
    expect(await seedScenario(db, options)).toMatchObject({ seeded: false });
    expect(await count("pack")).toBe(before);
  });

  it("asks the worker to forecast", async () => {
    expect(outcome).toMatchObject({ forecastsAsked: true });
    expect(await count("pgboss.job where name = 'forecast-all'")).toBe(1);
  });
});

describe("its packs and voltages", () => {
  it("never has two packs in one asset at a time", async () => {
    const twice = count(`(select asset_id from pack where removed_at is null
      group by asset_id having count(*) > 1) x`);
    expect(await twice).toBe(0);
    const overlapping = count(`pack a join pack b on a.asset_id = b.asset_id and a.id < b.id
      and tstzrange(a.installed_at, a.removed_at) && tstzrange(b.installed_at, b.removed_at)`);
    expect(await overlapping).toBe(0);
  });

  it("has a pack in nearly every asset in service", async () => {
    const bare = await count(`asset a where state = 'in_service' and not exists
      (select from pack where asset_id = a.id and removed_at is null)`);
    expect(bare).toBeLessThan(0.02 * (await count("asset where state = 'in_service'")));
  });

  it("read each pack while it was in, and nothing happens after now", async () => {
    const outside = count(`reading r join pack p on p.id = r.pack_id
      where r.at < p.installed_at or r.at > coalesce(p.removed_at, 'infinity')`);
    expect(await outside).toBe(0);
    const now = NOW.toISOString();
    expect(await count(`reading where at > '${now}'`)).toBe(0);
    expect(await count(`pack where installed_at > '${now}' or removed_at > '${now}'`)).toBe(0);
  });

  it("takes every pack's cells from a lot of its own type that was there", async () => {
    const wrong = count(`pack p join lot l on l.id = p.lot_id
      where l.cell_type_id <> p.cell_type_id or p.installed_at < l.received_on`);
    expect(await wrong).toBe(0);
  });

  it("keeps a book of moves that adds up to what lies in each place", async () => {
    const astray = count(`(
      select lot_id, place_id, sum(cells) as cells from (
        select lot_id, to_place_id as place_id, cells from stock_move where to_place_id is not null
        union all
        select lot_id, from_place_id, -cells from stock_move where from_place_id is not null) m
      group by lot_id, place_id) book
      full join lot_stock s using (lot_id, place_id)
      where coalesce(book.cells, 0) <> coalesce(s.cells, 0)`);
    expect(await astray).toBe(0);
  });
});

describe("its rounds", () => {
  it("gives no technician two rounds a day, and none on a day away", async () => {
    const twice = count(`(select technician_id, day from round where state <> 'cancelled'
      group by technician_id, day having count(*) > 1) x`);
    expect(await twice).toBe(0);
    const away = count(`round r join absence a on a.technician_id = r.technician_id
      and r.day between a.first_day and a.last_day`);
    expect(await away).toBe(0);
  });

  it("puts stops into the round's time, one after another", async () => {
    const astray = count(`stop s join round r on r.id = s.round_id
      where s.arrives_at < r.starts_at or s.departs_at > r.ends_at or s.departs_at < s.arrives_at`);
    expect(await astray).toBe(0);
    const crossed = count(`stop a join stop b on a.round_id = b.round_id
      and a.position < b.position and a.departs_at > b.arrives_at`);
    expect(await crossed).toBe(0);
  });

  it("gives the demonstration's technician one round today, with stops and what to load", async () => {
    const rounds = await db
      .selectFrom("round")
      .innerJoin("technician", "technician.id", "round.technicianId")
      .innerJoin("person", "person.id", "technician.personId")
      .select(["round.id", "round.state", "person.id as personId", "technician.id as technicianId"])
      .where("person.email", "=", emailOf("technician"))
      .where("round.day", "=", TODAY)
      .execute();
    expect(rounds.map((round) => round.state)).toEqual(["published"]);
    const { personId = "", technicianId = "" } = rounds[0] ?? {};
    const actor: PersonActor = actorWith(["technician"], { personId, technicianId });
    const pack = await readFieldDay(deps, actor, {});
    const today = pack.rounds.find((round) => round.day === TODAY);
    expect(today?.stops.length ?? 0).toBeGreaterThan(2);
  });
});

function emailOf(role: Role): string {
  return accounts.find((account) => account.role === role)?.email ?? "";
}

describe("its accounts", () => {
  it.each(accounts)("signs $email in as $role", async ({ email, password, role }) => {
    const visitor = { kind: "visitor" as const, origin: "test" };
    const { id } = await signInWithPassword(deps, visitor, { email, password });
    const person = await db
      .selectFrom("person")
      .select("roles")
      .where("id", "=", id)
      .executeTakeFirstOrThrow();
    expect(person.roles).toContain(role);
  });
});

describe("its forecasts", () => {
  it("can be made for every installed pack, each with an ordered window", async () => {
    const { refreshed } = await refreshForecasts(deps, systemActor, { packIds: null });
    const installed = await count("pack where removed_at is null");
    expect(refreshed).toBe(installed);
    const without = count(`pack p where removed_at is null and not exists
      (select from forecast where pack_id = p.id)`);
    expect(await without).toBe(0);
    expect(await count("forecast where not (p05 <= p50 and p50 <= p95)")).toBe(0);
    expect(await count("forecast where share_left_permille not between 0 and 1000")).toBe(0);
  }, 180_000);
});

import { randomUUID } from "node:crypto";
import { CamelCasePlugin, type CompiledQuery, Kysely, PostgresDialect } from "kysely";
import pg from "pg";
import { connect, type Database } from "@/db/client";
import { type horizonInput, readHorizon } from "@/lib/usecases/read-horizon";
import type { Actor, Deps } from "@/lib/usecases/use-case";
import type { z } from "zod";
import accounts from "../seed/demo-accounts.json";
import { median, timed } from "./timing";

const TURNS = 15;

const EVERYTHING: z.input<typeof horizonInput> = {
  within: "all",
  crew: null,
  chemistry: null,
  notBooked: false,
  search: "",
  order: "waiting",
  descending: true,
  page: 1,
  pageSize: 100,
};

export interface HorizonBench {
  readonly packs: number;
  /** Medians, ms. Bare: the same SQL, sent by `pg` alone. */
  readonly bareSqlMs: number;
  readonly useCaseMs: number;
  /** The whole page as the running product answers it; null where none runs. */
  readonly pageMs: number | null;
  /** pageMs / bareSqlMs, or useCaseMs / bareSqlMs where no product runs. */
  readonly ratio: number;
}

/** The Horizon's first 100 rows beside the bare SQL that fetches its data, by turns. */
export async function benchHorizon(databaseUrl: string, address: string | null) {
  const db = connect(databaseUrl, { max: 8 });
  const pool = new pg.Pool({ connectionString: databaseUrl, max: 8 });
  try {
    const statements = await captureSql(databaseUrl);
    const view = await readHorizon(depsOn(db), ACTOR, EVERYTHING);
    const cookie = address ? await signIn(address) : null;
    const times = { bare: [] as number[], useCase: [] as number[], page: [] as number[] };
    for (let turn = 0; turn < TURNS; turn += 1) {
      times.bare.push(await timed(() => runBare(pool, statements)));
      times.useCase.push(await timed(() => readHorizon(depsOn(db), ACTOR, EVERYTHING)));
      if (address && cookie) times.page.push(await timed(() => fetchPage(address, cookie)));
    }
    const [bareSqlMs, useCaseMs] = [median(times.bare), median(times.useCase)];
    const pageMs = times.page.length > 0 ? median(times.page) : null;
    const packs = view.rows[0]?.total ?? 0;
    return { packs, bareSqlMs, useCaseMs, pageMs, ratio: (pageMs ?? useCaseMs) / bareSqlMs };
  } finally {
    await pool.end();
    await db.destroy();
  }
}

const ACTOR: Actor = {
  kind: "person",
  personId: randomUUID(),
  name: "Bench",
  email: "bench@example.org",
  roles: ["dispatcher"],
  technicianId: null,
};

/** Reading asks for nothing but the database and the clock. */
function depsOn(db: Kysely<Database>): Deps {
  const none = () => {
    throw new Error("reading the Horizon does not do this");
  };
  return {
    db,
    now: () => new Date(),
    newId: randomUUID,
    jobs: { enqueue: none },
    mailer: { send: none },
    appUrl: "",
    travel: { table: none } as never,
  };
}

/** The statements that one reading of the Horizon sends, in order. */
async function captureSql(databaseUrl: string): Promise<CompiledQuery[]> {
  const statements: CompiledQuery[] = [];
  const db = new Kysely<Database>({
    dialect: new PostgresDialect({ pool: new pg.Pool({ connectionString: databaseUrl }) }),
    plugins: [new CamelCasePlugin({ maintainNestedObjectKeys: true })],
    log: (event) => {
      if (event.level === "query") statements.push(event.query);
    },
  });
  await readHorizon(depsOn(db), ACTOR, EVERYTHING);
  await db.destroy();
  return statements;
}

/** As the use case does it: the organisation first, then everything side by side. */
async function runBare(pool: pg.Pool, [first, ...others]: readonly CompiledQuery[]) {
  const send = (q: CompiledQuery) => pool.query(q.sql, [...q.parameters]);
  if (first) await send(first);
  await Promise.all(others.map(send));
}

/** A demonstration session, as a browser gets it. */
async function signIn(address: string): Promise<string> {
  const dispatcher = accounts.find((account) => account.role === "dispatcher");
  const csrf = await fetch(`${address}/api/auth/csrf`);
  const { csrfToken } = (await csrf.json()) as { csrfToken: string };
  const answer = await fetch(`${address}/api/auth/callback/password`, {
    method: "POST",
    redirect: "manual",
    headers: { cookie: cookiesOf(csrf) },
    body: new URLSearchParams({
      csrfToken,
      email: dispatcher?.email ?? "",
      password: dispatcher?.password ?? "",
    }),
  });
  return `${cookiesOf(csrf)}; ${cookiesOf(answer)}`;
}

function cookiesOf(response: Response): string {
  return response.headers
    .getSetCookie()
    .map((cookie) => cookie.split(";")[0])
    .join("; ");
}

async function fetchPage(address: string, cookie: string): Promise<void> {
  const response = await fetch(`${address}/horizon?within=all`, { headers: { cookie } });
  const html = await response.text();
  if (!html.includes("Packs in service by when")) throw new Error("the Horizon did not answer");
}

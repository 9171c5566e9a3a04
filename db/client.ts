import { CamelCasePlugin, Kysely, PostgresDialect } from "kysely";
import pg from "pg";
import type { DB } from "./tables/generated";

export type Database = DB;

const { Pool, types } = pg;

/**
 * `date` stays the text YYYY-MM-DD: a calendar day has no instant. `int8` becomes a number,
 * refused where a double cannot hold it exactly. `time` is text HH:MM:SS already.
 */
const parsers = new Map<number, (text: string) => unknown>([
  [types.builtins.DATE, (text) => text],
  [types.builtins.INT8, exactInteger],
  [1182, (text) => (text === "{}" ? [] : text.slice(1, -1).split(","))],
]);

function exactInteger(text: string): number {
  const value = Number(text);
  if (!Number.isSafeInteger(value)) throw new RangeError(`${text} is too large for a number`);
  return value;
}

export interface ConnectOptions {
  /** Connections of this process at the most. */
  readonly max?: number;
  readonly applicationName?: string;
}

/** Opens a pool on a PostgreSQL address. The caller destroys it. */
export function connect(databaseUrl: string, options: ConnectOptions = {}): Kysely<Database> {
  const pool = new Pool({
    connectionString: databaseUrl,
    max: options.max ?? 10,
    application_name: options.applicationName ?? "wanewright",
    types: {
      getTypeParser: (oid: number, format?: string) =>
        parsers.get(oid) ?? types.getTypeParser(oid, format === "binary" ? "binary" : "text"),
    } as never,
  });
  // An idle connection that the server drops must not end the process; the next query reconnects.
  pool.on("error", () => undefined);
  return new Kysely<Database>({
    dialect: new PostgresDialect({ pool }),
    // Rows come as camelCase; what lies inside jsonb keeps its own keys.
    plugins: [new CamelCasePlugin({ maintainNestedObjectKeys: true })],
  });
}

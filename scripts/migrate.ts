import { sql } from "kysely";
import { connect } from "@/db/client";
import { migrateToLatest } from "@/db/migrate";
import { prepareQueues } from "./queue-schema";

/** What a failure to reach the server means, by its code (PostgreSQL manual, appendix A). */
const MENDS: Record<string, string> = {
  ECONNREFUSED: "Nothing listens there. Start the server, or correct DATABASE_URL.",
  ENOTFOUND: "The host name is unknown. Correct DATABASE_URL.",
  ETIMEDOUT: "The host does not answer. Check the network and the firewall.",
  "28P01": "The password is wrong. Correct DATABASE_URL.",
  "28000": "The server does not let this user in. Check DATABASE_URL and pg_hba.conf.",
  "3D000": "That database does not exist. Create it (createdb), or correct DATABASE_URL.",
  "42501": "The user may not create tables. Make it the owner of the database.",
  "53100": "The database server's disk is full. Free some space there.",
  "53300": "The server has no connection left. Stop other programs or raise max_connections.",
};

interface Outcome {
  readonly ran: readonly string[];
  /** No organisation yet. */
  readonly empty: boolean;
  readonly demonstration: boolean;
}

/** Brings the schema and the job queues up to date. */
async function migrate(databaseUrl: string): Promise<Outcome> {
  const db = connect(databaseUrl, { max: 1, applicationName: "wanewright-migrate" });
  try {
    await sql`select 1`.execute(db);
    const ran = await migrateToLatest(db);
    await prepareQueues(databaseUrl);
    const found = await sql<{
      isDemonstration: boolean;
    }>`select is_demonstration from organisation`.execute(db);
    const organisation = found.rows[0];
    const demonstration = organisation?.isDemonstration ?? false;
    return { ran, empty: organisation === undefined, demonstration };
  } finally {
    await db.destroy();
  }
}

function inWords(error: unknown): { what: string; mend: string } {
  const { code, message } = error as { code?: string; message?: string };
  const mend = MENDS[code ?? ""] ?? "Run `npm run doctor` to see what is wrong.";
  return { what: `The database could not be brought up to date: ${message || code}.`, mend };
}

const asJson = process.argv.includes("--json");
const databaseUrl = process.env.DATABASE_URL;
try {
  if (!databaseUrl) throw new Error("DATABASE_URL is not set");
  const outcome = await migrate(databaseUrl);
  if (asJson) console.log(JSON.stringify(outcome));
  else console.log(outcome.ran.length ? `Ran ${outcome.ran.join(", ")}.` : "Already up to date.");
} catch (error) {
  const told = inWords(error);
  if (asJson) console.log(JSON.stringify(told));
  else console.error(`${told.what}\n${told.mend}`);
  process.exitCode = 1;
}

import { existsSync, readdirSync } from "node:fs";
import { join } from "node:path";
import { run } from "./command.mjs";
import { installPostgres } from "./packages.mjs";
import { Trouble } from "./trouble.mjs";

const DEBIAN = "/usr/lib/postgresql";
const OLDEST = 14;

/**
 * Every installed PostgreSQL server, newest first.
 * @returns {Promise<{ bin: string, major: number }[]>}
 */
export async function installedServers() {
  const found = [];
  if (existsSync(DEBIAN)) {
    for (const version of readdirSync(DEBIAN)) {
      const bin = join(DEBIAN, version, "bin");
      if (existsSync(join(bin, "initdb"))) found.push({ bin, major: Number(version) });
    }
  }
  const elsewhere = await run("pg_config", ["--bindir"]);
  const bin = elsewhere.output.trim();
  if (elsewhere.code === 0 && existsSync(join(bin, "initdb"))) {
    const version = await run(join(bin, "postgres"), ["--version"]);
    const major = Number(/ (\d+)/.exec(version.output)?.[1]);
    if (!found.some((server) => server.bin === bin)) found.push({ bin, major });
  }
  return found
    .filter((server) => server.major >= OLDEST)
    .sort((left, right) => right.major - left.major);
}

/**
 * The folder of the server's programs, installing them where there are none.
 * @param {object} [options]
 * @param {number} [options.major] the version that made an existing database folder
 * @param {(line: string) => void} [options.say]
 * @returns {Promise<{ bin: string, major: number }>}
 */
export async function findOrInstallServer({ major, say = () => {} } = {}) {
  let servers = await installedServers();
  if (servers.length === 0) {
    say("installing PostgreSQL from Debian's packages");
    await installPostgres();
    servers = await installedServers();
  }
  const [newest] = servers;
  if (newest === undefined) {
    throw new Trouble(
      `No PostgreSQL server of version ${OLDEST} or newer was found.`,
      "Install it (Debian: sudo apt-get install postgresql), or set DATABASE_URL to a server.",
    );
  }
  if (major === undefined) return newest;
  const fitting = servers.find((server) => server.major === major);
  if (fitting) return fitting;
  throw new Trouble(
    `The database folder was made by PostgreSQL ${major}; installed is ${newest.major}.`,
    `Install postgresql-${major}, or move the data over with pg_dump and pg_restore.`,
  );
}

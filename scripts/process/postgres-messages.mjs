import { readFileSync } from "node:fs";
import { tail } from "./command.mjs";
import { Trouble } from "./trouble.mjs";

/** What PostgreSQL says, what it means, what to do. `HOME` stands for the server's folder. */
const KNOWN = [
  {
    said: /No space left on device|Disk quota exceeded/,
    what: "The disk is full, so the database cannot start.",
    mend: "Free some space (`df -h HOME`), then start again; nothing is lost.",
  },
  {
    said: /Permission denied|has invalid permissions|has wrong ownership/,
    what: "The database folder HOME does not belong to the user that PostgreSQL runs as.",
    mend: "Give it back: as root `chown -R postgres HOME`, else `chown -R $USER HOME`; chmod 700.",
  },
  {
    said: /could not create shared memory|could not map anonymous shared memory|Cannot allocate/,
    what: "There is not enough memory to start the database.",
    mend: "Stop other programs (`free -m` shows the memory), then start again.",
  },
  {
    said: /could not locate a valid checkpoint|invalid checkpoint|incorrect checksum in control/,
    what: "The database folder HOME is broken: its write-ahead log cannot be read.",
    mend: "Restore it from a backup. If nothing in it matters, remove it; a new one is made.",
  },
  {
    said: /could not (open|read|access) |required WAL directory|is not a database cluster/,
    what: "The database folder HOME is broken: files in it are missing or cut short.",
    mend: "Restore it from a backup. If nothing in it matters, remove it; a new one is made.",
  },
  {
    said: /invalid line|syntax error in file|unrecognized configuration parameter/,
    what: "The settings in HOME/cluster/postgresql.conf cannot be read.",
    mend: "Mend the line named in HOME/server.log, then start again.",
  },
];

/**
 * Puts a failed start of the server into words.
 * @param {string} output what the server and its programs printed
 * @param {string} home
 */
export function explainLog(output, home) {
  const known = KNOWN.find(({ said }) => said.test(output));
  const fill = (/** @type {string} */ text) => text.replaceAll("HOME", home);
  if (known) return new Trouble(`${fill(known.what)}\n${tail(output, 4)}`, fill(known.mend));
  return new Trouble(
    `PostgreSQL did not start. Its last lines:\n${tail(output, 8)}`,
    `Its whole log is ${home}/server.log. Or set DATABASE_URL to a server that works.`,
  );
}

/**
 * @param {string} file
 * @returns {string} its last lines; empty where it cannot be read
 */
export function lastLines(file) {
  try {
    return readFileSync(file, "utf8").split("\n").slice(-25).join("\n");
  } catch {
    return "";
  }
}

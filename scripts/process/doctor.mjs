import { accessSync, constants, existsSync } from "node:fs";
import { dirname, join } from "node:path";
import { describeAddress, ownDatabaseUrl } from "./application-database.mjs";
import { isBuilt } from "./build.mjs";
import { findChromium } from "./chromium.mjs";
import { assertNode, packagesLack } from "./dependencies.mjs";
import { freeBytes, homeOf, ROOT, secretsOf } from "./place.mjs";
import { isFree, portFrom } from "./ports.mjs";
import { installedServers } from "./postgres-binaries.mjs";
import { runningStart } from "./run-record.mjs";
import { missingMigrations } from "./schema.mjs";
import { Trouble, inWords } from "./trouble.mjs";

/** Room for the packages, a build and a database of some years. */
const COMFORTABLE_BYTES = 3 * 1024 ** 3;

/** Something that is not needed for a start, or that a start mends by itself. */
class Note extends Trouble {}

/** @type {Record<string, () => string | Promise<string>>} */
const EXAMINATIONS = {
  Node: () => {
    assertNode();
    return process.versions.node;
  },
  Packages: () => {
    const lack = packagesLack(ROOT);
    if (lack === undefined) return "as in the lockfile";
    throw new Note(`${lack}.`, "`npm start` installs them, or: npm ci");
  },
  PostgreSQL: async () => {
    if (process.env.DATABASE_URL) return "not needed here: DATABASE_URL is given";
    const [newest] = await installedServers();
    if (newest) return `version ${newest.major} in ${newest.bin}`;
    throw new Trouble(
      "no server is installed.",
      "As root `npm start` installs it; otherwise: sudo apt-get install postgresql",
    );
  },
  "Data folder": () => {
    const home = homeOf();
    let nearest = home;
    while (!existsSync(nearest)) nearest = dirname(nearest);
    accessSync(nearest, constants.W_OK);
    return `${home}${nearest === home ? "" : " (made by the first start)"}`;
  },
  Secrets: () => {
    if (!existsSync(join(homeOf(), "secrets.json"))) return "made by the first start";
    secretsOf(homeOf());
    return "readable";
  },
  "Disk space": () => {
    const free = freeBytes(ROOT);
    const told = `${(free / 1024 ** 3).toFixed(1)} GiB free`;
    if (free >= COMFORTABLE_BYTES) return told;
    throw new Trouble(`only ${told}.`, "Free some: a first start needs about 3 GiB.");
  },
  Database: examineDatabase,
  Port: async () => {
    const running = runningStart(homeOf());
    if (running) return `in use by Wanewright itself, ${running.address ?? "coming up"}`;
    const port = portFrom("PORT") ?? 3000;
    if (await isFree(port)) return `${port} is free`;
    throw new Note(
      `${port} is taken.`,
      `\`npm start\` takes the next one, unless PORT asks for ${port}. Who has it: ss -ltnp`,
    );
  },
  Pages: () => {
    if (isBuilt(ROOT, ".next")) return "built from these sources";
    throw new Note("not built from these sources yet.", "`npm start` builds them.");
  },
  Settings: examineSettings,
  Photos: examineStorage,
  Chromium: () => {
    const found = findChromium();
    if (found) return found;
    throw new Note("not installed.", "Only `npm test` needs it: sudo apt-get install chromium");
  },
};

async function examineDatabase() {
  const address = process.env.DATABASE_URL || ownDatabaseUrl(homeOf());
  if (address === undefined) return "not running; `npm start` starts it";
  const told = describeAddress(address);
  if (packagesLack(ROOT) === "missing") throw new Note("not asked.", "Install the packages first.");
  const missing = await missingMigrations(ROOT, { ...process.env, DATABASE_URL: address });
  if (missing.length === 0) return `${told}, schema up to date`;
  throw new Note(
    `${told} lacks ${missing.length} migrations.`,
    "`npm start` runs them, or with DATABASE_URL set: npm run migrate",
  );
}

function examineSettings() {
  const { AUTH_SECRET, APP_URL, RESEND_API_KEY, MAIL_FROM } = process.env;
  if (AUTH_SECRET !== undefined && AUTH_SECRET.length < 32) {
    throw new Trouble("AUTH_SECRET is shorter than 32 characters.", "openssl rand -base64 36");
  }
  if (APP_URL !== undefined && !/^https?:\/\/[^/\s]+/.test(APP_URL)) {
    throw new Trouble(`APP_URL is "${APP_URL}".`, "Write it as https://wanewright.example.org");
  }
  if (RESEND_API_KEY && !MAIL_FROM) {
    throw new Trouble(
      "RESEND_API_KEY is given without MAIL_FROM.",
      'Set MAIL_FROM to an address that the provider has verified: "Name <mail@example.org>"',
    );
  }
  return RESEND_API_KEY ? "mails go out through the provider" : "mails stay on the mail page";
}

function examineStorage() {
  const { S3_BUCKET, S3_ENDPOINT, S3_ACCESS_KEY_ID, S3_SECRET_ACCESS_KEY } = process.env;
  if (!S3_BUCKET) return "kept in the data folder by a stand-in";
  if (S3_ENDPOINT && !/^https?:\/\/[^/\s]+/.test(S3_ENDPOINT)) {
    throw new Trouble(`S3_ENDPOINT is "${S3_ENDPOINT}".`, "Write it as https://s3.example.org");
  }
  if (!S3_ACCESS_KEY_ID !== !S3_SECRET_ACCESS_KEY) {
    throw new Trouble(
      "Of S3_ACCESS_KEY_ID and S3_SECRET_ACCESS_KEY only one is given.",
      "Give both, or neither where the machine itself may use the bucket.",
    );
  }
  return `bucket ${S3_BUCKET}${S3_ENDPOINT ? ` at ${S3_ENDPOINT}` : ""}`;
}

/**
 * @param {(line: string) => void} print
 * @returns {Promise<number>} the exit code: 1 when a start would fail
 */
export async function examine(print) {
  let serious = 0;
  for (const [name, look] of Object.entries(EXAMINATIONS)) {
    try {
      print(`  ok    ${name.padEnd(12)} ${await look()}`);
    } catch (error) {
      const told = inWords(error, `looking at the ${name.toLowerCase()}`);
      if (!(told instanceof Trouble)) throw error;
      if (!(told instanceof Note)) serious += 1;
      print(`  ${told instanceof Note ? "note" : "MEND"}  ${name.padEnd(12)} ${told.message}`);
      print(`                     ${told.mend}`);
    }
  }
  print(serious ? `\n${serious} to mend before \`npm start\`.` : "\n`npm start` should work.");
  return serious ? 1 : 0;
}

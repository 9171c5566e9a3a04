import { createHash, randomBytes } from "node:crypto";
import {
  mkdirSync,
  readFileSync,
  realpathSync,
  renameSync,
  statfsSync,
  writeFileSync,
} from "node:fs";
import { homedir } from "node:os";
import { basename, join } from "node:path";
import { fileURLToPath } from "node:url";
import { newPassword } from "./postgres.mjs";
import { Trouble } from "./trouble.mjs";

/** The checkout. */
export const ROOT = realpathSync(fileURLToPath(new URL("../../", import.meta.url)));

/** Below this a start could fail half-way: a build and a database need room. */
const ROOM_BYTES = 500 * 1024 * 1024;

/**
 * Where this checkout keeps what must outlive it: the database, the secrets, the logs.
 * As root outside the checkout, since PostgreSQL runs as another user who may not be able
 * to enter it; otherwise in the user's own data folder. WANEWRIGHT_DATA overrides both.
 * @param {NodeJS.ProcessEnv} [env]
 * @param {string} [root]
 */
export function homeOf(env = process.env, root = ROOT) {
  if (env.WANEWRIGHT_DATA) return env.WANEWRIGHT_DATA;
  const hash = createHash("sha256").update(root).digest("hex").slice(0, 10);
  const name = `${basename(root) || "checkout"}-${hash}`;
  if (process.getuid?.() === 0) return join("/var/lib/wanewright", name);
  return join(env.XDG_DATA_HOME || join(homedir(), ".local/share"), "wanewright", name);
}

/**
 * Makes the folder. Others may pass through it (the user `postgres` must), not look into it.
 * @param {string} home
 */
export function makeHome(home) {
  mkdirSync(join(home, "logs"), { recursive: true, mode: 0o711 });
  for (const folder of [home, ROOT]) {
    const free = freeBytes(folder);
    if (free >= ROOM_BYTES) continue;
    throw new Trouble(
      `The disk is nearly full: ${Math.round(free / 2 ** 20)} MiB free at ${folder}.`,
      `Free at least ${ROOM_BYTES / 2 ** 20} MiB (\`df -h ${folder}\`), then start again.`,
    );
  }
}

/** @param {string} folder */
export function freeBytes(folder) {
  const { bavail, bsize } = statfsSync(folder);
  return bavail * bsize;
}

/**
 * The secrets of this installation, made on first use and kept beside the database, readable
 * by their owner only.
 * @param {string} home
 * @returns {{ authSecret: string, databasePassword: string }}
 */
export function secretsOf(home) {
  const file = join(home, "secrets.json");
  try {
    const kept = JSON.parse(readFileSync(file, "utf8"));
    if (kept.authSecret && kept.databasePassword) return kept;
  } catch (error) {
    if (/** @type {NodeJS.ErrnoException} */ (error).code === "ENOENT") return makeSecrets(file);
    if (!(error instanceof SyntaxError)) throw error;
  }
  throw new Trouble(
    `${file} is broken: the database password cannot be read from it.`,
    "Restore it from a backup. If the data does not matter, remove the folder it lies in.",
  );
}

/** @param {string} file */
function makeSecrets(file) {
  const secrets = {
    authSecret: randomBytes(36).toString("base64url"),
    databasePassword: newPassword(),
  };
  writeWhole(file, `${JSON.stringify(secrets, null, 2)}\n`, 0o600);
  return secrets;
}

/**
 * Writes a file so that a crash leaves either the old or the new one.
 * @param {string} file
 * @param {string} text
 * @param {number} [mode]
 */
export function writeWhole(file, text, mode = 0o644) {
  const unfinished = `${file}.${process.pid}`;
  writeFileSync(unfinished, text, { mode });
  renameSync(unfinished, file);
}

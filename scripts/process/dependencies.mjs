import { accessSync, constants, existsSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { run, tail } from "./command.mjs";
import { Trouble } from "./trouble.mjs";

/**
 * What stands between this machine and the packages of the lockfile; undefined when nothing.
 * Compared by content: npm notes what it installed, and a checkout changes file times.
 * @param {string} root
 * @returns {"missing" | "outdated" | undefined}
 */
export function packagesLack(root) {
  const installed = packagesOf(join(root, "node_modules/.package-lock.json"));
  if (installed === undefined) return "missing";
  const wanted = packagesOf(join(root, "package-lock.json")) ?? {};
  for (const [path, { version, optional, devOptional, link }] of Object.entries(wanted)) {
    if (path === "" || link) continue;
    const there = installed[path];
    // Optional packages are for other systems as often as not.
    if (there === undefined && (optional || devOptional)) continue;
    if (there?.version !== version) return "outdated";
  }
  return undefined;
}

/**
 * @typedef {object} Locked
 * @property {string} [version]
 * @property {boolean} [optional]
 * @property {boolean} [devOptional]
 * @property {boolean} [link]
 */
/**
 * @param {string} lockfile
 * @returns {Record<string, Locked> | undefined}
 */
function packagesOf(lockfile) {
  if (!existsSync(lockfile)) return undefined;
  return JSON.parse(readFileSync(lockfile, "utf8")).packages ?? {};
}

/**
 * Installs the packages when they are missing or the lockfile has changed since.
 * @param {string} root
 * @returns {Promise<string>} what was done, for the step's line
 */
export async function ensurePackages(root) {
  assertNode();
  if (packagesLack(root) === undefined) return "up to date";
  assertWritable(root);
  const args = ["ci", "--include=dev", "--no-audit", "--no-fund", "--loglevel=error"];
  const done = await run("npm", args, { cwd: root });
  if (done.code !== 0) {
    throw new Trouble(
      `Installing the packages failed:\n${tail(done.output, 8)}`,
      mend(done.output),
    );
  }
  return "installed";
}

/** @throws Trouble when this Node is not one that the packages run on */
export function assertNode(version = process.versions.node) {
  const [major = 0, minor = 0] = version.split(".").map(Number);
  if ((major === 20 && minor >= 11) || major === 21 || major === 22) return;
  throw new Trouble(
    `Node ${version} is not supported.`,
    "Install Node 20.11 or newer, up to 22 (https://nodejs.org/en/download).",
  );
}

/** @param {string} root */
function assertWritable(root) {
  try {
    accessSync(root, constants.W_OK);
    const modules = join(root, "node_modules");
    if (existsSync(modules)) accessSync(modules, constants.W_OK);
  } catch {
    throw new Trouble(
      `This user may not write to ${root}, where the packages go.`,
      `Give it to the user (sudo chown -R $USER ${root}), or work in a copy of your own.`,
    );
  }
}

/** @param {string} output of npm */
function mend(output) {
  if (/ENOSPC/.test(output)) return "The disk is full: free some space, then run it again.";
  if (/EACCES|EPERM/.test(output)) return "Make the folder writable for this user, then try again.";
  if (/ENOTFOUND|EAI_AGAIN|ECONNREFUSED|ETIMEDOUT|network/i.test(output)) {
    return "Check the network connection (a proxy needs HTTPS_PROXY), then run it again.";
  }
  return "Run `npm ci` by hand to see the whole message.";
}

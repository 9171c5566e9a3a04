import { createHash } from "node:crypto";
import { accessSync, constants, existsSync, readFileSync, statSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { run, tail } from "./command.mjs";
import { Trouble } from "./trouble.mjs";

/**
 * What stands between this machine and the packages of the lockfile; undefined when nothing.
 * @param {string} root
 * @returns {"missing" | "outdated" | undefined}
 */
export function packagesLack(root) {
  const installed = join(root, "node_modules/.package-lock.json");
  if (!existsSync(installed)) return "missing";
  const lockfile = join(root, "package-lock.json");
  const marker = markerOf(root);
  if (existsSync(marker)) {
    return readFileSync(marker, "utf8") === hashOf(lockfile) ? undefined : "outdated";
  }
  return statSync(installed).mtimeMs < statSync(lockfile).mtimeMs ? "outdated" : undefined;
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
  writeFileSync(markerOf(root), hashOf(join(root, "package-lock.json")));
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

/** @param {string} root */
const markerOf = (root) => join(root, "node_modules/.wanewright-lockfile");

/** @param {string} file */
const hashOf = (file) => createHash("sha256").update(readFileSync(file)).digest("hex");

import { createHash } from "node:crypto";
import { existsSync, mkdirSync, readFileSync, readdirSync, statSync } from "node:fs";
import { join } from "node:path";
import { run, tail } from "./command.mjs";
import { writeWhole } from "./place.mjs";
import { Trouble } from "./trouble.mjs";

/** Everything that a build is made from. */
const SOURCES = ["app", "components", "lib", "db", "emails", "public"].concat(
  ["proxy.ts", "instrumentation.ts", "package-lock.json", "tsconfig.json"],
  ["next.config.mjs", "postcss.config.mjs", "tailwind.config.ts"],
);

/**
 * Builds the pages when their sources have changed since the last build.
 * @param {string} root
 * @param {object} options
 * @param {string} options.dist folder of the build, relative to the checkout
 * @param {string} options.log
 * @param {NodeJS.ProcessEnv} options.env
 * @returns {Promise<string>} what was done, for the step's line
 */
export async function ensureBuild(root, { dist, log, env }) {
  const sources = hashOfSources(root);
  if (lastBuild(root, dist) === sources) return "unchanged";
  const next = join(root, "node_modules/next/dist/bin/next");
  const done = await run(process.execPath, [next, "build"], {
    cwd: root,
    env: { ...env, NODE_ENV: "production", NEXT_TELEMETRY_DISABLED: "1", WANEWRIGHT_DIST: dist },
    log,
  });
  if (done.code !== 0) throw failed(done.output, log);
  mkdirSync(join(root, ".wanewright"), { recursive: true });
  writeWhole(noteOf(root, dist), JSON.stringify({ sources, build: buildId(root, dist) }));
  return "built";
}

/**
 * @param {string} output
 * @param {string} log
 */
function failed(output, log) {
  if (/ENOSPC|No space left/.test(output)) {
    return new Trouble("The disk filled up while building.", "Free some space, then start again.");
  }
  if (/EACCES|EPERM/.test(output)) {
    return new Trouble(
      `The build may not write its folder:\n${tail(output, 4)}`,
      "Remove the .next folder (an earlier start by another user may own it), then start again.",
    );
  }
  return new Trouble(
    `Building the pages failed:\n${tail(output, 25)}`,
    `The whole output is in ${log}. Undo the last change, or mend what it names.`,
  );
}

/** The sources of the build that is there; undefined when there is none, or not of ours.
 * @param {string} root
 * @param {string} dist
 * @returns {string | undefined}
 */
function lastBuild(root, dist) {
  try {
    const note = JSON.parse(readFileSync(noteOf(root, dist), "utf8"));
    return note.build === buildId(root, dist) ? note.sources : undefined;
  } catch {
    return undefined;
  }
}

/**
 * @param {string} root
 * @param {string} dist
 */
const buildId = (root, dist) => readFileSync(join(root, dist, "BUILD_ID"), "utf8");

/**
 * @param {string} root
 * @param {string} dist
 */
const noteOf = (root, dist) => join(root, ".wanewright", `build-${dist.replace(/\W+/g, "-")}.json`);

/**
 * A hash over the names and contents of all sources.
 * @param {string} root
 */
export function hashOfSources(root) {
  const hash = createHash("sha256").update(process.version);
  for (const source of SOURCES) addTo(hash, root, source);
  return hash.digest("hex");
}

/**
 * @param {import("node:crypto").Hash} hash
 * @param {string} root
 * @param {string} path
 */
function addTo(hash, root, path) {
  const full = join(root, path);
  if (!existsSync(full)) return;
  if (statSync(full).isDirectory()) {
    for (const name of readdirSync(full).sort()) addTo(hash, root, `${path}/${name}`);
    return;
  }
  hash.update(`\0${path}\0`).update(readFileSync(full));
}

/**
 * Whether the build that is there was made from the sources that are there.
 * @param {string} root
 * @param {string} dist
 */
export const isBuilt = (root, dist) => lastBuild(root, dist) === hashOfSources(root);

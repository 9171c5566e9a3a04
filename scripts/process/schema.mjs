import { run, tail } from "./command.mjs";
import { Trouble } from "./trouble.mjs";

/**
 * Runs one of the TypeScript scripts to its end.
 * @param {string} root
 * @param {string} script
 * @param {readonly string[]} args
 * @param {NodeJS.ProcessEnv} env
 */
function runScript(root, script, args, env) {
  return run(process.execPath, ["--import", "tsx", script, ...args], { cwd: root, env });
}

/**
 * Brings the schema up to date.
 * @param {string} root
 * @param {NodeJS.ProcessEnv} env
 * @returns {Promise<{ ran: string[], empty: boolean, demonstration: boolean }>}
 */
export async function migrate(root, env) {
  const done = await runScript(root, "scripts/migrate.ts", ["--json"], env);
  const line = done.output.split("\n").find((text) => text.startsWith("{"));
  const result = line && JSON.parse(line);
  if (done.code === 0 && result) return result;
  if (result?.what) throw new Trouble(result.what, result.mend);
  throw new Trouble(
    `Bringing the database up to date failed:\n${tail(done.output, 12)}`,
    "Nothing was changed: all missing migrations run in one transaction. Run `npm run doctor`.",
  );
}

/**
 * What the database lacks, without changing it.
 * @param {string} root
 * @param {NodeJS.ProcessEnv} env
 * @returns {Promise<string[]>} the missing migrations
 */
export async function missingMigrations(root, env) {
  const done = await runScript(root, "scripts/migrate.ts", ["--check", "--json"], env);
  const line = done.output.split("\n").find((text) => text.startsWith("{"));
  const result = line && JSON.parse(line);
  if (done.code === 0 && result) return result.missing;
  throw new Trouble(result?.what ?? tail(done.output, 5), result?.mend ?? "Run `npm ci`.");
}

/**
 * Fills an empty database with the demonstration scenario.
 * @param {string} root
 * @param {NodeJS.ProcessEnv} env
 * @param {string} log
 */
export async function seed(root, env, log) {
  const args = ["--import", "tsx", "scripts/seed/run.ts"];
  const done = await run(process.execPath, args, { cwd: root, env, log });
  if (done.code === 0) return done.output;
  throw new Trouble(
    `Filling the database with the demonstration failed:\n${tail(done.output, 12)}`,
    /No space left|Disk quota exceeded/.test(done.output)
      ? "The disk is full: free some space (`df -h`), then start again; it begins anew."
      : "Start again to try once more, or set WANEWRIGHT_SCENARIO=none to begin with an empty one.",
  );
}

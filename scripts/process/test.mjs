import { mkdirSync } from "node:fs";
import { join } from "node:path";
import { ensureBuild } from "./build.mjs";
import { chooseParts } from "./test-parts.mjs";
import { ensurePackages } from "./dependencies.mjs";
import { startEndToEnd } from "./end-to-end.mjs";
import { Interrupted, Lifetime } from "./lifetime.mjs";
import { homeOf, ROOT } from "./place.mjs";
import { runningStart } from "./run-record.mjs";
import { staticChecks } from "./static-checks.mjs";
import { Tally } from "./tally.mjs";
import { startTemporaryPostgres } from "./temporary-postgres.mjs";
import { printTrouble, Trouble } from "./trouble.mjs";
import { runVitest } from "./vitest-run.mjs";

const LOGS = join(ROOT, ".wanewright/test-logs");

/**
 * Runs what was asked for; a part that fails does not hide the later ones.
 * @param {readonly string[]} args
 * @returns {Promise<number>} the exit code
 */
export async function test(args) {
  const life = new Lifetime().listen();
  const tally = new Tally((line) => console.log(line));
  try {
    const wanted = chooseParts(args);
    mkdirSync(LOGS, { recursive: true });
    await tally.preparation("packages", () => ensurePackages(ROOT));
    await runParts(wanted, life, tally);
  } catch (error) {
    if (!(error instanceof Interrupted)) {
      printTrouble(error, "preparing the tests", (line) => console.log(line));
      tally.fail("preparing the tests");
    }
  }
  if (life.reason !== undefined) tally.fail(`interrupted by ${life.reason}`);
  await life.end((name, error) => {
    printTrouble(error, `stopping the ${name}`, (line) => console.log(line));
    tally.fail(`stopping the ${name}`);
  });
  return tally.finish();
}

/**
 * @param {import("./test-parts.mjs").Wanted} wanted
 * @param {Lifetime} life
 * @param {Tally} tally
 */
async function runParts({ parts, rest }, life, tally) {
  const vitest = async (
    /** @type {string} */ project,
    /** @type {NodeJS.ProcessEnv} */ env = {},
  ) => {
    life.check();
    await tally.tests(project, () => runVitest(ROOT, project, rest, env, LOGS));
  };
  if (parts.has("lint")) {
    life.check();
    // Side by side: none needs what another writes, and the longest takes as long as all others.
    await Promise.all(staticChecks(ROOT).map(({ name, run }) => tally.check(name, run)));
  }
  if (parts.has("unit")) await vitest("unit");
  if (parts.has("architecture")) await vitest("architecture");
  if (parts.has("db")) {
    await withDatabase(life, tally, (server) =>
      vitest("db", { TEST_DATABASE_URL: server.url("postgres") }),
    );
  }
  let built = true;
  if (parts.has("build")) built = await tally.check("next build", build);
  if (!parts.has("e2e")) return;
  if (!built) return tally.fail("e2e: not run, because the build failed");
  await withDatabase(life, tally, async (server) => {
    const env = await startEndToEnd(server, life, tally, LOGS);
    if (env) await vitest("e2e", env);
  });
}

/** @type {Promise<import("./postgres.mjs").Server> | undefined} */
let shared;

/**
 * One temporary server for all parts that need one; where it cannot start, each counts as failed.
 * @param {Lifetime} life
 * @param {Tally} tally
 * @param {(server: import("./postgres.mjs").Server) => Promise<void>} work
 */
async function withDatabase(life, tally, work) {
  life.check();
  shared ??= tally.preparation(
    "PostgreSQL",
    () => startTemporaryPostgres(life),
    (server) => `on port ${server.port}`,
  );
  let server;
  try {
    server = await shared;
  } catch (error) {
    printTrouble(error, "starting PostgreSQL", (line) => console.log(line));
    return tally.fail("the temporary PostgreSQL did not start");
  }
  await work(server);
}

/** @returns {Promise<{ ok: boolean, output: string }>} */
async function build() {
  const running = runningStart(homeOf());
  try {
    if (running) throw runsFromHere(running.pid);
    const log = join(LOGS, "build.log");
    return { ok: true, output: await ensureBuild(ROOT, { dist: ".next", log, env: process.env }) };
  } catch (error) {
    if (!(error instanceof Trouble)) throw error;
    return { ok: false, output: `${error.message}\n${error.mend}` };
  }
}

/** @param {number} pid */
const runsFromHere = (pid) =>
  new Trouble(
    "Wanewright runs from this folder; a new build would pull the pages from under it.",
    `Stop it first (Ctrl-C in its window, or \`kill ${pid}\`), or test in a copy of the folder.`,
  );

import { join } from "node:path";
import { openDatabase } from "./application-database.mjs";
import { ensureBuild } from "./build.mjs";
import { ensurePackages } from "./dependencies.mjs";
import { childEnvironment } from "./environment.mjs";
import { Lifetime } from "./lifetime.mjs";
import { homeOf, makeHome, ROOT, secretsOf } from "./place.mjs";
import { forecastsMade } from "./forecasts.mjs";
import { freePort, isFree, portFrom } from "./ports.mjs";
import { pause } from "./processes.mjs";
import { claim } from "./run-record.mjs";
import { migrate, seed } from "./schema.mjs";
import { startMailFake, startStorageFake, startWeb, startWorker } from "./services.mjs";
import { signInLines } from "./sign-ins.mjs";
import { Steps } from "./steps.mjs";
import { printTrouble, Trouble } from "./trouble.mjs";

const FIRST_WEB_PORT = 3000;
const FIRST_MAIL_PORT = 3025;
const FIRST_STORAGE_PORT = 3035;
/** A first start may not take much longer than this for them. */
const FORECAST_PATIENCE_S = 90;

/**
 * Brings everything up, stays until somebody asks for the end, takes everything down.
 * @returns {Promise<number>} the exit code
 */
export async function start() {
  const life = new Lifetime().listen();
  const print = (/** @type {string} */ line) => console.log(line);
  let code;
  try {
    await bringUp(life, print);
    code = await life.asked;
  } catch (error) {
    code = life.reason === undefined ? 1 : await life.asked;
    if (life.reason === undefined) printTrouble(error, "starting");
  }
  if (!life.hasStarted) return code;
  print(`\nStopping (${life.reason ?? "after the failure"}) …`);
  await life.end((name, error) => {
    printTrouble(error, `stopping the ${name}`);
    code = 1;
  });
  print("Stopped. The data is kept.");
  return code;
}

/**
 * @param {Lifetime} life
 * @param {(line: string) => void} print
 */
async function bringUp(life, print) {
  const began = performance.now();
  const steps = new Steps(print, () => life.check());
  const home = homeOf();
  print(`Wanewright starts from ${ROOT}`);
  const record = await claimHome(home, life, print);
  const ports = await choosePorts();
  await steps.step("Packages", () => ensurePackages(ROOT), String);
  const secrets = secretsOf(home);
  const database = await steps.step(
    "Database",
    (say) => openDatabase(home, secrets.databasePassword, { env: process.env, say }),
    ({ told }) => told,
  );
  life.onEnd("database", database.stop);
  const mailAddress = ports.mail === undefined ? undefined : `http://127.0.0.1:${ports.mail}`;
  const { authSecret } = secrets;
  const storageAddress =
    ports.storage === undefined ? undefined : `http://127.0.0.1:${ports.storage}`;
  const addresses = { databaseUrl: database.url, port: ports.web, mailAddress };
  const found = { ...addresses, authSecret, storageAddress };
  const env = childEnvironment(process.env, found);
  const demonstration = await fill(steps, database, home, env);
  const log = join(home, "logs/build.log");
  await steps.step("Pages", () => ensureBuild(ROOT, { dist: ".next", log, env }), String);
  await startServices(steps, life, { home, env, ports, record });
  record.note({ address: env.APP_URL });
  if (database.fresh && demonstration) await awaitForecasts(steps, life, database);
  print(
    `Ready after ${Math.round((performance.now() - began) / 1000)} s. Ctrl-C stops everything.`,
  );
  print(farewell(env, { mailAddress, logs: join(home, "logs"), demonstration }));
}

/**
 * @param {string} home
 * @param {Lifetime} life
 * @param {(line: string) => void} print
 */
async function claimHome(home, life, print) {
  makeHome(home);
  const record = await claim(home);
  life.onEnd("record of this run", record.release);
  if (record.orphans.length) {
    print(`  Tidied       stopped what a killed start had left: ${record.orphans.join(", ")}`);
  }
  return record;
}

/** @typedef {{ web: number, mail: number | undefined, storage: number | undefined }} Ports */

/** @returns {Promise<Ports>} */
async function choosePorts() {
  const wanted = portFrom("PORT");
  if (wanted !== undefined && !(await isFree(wanted))) {
    throw new Trouble(
      `Port ${wanted}, asked for by PORT, is taken or may not be used by this user.`,
      `Stop the program there (\`ss -ltnp | grep :${wanted}\`), or set PORT to another number.`,
    );
  }
  const web = wanted ?? (await freePort(FIRST_WEB_PORT));
  const { RESEND_API_KEY, S3_BUCKET } = process.env;
  const mail = RESEND_API_KEY
    ? undefined
    : await freePort(portFrom("MAIL_FAKE_PORT") ?? FIRST_MAIL_PORT, [web]);
  const storage = S3_BUCKET ? undefined : await freePort(FIRST_STORAGE_PORT, [web, mail ?? 0]);
  return { web, mail, storage };
}

/**
 * The schema, and on the first start of a database of ours the demonstration scenario.
 * @param {Steps} steps
 * @param {import("./application-database.mjs").ApplicationDatabase} database
 * @param {string} home
 * @param {NodeJS.ProcessEnv} env
 * @returns {Promise<boolean>} whether the demonstration is in it
 */
async function fill(steps, database, home, env) {
  const { empty, demonstration } = await steps.step(
    "Schema",
    () => migrate(ROOT, env),
    ({ ran }) => (ran.length ? `migrations run: ${ran.length}` : "up to date"),
  );
  const scenario = env.WANEWRIGHT_SCENARIO ?? (database.fresh ? "quillmere" : "none");
  const seeds = empty && scenario !== "none";
  if (seeds) {
    const log = join(home, "logs/seed.log");
    const work = () => seed(ROOT, { ...env, WANEWRIGHT_SCENARIO: scenario }, log);
    await steps.step("Scenario", work, () => "Quillmere Drainage Board, three years of history");
  }
  await database.finished();
  return seeds || demonstration;
}

/**
 * @param {Steps} steps
 * @param {Lifetime} life
 * @param {object} with_
 * @param {string} with_.home
 * @param {NodeJS.ProcessEnv} with_.env
 * @param {Ports} with_.ports
 * @param {Awaited<ReturnType<typeof claim>>} with_.record
 */
async function startServices(steps, life, { home, env, ports, record }) {
  /** @type {import("./run-record.mjs").Started[]} */
  const children = [];
  /** @type {import("./services.mjs").Setting} */
  const setting = {
    root: ROOT,
    home,
    env,
    dist: ".next",
    check: () => life.check(),
    started: (child) => {
      life.onEnd(child.name, child.stop);
      children.push({ name: child.name, pid: child.pid, began: child.began });
      record.note({ children });
    },
    onDeath: async (child, how) => {
      await pause(100); // what it said last may still be on its way
      console.error(`\nThe ${child.name} ended (${how}). It said last:\n${child.lastLines()}`);
      console.error(
        `Its log is in ${join(home, "logs")}. Run \`npm run doctor\`, then start again.`,
      );
      life.ask(`the ${child.name} ended`, 1);
    },
  };
  await startStandIns(steps, setting, ports, home);
  const tellWeb = () => `listening on 127.0.0.1:${ports.web}`;
  await steps.step("Web", () => startWeb(setting, ports.web), tellWeb);
  await steps.step(
    "Worker",
    () => startWorker(setting),
    () => "running",
  );
}

/**
 * What stands in for services outside, where none is configured.
 * @param {Steps} steps
 * @param {import("./services.mjs").Setting} setting
 * @param {Ports} ports
 * @param {string} home
 */
async function startStandIns(steps, setting, { mail, storage }, home) {
  if (mail !== undefined) {
    const tell = () => `http://127.0.0.1:${mail}`;
    await steps.step("Mail page", () => startMailFake(setting, mail, join(home, "mails")), tell);
  }
  if (storage !== undefined) {
    const folder = join(home, "objects");
    await steps.step(
      "Storage",
      () => startStorageFake(setting, storage, folder),
      () => folder,
    );
  }
}

/**
 * The worker forecasts every pack of the demonstration once: without that Horizon is empty.
 * @param {Steps} steps
 * @param {Lifetime} life
 * @param {import("./application-database.mjs").ApplicationDatabase} database
 */
async function awaitForecasts(steps, life, { query }) {
  if (!query) return;
  const options = { check: () => life.check(), seconds: FORECAST_PATIENCE_S };
  const tell = (/** @type {boolean} */ done) => (done ? "made" : "being made, Horizon fills up");
  await steps.step("Forecasts", () => forecastsMade(query, options), tell);
}

/**
 * @param {NodeJS.ProcessEnv} env
 * @param {{ mailAddress: string | undefined, logs: string, demonstration: boolean }} found
 */
function farewell(env, { mailAddress, logs, demonstration }) {
  const lines = ["", `  Wanewright   ${env.APP_URL}`];
  if (mailAddress) lines.push(`  Mail page    ${mailAddress}`);
  lines.push(`  Logs         ${logs}`, "");
  if (demonstration) return [...lines, ...signInLines(ROOT)].join("\n");
  lines.push("  Where nobody can sign in yet: `npm run first-administrator` makes an account.");
  return lines.join("\n");
}

import { join } from "node:path";
import { startChild } from "./children.mjs";
import { ensurePackages } from "./dependencies.mjs";
import { startDevelopmentDatabase } from "./development-database.mjs";
import { childEnvironment } from "./environment.mjs";
import { Lifetime } from "./lifetime.mjs";
import { homeOf, makeHome, ROOT, secretsOf } from "./place.mjs";
import { freePort, portFrom } from "./ports.mjs";
import { migrate, seed } from "./schema.mjs";
import { startMailFake, startStorageFake } from "./services.mjs";
import { Steps } from "./steps.mjs";
import { printTrouble } from "./trouble.mjs";

const print = (/** @type {string} */ line) => console.log(line);

/**
 * @param {readonly string[]} args
 * @returns {Promise<number>} the exit code
 */
export async function develop(args) {
  const life = new Lifetime().listen();
  let code;
  try {
    const steps = new Steps(print, () => life.check());
    const database = await steps.step(
      "Database",
      (say) => startDevelopmentDatabase(say),
      (server) => `${server.adopted ? "already running" : "started"}: ${server.url("dev")}`,
    );
    if (args.includes("database")) return 0;
    await bringUp(steps, life, database.url("dev"));
    code = await life.asked;
  } catch (error) {
    code = life.reason === undefined ? 1 : await life.asked;
    if (life.reason === undefined) printTrouble(error, "starting the development processes");
  }
  await life.end((name, error) => printTrouble(error, `stopping the ${name}`));
  return code;
}

/**
 * @param {Steps} steps
 * @param {Lifetime} life
 * @param {string} databaseUrl
 */
async function bringUp(steps, life, databaseUrl) {
  const home = join(homeOf(), "development");
  makeHome(home);
  await steps.step("Packages", () => ensurePackages(ROOT), String);
  const web = portFrom("PORT") ?? (await freePort(3000));
  const mail = await freePort(3025, [web]);
  const storage = await freePort(3035, [web, mail]);
  const { authSecret } = secretsOf(home);
  const mailAddress = `http://127.0.0.1:${mail}`;
  const storageAddress = process.env.S3_BUCKET ? undefined : `http://127.0.0.1:${storage}`;
  const found = { databaseUrl, authSecret, port: web, mailAddress, storageAddress };
  const env = childEnvironment(process.env, found);
  Object.assign(env, { NODE_ENV: "development" });
  const { empty } = await steps.step(
    "Schema",
    () => migrate(ROOT, env),
    () => "up to date",
  );
  if (empty && env.WANEWRIGHT_SCENARIO !== "none") {
    await steps.step(
      "Scenario",
      () => seed(ROOT, env, join(home, "logs/seed.log")),
      () => "seeded",
    );
  }
  const setting = settingOf(life, home, env);
  await steps.step(
    "Mail page",
    () => startMailFake(setting, mail, null),
    () => mailAddress,
  );
  if (storageAddress) await startStorageFake(setting, storage, join(home, "objects"));
  const next = ["node_modules/next/dist/bin/next", "dev", "-H", "127.0.0.1", "-p", String(web)];
  reloading("web", next, setting);
  reloading("worker", ["node_modules/tsx/dist/cli.mjs", "watch", "scripts/worker.ts"], setting);
  print(`\n  ${env.APP_URL}\n`);
}

/**
 * @param {Lifetime} life
 * @param {string} home
 * @param {NodeJS.ProcessEnv} env
 * @returns {import("./services.mjs").Setting}
 */
function settingOf(life, home, env) {
  return {
    root: ROOT,
    home,
    env,
    dist: ".next",
    check: () => life.check(),
    started: (child) => life.onEnd(child.name, child.stop),
    onDeath: (child, how) => life.ask(`the ${child.name} ended (${how})`, 1),
  };
}

/**
 * @param {string} name
 * @param {readonly string[]} args
 * @param {import("./services.mjs").Setting} setting
 */
function reloading(name, args, { root, home, env, started, onDeath }) {
  const log = join(home, `logs/${name}.log`);
  const hear = (/** @type {string} */ text) => process.stdout.write(text);
  started(startChild(name, args, { env, cwd: root, log, onDeath, hear }));
}

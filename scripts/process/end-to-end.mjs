import { mkdirSync } from "node:fs";
import { join } from "node:path";
import { findOrInstallChromium } from "./chromium.mjs";
import { childEnvironment } from "./environment.mjs";
import { forecastsMade } from "./forecasts.mjs";
import { ROOT } from "./place.mjs";
import { freePort } from "./ports.mjs";
import { ensureDatabase, newPassword } from "./postgres.mjs";
import { migrate, seed } from "./schema.mjs";
import { startMailFake, startStorageFake, startWeb, startWorker } from "./services.mjs";
import { printTrouble, Trouble } from "./trouble.mjs";

const DATABASE = "wanewright_e2e";
const FORECAST_PATIENCE_S = 300;

/**
 * Starts the whole product on a seeded scenario for the browser to drive.
 * @param {import("./postgres.mjs").Server} server
 * @param {import("./lifetime.mjs").Lifetime} life
 * @param {import("./tally.mjs").Tally} tally
 * @param {string} logs
 * @returns {Promise<NodeJS.ProcessEnv | undefined>} what the tests need; undefined: it failed
 */
export async function startEndToEnd(server, life, tally, logs) {
  try {
    const chromium = await tally.preparation("Chromium", findOrInstallChromium);
    const { env, ports } = await environment(server);
    await tally.preparation(
      "scenario",
      () => fill(server, env, logs),
      () => "seeded",
    );
    await tally.preparation(
      "product",
      () => startProduct(life, tally, { env, ports, logs }),
      String,
    );
    await tally.preparation(
      "forecasts",
      () => awaitForecasts(server, life),
      () => "made",
    );
    return {
      DATABASE_URL: env.DATABASE_URL,
      E2E_URL: env.APP_URL,
      E2E_MAIL_URL: env.RESEND_BASE_URL,
      CHROMIUM_PATH: chromium,
    };
  } catch (error) {
    life.check();
    printTrouble(error, "preparing the end to end tests", (line) => console.log(line));
    tally.fail("e2e: not run, because the product did not start");
    return undefined;
  }
}

/**
 * @param {import("./postgres.mjs").Server} server
 * @param {import("./lifetime.mjs").Lifetime} life
 */
async function awaitForecasts(server, life) {
  const options = { check: () => life.check(), seconds: FORECAST_PATIENCE_S };
  const made = await forecastsMade((sql) => server.query(sql, DATABASE), options);
  if (made) return;
  throw new Trouble(
    `The forecasts of the scenario were not made within ${FORECAST_PATIENCE_S} seconds.`,
    "Look into the log of the worker, .wanewright/test-logs/logs/worker.log.",
  );
}

/** @param {import("./postgres.mjs").Server} server */
async function environment(server) {
  const web = await freePort(3100);
  const mail = await freePort(web + 1);
  const storage = await freePort(mail + 1);
  const given = { ...process.env };
  for (const name of ["APP_URL", "AUTH_URL", "AUTH_SECRET", "RESEND_API_KEY"]) delete given[name];
  const env = childEnvironment(given, {
    databaseUrl: server.url(DATABASE),
    authSecret: newPassword() + newPassword(),
    port: web,
    mailAddress: `http://127.0.0.1:${mail}`,
    storageAddress: `http://127.0.0.1:${storage}`,
  });
  env.WANEWRIGHT_SCENARIO = "quillmere";
  return { env, ports: { web, mail, storage } };
}

/**
 * @param {import("./postgres.mjs").Server} server
 * @param {NodeJS.ProcessEnv} env
 * @param {string} logs
 */
async function fill(server, env, logs) {
  await ensureDatabase(server, DATABASE);
  await migrate(ROOT, env);
  await seed(ROOT, env, join(logs, "seed.log"));
}

/**
 * @param {import("./lifetime.mjs").Lifetime} life
 * @param {import("./tally.mjs").Tally} tally
 * @param {object} with_
 * @param {NodeJS.ProcessEnv} with_.env
 * @param {{ web: number, mail: number, storage: number }} with_.ports
 * @param {string} with_.logs
 */
async function startProduct(life, tally, { env, ports, logs }) {
  mkdirSync(join(logs, "logs"), { recursive: true });
  /** @type {import("./services.mjs").Setting} */
  const setting = {
    root: ROOT,
    home: logs,
    env,
    dist: ".next",
    check: () => life.check(),
    started: (child) => life.onEnd(child.name, child.stop),
    onDeath: (child, how) => {
      tally.fail(`the ${child.name} ended during the tests (${how})`);
      console.log(child.lastLines());
    },
  };
  await startMailFake(setting, ports.mail, null);
  await startStorageFake(setting, ports.storage, join(logs, "objects"));
  await startWeb(setting, ports.web);
  await startWorker(setting);
  return `web on ${ports.web}, mail page on ${ports.mail}`;
}

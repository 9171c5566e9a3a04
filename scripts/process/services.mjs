import { join } from "node:path";
import { startChild, waitUntilAnswers } from "./children.mjs";
import { pause } from "./processes.mjs";
import { Trouble } from "./trouble.mjs";

/**
 * @typedef {object} Setting
 * @property {string} root
 * @property {string} home
 * @property {NodeJS.ProcessEnv} env
 * @property {string} dist folder of the build
 * @property {() => void} check throws when the run should go no further
 * @property {(child: import("./children.mjs").Child) => void} started
 * @property {(child: import("./children.mjs").Child, how: string) => void} onDeath
 */

/** The worker finishes the job it has in hand; others need not be waited for so long. */
const WORKER_PATIENCE_MS = 25_000;

/**
 * @param {Setting} setting
 * @param {string} name
 * @param {readonly string[]} args
 * @param {NodeJS.ProcessEnv} [more]
 * @param {number} [patienceMs] how long it may take to stop
 */
function start(setting, name, args, more = {}, patienceMs = 10_000) {
  const child = startChild(name, args, {
    env: { ...setting.env, ...more },
    cwd: setting.root,
    log: join(setting.home, "logs", `${name.replaceAll(" ", "-")}.log`),
    onDeath: setting.onDeath,
    patienceMs,
  });
  setting.started(child);
  return child;
}

/**
 * @param {Setting} setting
 * @param {number} port
 */
export async function startWeb(setting, port) {
  const next = join(setting.root, "node_modules/next/dist/bin/next");
  const args = [next, "start", "-H", "127.0.0.1", "-p", String(port)];
  const child = start(setting, "web", args, { WANEWRIGHT_DIST: setting.dist });
  const { check } = setting;
  await waitUntilAnswers(`http://127.0.0.1:${port}/api/health`, { child, check });
  return child;
}

/**
 * @param {Setting} setting
 * @param {number} port
 * @param {string | null} folder where mails are kept; null: in memory only
 */
export async function startMailFake(setting, port, folder) {
  const args = ["--import", "tsx", "scripts/mail-fake/run.ts"];
  const more = { MAIL_FAKE_PORT: String(port), MAIL_FAKE_FOLDER: folder ?? "" };
  const child = start(setting, "mail page", args, more);
  const { check } = setting;
  await waitUntilAnswers(`http://127.0.0.1:${port}/_health`, { child, check });
  return child;
}

/**
 * @param {Setting} setting
 * @param {number} port
 * @param {string} folder where objects are kept
 */
export async function startStorageFake(setting, port, folder) {
  const args = ["--import", "tsx", "scripts/storage-fake/run.ts"];
  const more = { STORAGE_FAKE_PORT: String(port), STORAGE_FAKE_FOLDER: folder };
  const child = start(setting, "storage", args, more);
  const { check } = setting;
  await waitUntilAnswers(`http://127.0.0.1:${port}/_health`, { child, check });
  return child;
}

/**
 * The worker has no port to ask: it is up when it says so, or, where its log is silenced,
 * when it has lived through its first seconds.
 * @param {Setting} setting
 */
export async function startWorker(setting) {
  const args = ["--import", "tsx", "scripts/worker.ts"];
  const child = start(setting, "worker", args, {}, WORKER_PATIENCE_MS);
  for (let waited = 0; waited < 5000; waited += 100) {
    await pause(100);
    setting.check();
    if (child.lastLines().includes("worker ready")) break;
    if (child.ended()) {
      const what = `The worker ended at once. It said last:\n${child.lastLines()}`;
      throw new Trouble(what, "Run `npm run doctor` to see what is missing.");
    }
  }
  return child;
}

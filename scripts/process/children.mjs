import { spawn } from "node:child_process";
import { tail } from "./command.mjs";
import { RotatingLog } from "./rotating-log.mjs";
import { beganAt, pause, stopGroup } from "./processes.mjs";
import { Trouble } from "./trouble.mjs";

/**
 * @typedef {object} Child
 * @property {string} name
 * @property {number} pid
 * @property {number} began
 * @property {() => string} lastLines
 * @property {() => boolean} ended
 * @property {() => Promise<void>} stop
 */

/**
 * Starts a process that is meant to stay, in a group of its own.
 * @param {string} name
 * @param {readonly string[]} args of Node
 * @param {object} options
 * @param {NodeJS.ProcessEnv} options.env
 * @param {string} options.cwd
 * @param {string} options.log
 * @param {(child: Child, how: string) => void} options.onDeath it ended without being stopped
 * @param {(text: string) => void} [options.hear] is told all that it prints
 * @param {number} [options.patienceMs] how long it may take to stop
 * @returns {Child}
 */
export function startChild(name, args, { env, cwd, log, onDeath, hear, patienceMs }) {
  const file = new RotatingLog(log);
  const child = spawn(process.execPath, args, {
    ...{ cwd, env, detached: true },
    stdio: ["ignore", "pipe", "pipe"],
  });
  let recent = "";
  let stopping = false;
  let ended = false;
  for (const stream of [child.stdout, child.stderr]) {
    stream.setEncoding("utf8");
    stream.on("data", (text) => {
      recent = (recent + text).slice(-8192);
      file.write(text);
      hear?.(text);
    });
  }
  const pid = child.pid ?? 0;
  /** @type {Child} */
  const handle = {
    name,
    pid,
    began: pid ? (beganAt(pid) ?? 0) : 0,
    lastLines: () => tail(recent, 12),
    ended: () => ended,
    stop: async () => {
      stopping = true;
      if (pid) await stopGroup(pid, patienceMs);
    },
  };
  /** @param {string} how */
  const died = (how) => {
    if (ended) return;
    ended = true;
    file.close();
    if (!stopping) onDeath(handle, how);
  };
  child.on("error", (error) => died(error.message));
  child.on("exit", (code, signal) => setTimeout(() => died(signal ?? `exit code ${code}`), 50));
  return handle;
}

/**
 * Waits until an address answers with success.
 * @param {string} address
 * @param {object} options
 * @param {Child} options.child who should answer
 * @param {() => void} options.check throws when waiting has become pointless
 * @param {number} [options.seconds]
 */
export async function waitUntilAnswers(address, { child, check, seconds = 60 }) {
  const until = performance.now() + seconds * 1000;
  let last = "no answer";
  while (performance.now() < until) {
    check();
    if (child.ended()) break;
    try {
      const response = await fetch(address, { signal: AbortSignal.timeout(5_000) });
      if (response.ok) return;
      last = `status ${response.status}: ${(await response.text()).slice(0, 200)}`;
    } catch {
      last = "no answer";
    }
    await pause(100);
  }
  check();
  throw new Trouble(
    `The ${child.name} did not come up at ${address} (${last}). It said last:\n${child.lastLines()}`,
    "Run `npm run doctor` to see what is missing.",
  );
}

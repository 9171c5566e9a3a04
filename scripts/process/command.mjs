import { spawn } from "node:child_process";
import { createWriteStream } from "node:fs";

/** How much of a command's output is remembered for the message when it fails. */
const REMEMBERED = 64 * 1024;

/** Commands running now that may be stopped half-way. @type {Set<number>} */
const interruptible = new Set();

/**
 * Runs a command to its end. It gets a process group of its own, so that Ctrl-C reaches
 * only the caller, who decides (see `interruptCommands`). Never throws for a failing command.
 * @param {string} command
 * @param {readonly string[]} args
 * @param {object} [options]
 * @param {string} [options.cwd]
 * @param {NodeJS.ProcessEnv} [options.env] replaces the environment
 * @param {string} [options.log] file that receives the whole output
 * @param {boolean} [options.mustFinish] is not stopped by an interrupt (package managers)
 * @param {string} [options.input] text for standard input
 * @param {number} [options.minutes] longest time; then the whole group is stopped
 * @returns {Promise<{ code: number, output: string, seconds: number }>}
 */
export function run(command, args, options = {}) {
  const { cwd, env = process.env, mustFinish = false, input, minutes = 60 } = options;
  const began = performance.now();
  return new Promise((resolve) => {
    const log = options.log ? createWriteStream(options.log, { flags: "w" }) : undefined;
    log?.on("error", () => {});
    let output = "";
    const child = spawn(command, args, { cwd, env, detached: true, stdio: "pipe" });
    const pid = child.pid;
    if (pid !== undefined && !mustFinish) interruptible.add(pid);
    child.stdin.on("error", () => {});
    child.stdin.end(input);
    for (const stream of [child.stdout, child.stderr]) {
      stream.setEncoding("utf8");
      stream.on("data", (text) => {
        output = (output + text).slice(-REMEMBERED);
        log?.write(text);
      });
    }
    const limit = setTimeout(() => {
      output += `\nStopped: it took longer than ${minutes} minutes.`;
      if (pid !== undefined) signalGroup(pid, "SIGKILL");
    }, minutes * 60_000);
    let settled = false;
    /** @param {number} code */
    const finish = (code) => {
      if (settled) return;
      settled = true;
      clearTimeout(limit);
      if (pid !== undefined) interruptible.delete(pid);
      log?.end();
      resolve({ code, output, seconds: (performance.now() - began) / 1000 });
    };
    child.on("error", (error) => {
      output += error.message;
      finish(127);
    });
    child.on("close", (code, signal) => finish(signal ? 128 : (code ?? 1)));
  });
}

/** Asks every command that may be stopped half-way to stop. */
export function interruptCommands() {
  for (const pid of interruptible) signalGroup(pid, "SIGTERM");
}

/**
 * Signals a whole process group. False when it is gone.
 * @param {number} pid leader of the group
 * @param {NodeJS.Signals} signal
 */
export function signalGroup(pid, signal) {
  try {
    process.kill(-pid, signal);
    return true;
  } catch {
    return false;
  }
}

/**
 * The last lines of an output, indented, for a message.
 * @param {string} output
 * @param {number} [lines]
 */
export function tail(output, lines = 20) {
  return output
    .trimEnd()
    .split("\n")
    .slice(-lines)
    .map((line) => `    ${line}`)
    .join("\n");
}

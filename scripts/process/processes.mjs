import { readFileSync } from "node:fs";
import { signalGroup } from "./command.mjs";

/**
 * When a process began, in the kernel's ticks; with its number this names it for good, while
 * the number alone may pass to another. Undefined when it is gone, 0 where there is no /proc.
 * @param {number} pid
 * @returns {number | undefined}
 */
export function beganAt(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, "utf8");
    // The name in parentheses may hold spaces; the 22nd field is the 20th after it.
    const fields = stat.slice(stat.lastIndexOf(")") + 2).split(" ");
    return fields[0] === "Z" ? undefined : Number(fields[19]);
  } catch {
    return process.platform === "linux" || !isAlive(pid) ? undefined : 0;
  }
}

/** @param {number} pid */
function isAlive(pid) {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return /** @type {NodeJS.ErrnoException} */ (error).code === "EPERM";
  }
}

/**
 * Stops a process group: politely, then, when it has not ended in time, hard.
 * @param {number} pid leader of the group
 * @param {number} patienceMs
 */
export async function stopGroup(pid, patienceMs = 10_000) {
  if (!signalGroup(pid, "SIGTERM")) return;
  const until = performance.now() + patienceMs;
  while (performance.now() < until) {
    if (!signalGroup(pid, /** @type {never} */ (0))) return;
    await pause(50);
  }
  signalGroup(pid, "SIGKILL");
}

/** @param {number} ms */
export const pause = (ms) => new Promise((resolve) => setTimeout(resolve, ms));

import { existsSync, readFileSync, readlinkSync, realpathSync, rmSync } from "node:fs";
import { join } from "node:path";
import { beganAt } from "./processes.mjs";

/**
 * The server running from a database folder, if there is one. PostgreSQL notes its process
 * and port in postmaster.pid; after a crash or in a new container that process may be gone
 * or be another program, so the process is asked which folder it works in.
 * @param {string} data
 * @returns {{ pid: number, port: number } | undefined}
 */
export function runningServer(data) {
  const lock = readLock(data);
  if (lock === undefined || !worksIn(lock.pid, data)) return undefined;
  return lock;
}

/**
 * Removes a postmaster.pid that no server stands behind: PostgreSQL itself keeps refusing
 * when the number has passed to another process of the same user.
 * @param {string} data
 * @returns {boolean} whether there was one
 */
export function clearStaleLock(data) {
  const file = join(data, "postmaster.pid");
  if (!existsSync(file) || runningServer(data)) return false;
  rmSync(file, { force: true });
  return true;
}

/** @param {string} data */
function readLock(data) {
  let text;
  try {
    text = readFileSync(join(data, "postmaster.pid"), "utf8");
  } catch {
    return undefined;
  }
  const lines = text.split("\n");
  const [pid, port] = [Number(lines[0]), Number(lines[3])];
  return Number.isInteger(pid) && pid > 0 && port > 0 ? { pid, port } : undefined;
}

/**
 * @param {number} pid
 * @param {string} data
 */
function worksIn(pid, data) {
  if (beganAt(pid) === undefined) return false; // gone, or ended and not yet reaped
  try {
    return readlinkSync(`/proc/${pid}/cwd`) === realpathSync(data);
  } catch {
    // No /proc, or not readable: believe the lock rather than start a second server on the data.
    return !existsSync("/proc/self") || existsSync(`/proc/${pid}`);
  }
}

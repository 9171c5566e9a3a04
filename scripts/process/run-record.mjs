import { closeSync, openSync, readFileSync, rmSync, writeSync } from "node:fs";
import { join } from "node:path";
import { writeWhole } from "./place.mjs";
import { beganAt, stopGroup } from "./processes.mjs";
import { Trouble } from "./trouble.mjs";

/**
 * @typedef {object} Started
 * @property {string} name
 * @property {number} pid
 * @property {number} began
 */
/**
 * @typedef {object} Record what `npm start` of a checkout is running
 * @property {number} pid
 * @property {number} began
 * @property {string} [address]
 * @property {Started[]} children
 */

/** @param {string} home */
const fileOf = (home) => join(home, "running.json");

/**
 * The start that is running from this home, if there is one.
 * @param {string} home
 * @returns {Record | undefined}
 */
export function runningStart(home) {
  const record = readRecord(home);
  return record && beganAt(record.pid) === record.began ? record : undefined;
}

/** @param {string} home @returns {Record | undefined} */
function readRecord(home) {
  try {
    return JSON.parse(readFileSync(fileOf(home), "utf8"));
  } catch (error) {
    if (error instanceof SyntaxError) return undefined;
    if (/** @type {NodeJS.ErrnoException} */ (error).code === "ENOENT") return undefined;
    throw error;
  }
}

/**
 * Claims the home for this process. What an earlier start left running when it was killed
 * hard is stopped first.
 * @param {string} home
 */
export async function claim(home) {
  const other = runningStart(home);
  if (other) throw alreadyRunning(other);
  const left = readRecord(home);
  const orphans = (left?.children ?? []).filter(({ pid, began }) => beganAt(pid) === began);
  await Promise.all(orphans.map(({ pid }) => stopGroup(pid)));
  rmSync(fileOf(home), { force: true });
  /** @type {Record} */
  const record = { pid: process.pid, began: beganAt(process.pid) ?? 0, children: [] };
  try {
    const file = openSync(fileOf(home), "wx");
    writeSync(file, JSON.stringify(record));
    closeSync(file);
  } catch (error) {
    if (/** @type {NodeJS.ErrnoException} */ (error).code !== "EEXIST") throw error;
    throw alreadyRunning(readRecord(home) ?? record); // two starts in the same moment
  }
  return {
    orphans: orphans.map(({ name }) => name),
    /** @param {Partial<Record>} more */
    note: (more) => writeWhole(fileOf(home), JSON.stringify(Object.assign(record, more))),
    release: () => rmSync(fileOf(home), { force: true }),
  };
}

/** @param {Record} other */
function alreadyRunning(other) {
  const where = other.address ? `, at ${other.address}` : "";
  return new Trouble(
    `Wanewright already runs from this folder (process ${other.pid}${where}).`,
    `Use that one, or stop it first: Ctrl-C in its window, or \`kill ${other.pid}\`.`,
  );
}

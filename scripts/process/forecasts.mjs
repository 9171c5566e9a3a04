import { pause } from "./processes.mjs";

const WAITING = `select count(*) from pgboss.job
  where name like 'forecast%' and state in ('created', 'retry', 'active')`;

/**
 * Waits until the worker has no forecast left to make.
 * @param {(sql: string) => Promise<string>} query
 * @param {object} options
 * @param {() => void} options.check throws when waiting has become pointless
 * @param {number} options.seconds
 * @returns {Promise<boolean>} false: time ran out
 */
export async function forecastsMade(query, { check, seconds }) {
  const until = performance.now() + seconds * 1000;
  while (performance.now() < until) {
    check();
    if ((await query(WAITING)) === "0") return true;
    await pause(500);
  }
  return false;
}

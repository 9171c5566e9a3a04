import { createServer } from "node:net";
import { Trouble } from "./trouble.mjs";

/**
 * Whether a port of the loopback interface can be listened on.
 * @param {number} port
 * @returns {Promise<boolean>}
 */
export function isFree(port) {
  return new Promise((resolve) => {
    const server = createServer();
    server.once("error", () => resolve(false));
    server.listen({ port, host: "127.0.0.1", exclusive: true }, () => {
      server.close(() => resolve(true));
    });
  });
}

/**
 * The first free loopback port from `first` on.
 * @param {number} first
 * @param {readonly number[]} [taken] ports promised to others
 * @returns {Promise<number>}
 */
export async function freePort(first, taken = []) {
  for (let port = first; port < first + 200 && port < 65_536; port += 1) {
    if (!taken.includes(port) && (await isFree(port))) return port;
  }
  throw new Trouble(
    `No free port between ${first} and ${first + 199} on 127.0.0.1.`,
    "Stop a program that listens there (`ss -ltnp` lists them), or set PORT to another number.",
  );
}

/**
 * A port number from the environment: undefined where the variable is unset or empty.
 * @param {string} variable
 * @param {NodeJS.ProcessEnv} [env]
 */
export function portFrom(variable, env = process.env) {
  const text = env[variable];
  if (text === undefined || text.trim() === "") return undefined;
  const port = Number(text);
  if (Number.isInteger(port) && port > 0 && port < 65_536) return port;
  throw new Trouble(
    `${variable} is "${text}", which is not a port.`,
    `Set ${variable} to a whole number from 1 to 65535, or leave it out.`,
  );
}

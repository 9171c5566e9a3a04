import { Trouble } from "./trouble.mjs";

const ALL = /** @type {const} */ (["lint", "unit", "architecture", "db", "build", "e2e"]);

/**
 * @typedef {object} Wanted
 * @property {Set<string>} parts
 * @property {string[]} rest arguments for vitest: files, -t and a name
 */

/**
 * Which parts to run: all, or those named first. The end to end tests need a build.
 * @param {readonly string[]} args
 * @returns {Wanted}
 */
export function chooseParts(args) {
  /** @type {Set<string>} */
  const named = new Set();
  let index = 0;
  for (; index < args.length && isPart(args[index]); index += 1) named.add(String(args[index]));
  const rest = args.slice(index);
  if (named.size === 0 && rest.length > 0) {
    throw new Trouble(
      `There is no part "${rest[0]}".`,
      `Name one or more of ${ALL.join(", ")}; what follows goes to vitest, as in ` +
        "`npm test -- unit tests/unit/battery -t Peukert`.",
    );
  }
  if (named.has("e2e")) named.add("build");
  return { parts: named.size ? named : new Set(ALL), rest };
}

/** @param {string | undefined} text */
const isPart = (text) => /** @type {readonly (string | undefined)[]} */ (ALL).includes(text);

import { readFileSync } from "node:fs";
import { join } from "node:path";

/**
 * The accounts of the demonstration, one line each, for the end of a start.
 * @param {string} root
 * @returns {string[]}
 */
export function signInLines(root) {
  /** @type {{ role: string, email: string, password: string }[]} */
  const people = JSON.parse(readFileSync(join(root, "scripts/seed/demo-accounts.json"), "utf8"));
  const width = Math.max(...people.map(({ email }) => email.length));
  const lines = people.map(
    ({ role, email, password }) => `    ${role.padEnd(14)} ${email.padEnd(width)}  ${password}`,
  );
  return ["  Sign in as", ...lines];
}

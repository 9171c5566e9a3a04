import { spawn } from "node:child_process";
import { ownDatabaseUrl } from "./application-database.mjs";
import { packagesLack } from "./dependencies.mjs";
import { homeOf, ROOT } from "./place.mjs";
import { printTrouble, Trouble } from "./trouble.mjs";

/**
 * @param {readonly string[]} command a TypeScript file and its arguments
 * @returns {Promise<number>} its exit code
 */
export async function runWithDatabase(command) {
  try {
    const url = process.env.DATABASE_URL || ownDatabaseUrl(homeOf());
    if (!url) {
      throw new Trouble(
        "There is no database to work on.",
        "Run `npm start` in another window, or set DATABASE_URL.",
      );
    }
    if (packagesLack(ROOT) === "missing") {
      throw new Trouble("The packages are not installed.", "Run `npm ci`.");
    }
    return await inForeground(command, { ...process.env, DATABASE_URL: url });
  } catch (error) {
    printTrouble(error, "looking for the database");
    return 1;
  }
}

/**
 * In the caller's process group and terminal: Ctrl-C reaches it directly.
 * @param {readonly string[]} command
 * @param {NodeJS.ProcessEnv} env
 * @returns {Promise<number>}
 */
function inForeground(command, env) {
  const ignore = () => {};
  process.on("SIGINT", ignore);
  return new Promise((resolve, reject) => {
    const args = ["--import", "tsx", ...command];
    const child = spawn(process.execPath, args, { env, stdio: "inherit" });
    child.on("error", reject);
    child.on("exit", (code) => resolve(code ?? 1));
  });
}
